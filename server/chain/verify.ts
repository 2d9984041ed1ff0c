/**
 * Walks a chain from its first entry to its head and names the first thing that is wrong. All pages
 * are read in one snapshot of the database, so that appends meanwhile change nothing of what is seen.
 *
 * What it can prove: entries changed, removed, added or reordered show by their hashes; a tail that
 * was cut off, or a chain written anew from some place on, shows by a signed anchor, or by a place
 * and hash that someone kept outside. What is cut off behind the last anchor leaves no trace here.
 */
import { Op, Transaction } from 'sequelize';
import type { BreakKind } from '@/shared/contracts/chain';
import { sequelize } from '../database';
import { ChainAnchor } from '../models/chain-anchor';
import { ChainEntry } from '../models/chain-entry';
import { ChainHead } from '../models/chain-head';
import { isGenuine } from './anchors';
import { entryHash, noHash } from './hash';
import { signingKey } from './signing-key';

const pageSize = 1000;

export type Break = { kind: BreakKind; position: number };

/** A place and its hash that someone kept outside of the database, such as in a manifest. */
export type HeldPlace = { position: number; hash: string };

export type Progress = { checked: number; total: number };

export type Verified = Progress & { anchors: number; firstBreak: Break | null };

type Kept = { position: number; hash: string; kind: 'anchor-hash' | 'held-hash' };

type Walk = {
  position: number;
  at: string;
  hash: string;
  /** What was signed or kept about places that the walk has not reached, in their order. */
  promises: Kept[];
};

function breakAt(walk: Walk, entry: ChainEntry): Break | null {
  const position = walk.position + 1;
  const found = (kind: BreakKind): Break => ({ kind, position });
  if (Number(entry.position) !== position) return found('missing');
  if (entry.previousHash !== walk.hash) return found('previous');
  const { chain, previousHash: previous, at, body, hash } = entry;
  if (entryHash({ previous, chain, position, at, body }) !== hash) return found('hash');
  if (at < walk.at) return found('time');
  for (; walk.promises[0]?.position === position; walk.promises.shift())
    if (walk.promises[0].hash !== hash) return found(walk.promises[0].kind);
  Object.assign(walk, { position, at, hash });
  return null;
}

/** The walk is at the last entry there is: the head must say the same, and nothing be left over. */
function breakAtEnd(walk: Walk, head: ChainHead): Break | null {
  if (Number(head.position) > walk.position)
    return { kind: 'missing', position: walk.position + 1 };
  if (Number(head.position) < walk.position || head.hash !== walk.hash || head.at !== walk.at)
    return { kind: 'head', position: walk.position };
  if (walk.promises.length > 0) return { kind: 'cut', position: walk.position + 1 };
  return null;
}

function forgedAnchor(anchors: readonly ChainAnchor[]): Break | null {
  const { publicKey, keyId } = signingKey();
  const forged = anchors.find((anchor) => anchor.keyId !== keyId || !isGenuine(anchor, publicKey));
  return forged ? { kind: 'signature', position: Number(forged.position) } : null;
}

function promisesOf(anchors: readonly ChainAnchor[], held: HeldPlace | null): Kept[] {
  const signed = anchors.map(({ position, hash }) => ({
    position: Number(position),
    hash,
    kind: 'anchor-hash' as const,
  }));
  const kept = held ? [{ ...held, kind: 'held-hash' as const }] : [];
  return [...signed, ...kept].sort((a, b) => a.position - b.position);
}

async function walkAlong(
  chain: string,
  walk: Walk,
  transaction: Transaction,
  onPage: () => Promise<void>,
): Promise<Break | null> {
  for (;;) {
    const page = await ChainEntry.findAll({
      attributes: ['chain', 'position', 'at', 'previousHash', 'hash', 'body'],
      where: { chain, position: { [Op.gt]: walk.position } },
      order: [['position', 'ASC']],
      limit: pageSize,
      raw: true,
      transaction,
    });
    for (const entry of page) {
      const broken = breakAt(walk, entry);
      if (broken) return broken;
    }
    await onPage();
    if (page.length < pageSize) return null;
  }
}

export const verifyChain = (
  chain: string,
  held: HeldPlace | null,
  onProgress: (progress: Progress) => Promise<void>,
): Promise<Verified> =>
  sequelize.transaction(
    { isolationLevel: Transaction.ISOLATION_LEVELS.REPEATABLE_READ },
    async (transaction) => {
      await sequelize.query('SET TRANSACTION READ ONLY', { transaction });
      const head = await ChainHead.findByPk(chain, { transaction, rejectOnEmpty: true });
      const anchors = await ChainAnchor.findAll({
        where: { chain },
        order: [
          ['position', 'ASC'],
          ['id', 'ASC'],
        ],
        transaction,
      });
      const walk = { position: 0, at: '', hash: noHash, promises: promisesOf(anchors, held) };
      const total = Number(head.position);
      const onPage = () => onProgress({ checked: walk.position, total });
      const firstBreak =
        (await walkAlong(chain, walk, transaction, onPage)) ??
        breakAtEnd(walk, head) ??
        forgedAnchor(anchors);
      return { checked: walk.position, total, anchors: anchors.length, firstBreak };
    },
  );
