/**
 * A signed head says that the chain had this hash at this place. A chain that is cut short or
 * written anew from the start keeps its own order; it cannot keep a promise that was signed.
 */
import type { KeyObject } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { ChainAnchor } from '../models/chain-anchor';
import { ChainHead } from '../models/chain-head';
import { lockChain } from './append';
import { isSignedBy, signValue } from './signature';
import { signingKey } from './signing-key';

const signedPart = (
  { chain, position, hash, purpose }: Pick<ChainAnchor, 'chain' | 'hash' | 'purpose' | 'position'>,
  signedAt: Date,
) => ({ chain, position: Number(position), hash, purpose, signedAt: signedAt.toISOString() });

/** Signs the head as it is now; an empty chain has none. The head stays locked until the end. */
export async function anchorHead(
  transaction: Transaction,
  chain: string,
  purpose: ChainAnchor['purpose'],
): Promise<ChainAnchor | null> {
  if ((await lockChain(transaction, chain)) === 0) return null;
  const { position, hash } = await ChainHead.findByPk(chain, { transaction, rejectOnEmpty: true });
  const signedAt = new Date();
  const { privateKey, keyId } = signingKey();
  const fields = { chain, position, hash, purpose };
  const signature = signValue(privateKey, signedPart(fields, signedAt));
  return ChainAnchor.create({ ...fields, signedAt, keyId, signature }, { transaction });
}

export const isGenuine = (anchor: ChainAnchor, publicKey: KeyObject): boolean =>
  isSignedBy(publicKey, signedPart(anchor, anchor.signedAt), anchor.signature);
