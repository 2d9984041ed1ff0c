/** What people see of the chains of their desk, and the verifying of one in the background. */
import { Op, type Includeable } from 'sequelize';
import type { Anchor, Chain, ChainKind, HeldPlace, Verification } from '@/shared/contracts/chain';
import { chainKinds } from '@/shared/contracts/chain';
import { AppError } from '@/shared/errors';
import { chainOf } from '../chain/append';
import { publicKeyText } from '../chain/signature';
import { signingKey } from '../chain/signing-key';
import { verifyChain } from '../chain/verify';
import { ChainAnchor } from '../models/chain-anchor';
import { ChainHead } from '../models/chain-head';
import { ChainVerification } from '../models/chain-verification';
import type { Desk } from '../models/desk';
import { User } from '../models/user';
import { addJob } from '../queue/add-job';
import type { DeskActor } from './access';
import { paced } from './paced';
import type { WriteOnce } from './write-once';

const shownAnchors = 20;
const shownVerifications = 5;
const progressEveryMs = 250;

const withStarter: Includeable = { model: User, as: 'startedBy', attributes: ['id', 'name'] };

const kindOf = (chain: string): ChainKind =>
  chain.startsWith('valuations/') ? 'valuations' : 'records';

function heldOf({ heldPosition, heldHash }: ChainVerification): HeldPlace | null {
  if (heldPosition === null || heldHash === null) return null;
  return { position: Number(heldPosition), hash: heldHash };
}

function verificationOf(row: ChainVerification): Verification {
  const { startedBy, breakKind, breakPosition } = row;
  if (!startedBy) throw new Error('A verification was read without who started it.');
  return {
    id: row.id,
    chain: kindOf(row.chain),
    status: row.status,
    held: heldOf(row),
    total: Number(row.total),
    checked: Number(row.checked),
    anchors: Number(row.anchors),
    firstBreak: breakKind === null ? null : { kind: breakKind, position: Number(breakPosition) },
    startedBy: { id: startedBy.id, name: startedBy.name },
    startedAt: row.startedAt.toISOString(),
    finishedAt: row.finishedAt?.toISOString() ?? null,
  };
}

const anchorOf = ({ id, position, hash, purpose, signedAt, keyId }: ChainAnchor): Anchor => ({
  id,
  position: Number(position),
  hash,
  purpose,
  signedAt: signedAt.toISOString(),
  keyId,
});

async function readChain(desk: Desk, kind: ChainKind): Promise<Chain> {
  const chain = chainOf(kind, desk.id);
  const head = await ChainHead.findByPk(chain, { rejectOnEmpty: true });
  const anchors = await ChainAnchor.findAll({
    where: { chain },
    order: [
      ['position', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: shownAnchors,
  });
  const verifications = await ChainVerification.findAll({
    where: { deskId: desk.id, chain },
    include: withStarter,
    order: [
      ['startedAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: shownVerifications,
  });
  return {
    kind,
    position: Number(head.position),
    at: head.at === '' ? null : head.at,
    hash: head.hash,
    anchors: anchors.map(anchorOf),
    verifications: verifications.map(verificationOf),
  };
}

export async function readChains(desk: Desk) {
  const { publicKey, keyId } = signingKey();
  return {
    chains: await Promise.all(chainKinds.map((kind) => readChain(desk, kind))),
    publicKey: { keyId, pem: publicKeyText(publicKey) },
  };
}

export async function readVerification(desk: Desk, id: string): Promise<Verification> {
  const row = await ChainVerification.findOne({
    where: { deskId: desk.id, id },
    include: withStarter,
  });
  if (!row) throw new AppError('not-found');
  return verificationOf(row);
}

/** Whoever asks while the same work is under way is shown that work. */
export const startVerification = (
  actor: DeskActor,
  request: { chain: ChainKind; held: HeldPlace | null },
  inTransaction: WriteOnce,
): Promise<Verification> =>
  inTransaction(async (transaction) => {
    const { desk, userId, name } = actor;
    const wanted = {
      deskId: desk.id,
      chain: chainOf(request.chain, desk.id),
      heldPosition: request.held === null ? null : String(request.held.position),
      heldHash: request.held?.hash ?? null,
    };
    const head = await ChainHead.findByPk(wanted.chain, { transaction, rejectOnEmpty: true });
    const underWay = await ChainVerification.findOne({
      where: { ...wanted, status: { [Op.ne]: 'finished' } },
      include: withStarter,
      transaction,
    });
    if (underWay) return verificationOf(underWay);
    const row = await ChainVerification.create(
      { ...wanted, total: head.position, startedById: userId },
      { transaction },
    );
    await addJob(transaction, 'verify-chain', { verificationId: row.id });
    return verificationOf(Object.assign(row, { startedBy: { id: userId, name } }));
  });

/** The work itself, in a worker. Done again after a crash it starts from the first entry. */
export async function runVerification(id: string): Promise<void> {
  const row = await ChainVerification.findByPk(id, { rejectOnEmpty: true });
  if (row.status === 'finished') return;
  const report = paced(progressEveryMs, ({ checked, total }: { checked: number; total: number }) =>
    row.update({ status: 'running', checked: String(checked), total: String(total) }),
  );
  const { checked, total, anchors, firstBreak } = await verifyChain(row.chain, heldOf(row), report);
  await row.update({
    status: 'finished',
    checked: String(checked),
    total: String(total),
    anchors: String(anchors),
    breakKind: firstBreak?.kind ?? null,
    breakPosition: firstBreak === null ? null : String(firstBreak.position),
    finishedAt: new Date(),
  });
}
