/** Pricing policies: written by one risk officer, put in force by another, one of them at a time. */
import { Transaction } from 'sequelize';
import type { Policy as PolicyOnTheWire, PolicyDraft } from '@/shared/contracts/policies';
import { AppError, type Issue } from '@/shared/errors';
import { toleranceFor, type PositionSize, type ToleranceRule } from '@/shared/tolerance';
import { appendRecord } from '../chain/append';
import { sequelize } from '../database';
import { Desk } from '../models/desk';
import { PricingPolicy } from '../models/pricing-policy';
import { Underlying } from '../models/underlying';
import { User } from '../models/user';
import type { DeskActor } from './access';
import type { WriteOnce } from './write-once';

const withPeople = [
  { model: User, as: 'author', attributes: ['id', 'name'], required: true },
  { model: User, as: 'approvedBy', attributes: ['id', 'name'] },
];

/** The policy in force; null until the desk's first one is approved. */
export const activePolicy = (
  deskId: string,
  transaction?: Transaction,
): Promise<PricingPolicy | null> =>
  PricingPolicy.findOne({ where: { deskId, status: 'approved' }, transaction });

type TolerantUnderlying = Pick<Underlying, 'id' | 'currency' | 'tolerance'>;

/** The underlying's own tolerance holds until a policy says otherwise. */
export const toleranceRuleOf = (
  policy: PricingPolicy | null,
  { id, currency, tolerance }: TolerantUnderlying,
): ToleranceRule => ({
  tolerance: policy?.unitTolerance[id] ?? tolerance,
  moneyTolerance: policy?.moneyTolerance[currency] ?? null,
});

/** Per unit, for a position of that size. */
export const toleranceOf = (
  policy: PricingPolicy | null,
  underlying: TolerantUnderlying,
  size: PositionSize,
): number => toleranceFor(toleranceRuleOf(policy, underlying), size);

const makersOf = ({ authorId, savedByIds }: PricingPolicy): string[] => [
  ...new Set([authorId, ...savedByIds]),
];

const personOf = ({ id, name }: User) => ({ id, name });

/** The table sees to it that a policy has sizes or a share, and never both. */
const refinementOf = ({ sizes, toleranceShare }: PricingPolicy): PolicyDraft['refinement'] =>
  toleranceShare === null
    ? { by: 'sizes', sizes: sizes ?? {} }
    : { by: 'tolerance', share: toleranceShare };

type AmericanRoute = PolicyDraft['primaryAmerican'];

function policyOf(policy: PricingPolicy): PolicyOnTheWire {
  const { author, approvedBy } = policy;
  if (!author) throw new Error('A policy was read without its author.');
  return {
    id: policy.id,
    number: policy.number,
    status: policy.status,
    version: policy.version,
    primaryEuropean: policy.primaryEuropean,
    checkEuropean: policy.checkEuropean,
    primaryAmerican: policy.primaryAmerican as AmericanRoute,
    checkAmerican: policy.checkAmerican as AmericanRoute,
    refinement: refinementOf(policy),
    unitTolerance: policy.unitTolerance,
    moneyTolerance: policy.moneyTolerance,
    reason: policy.reason,
    author: personOf(author),
    authoredAt: policy.authoredAt.toISOString(),
    savedAt: policy.savedAt?.toISOString() ?? null,
    makerIds: makersOf(policy),
    approvedBy: approvedBy ? personOf(approvedBy) : null,
    approvedAt: policy.approvedAt?.toISOString() ?? null,
  };
}

const columnsOf = ({ refinement, ...draft }: PolicyDraft) => ({
  primaryEuropean: draft.primaryEuropean,
  checkEuropean: draft.checkEuropean,
  primaryAmerican: draft.primaryAmerican,
  checkAmerican: draft.checkAmerican,
  unitTolerance: draft.unitTolerance,
  moneyTolerance: draft.moneyTolerance,
  reason: draft.reason,
  sizes: refinement.by === 'sizes' ? refinement.sizes : null,
  toleranceShare: refinement.by === 'tolerance' ? refinement.share : null,
});

/** One page for as long as a desk lives, in all likelihood. */
const longestList = 200;

export async function listPolicies(desk: Desk): Promise<PolicyOnTheWire[]> {
  const rows = await PricingPolicy.findAll({
    where: { deskId: desk.id },
    include: withPeople,
    order: [['number', 'DESC']],
    limit: longestList,
  });
  return rows.map(policyOf);
}

async function readPolicy(desk: Desk, id: string, transaction: Transaction) {
  const policy = await PricingPolicy.findOne({
    where: { deskId: desk.id, id },
    include: withPeople,
    transaction,
  });
  if (!policy) throw new AppError('not-found');
  return policyOf(policy);
}

async function refuseWrong(desk: Desk, draft: PolicyDraft, transaction: Transaction) {
  const underlyings = await Underlying.findAll({
    where: { deskId: desk.id, archivedAt: null },
    transaction,
  });
  const ids = underlyings.map(({ id }) => id);
  const currencies = underlyings.map(({ currency }) => currency);
  const issues: Issue[] = [];
  for (const id of Object.keys(draft.unitTolerance))
    if (!ids.includes(id))
      issues.push({
        path: `unitTolerance.${id}`,
        code: 'unknown-underlying',
        message: 'This underlying is not on the desk; leave it out.',
      });
  for (const currency of Object.keys(draft.moneyTolerance))
    if (!currencies.includes(currency))
      issues.push({
        path: `moneyTolerance.${currency}`,
        code: 'unknown-currency',
        message: `Nothing on this desk is quoted in ${currency}; leave it out.`,
      });
  if (issues.length > 0) throw new AppError('validation-failed', issues);
}

/** Policies of one desk are written and approved one after the other. */
const lockDesk = (deskId: string, transaction: Transaction) =>
  Desk.findByPk(deskId, { transaction, lock: Transaction.LOCK.NO_KEY_UPDATE, rejectOnEmpty: true });

async function openDraft(
  { desk }: DeskActor,
  id: string,
  version: number,
  transaction: Transaction,
): Promise<PricingPolicy> {
  await lockDesk(desk.id, transaction);
  const policy = await PricingPolicy.findOne({ where: { deskId: desk.id, id }, transaction });
  if (!policy) throw new AppError('not-found');
  const { status, number } = policy;
  if (status !== 'draft') {
    const message = `Someone was first: policy ${number} is no draft any more.`;
    throw new AppError('wrong-state', [{ path: '', code: 'wrong-state', message }]);
  }
  if (policy.version !== version) throw new AppError('stale-version');
  return policy;
}

export const createPolicy = (
  { desk, userId }: DeskActor,
  draft: PolicyDraft,
  writeOnce: WriteOnce,
): Promise<PolicyOnTheWire> =>
  writeOnce(async (transaction) => {
    await lockDesk(desk.id, transaction);
    await refuseWrong(desk, draft, transaction);
    const where = { deskId: desk.id };
    const waiting = await PricingPolicy.findOne({
      where: { ...where, status: 'draft' },
      transaction,
    });
    if (waiting) {
      const message = `Policy ${waiting.number} is a draft already; change that one.`;
      throw new AppError('wrong-state', [{ path: '', code: 'draft-already', message }]);
    }
    const last = await PricingPolicy.max<number, PricingPolicy>('number', { where, transaction });
    const { id } = await PricingPolicy.create(
      { ...columnsOf(draft), deskId: desk.id, number: (last ?? 0) + 1, authorId: userId },
      { transaction },
    );
    return readPolicy(desk, id, transaction);
  });

/** Whoever saves is one of the makers from then on. */
export const savePolicy = (
  actor: DeskActor,
  id: string,
  { version, ...draft }: PolicyDraft & { version: number },
): Promise<PolicyOnTheWire> =>
  sequelize.transaction(async (transaction) => {
    const { desk, userId } = actor;
    const policy = await openDraft(actor, id, version, transaction);
    await refuseWrong(desk, draft, transaction);
    await policy.update(
      {
        ...columnsOf(draft),
        version: version + 1,
        savedByIds: [...new Set([...policy.savedByIds, userId])],
        savedAt: new Date(),
      },
      { transaction },
    );
    return readPolicy(desk, id, transaction);
  });

export const approvePolicy = (
  actor: DeskActor,
  id: string,
  version: number,
): Promise<PolicyOnTheWire> =>
  sequelize.transaction(async (transaction) => {
    const { desk, userId } = actor;
    const policy = await openDraft(actor, id, version, transaction);
    if (makersOf(policy).includes(userId)) throw new AppError('own-work');
    const before = await activePolicy(desk.id, transaction);
    if (before)
      await before.update(
        { status: 'superseded', supersededById: id, version: before.version + 1 },
        { transaction },
      );
    await policy.update(
      {
        status: 'approved',
        approvedById: userId,
        approvedAt: new Date(),
        version: version + 1,
      },
      { transaction },
    );
    const approved = await readPolicy(desk, id, transaction);
    const { reason, makerIds, number, refinement, unitTolerance, moneyTolerance } = approved;
    const { primaryEuropean, checkEuropean, primaryAmerican, checkAmerican } = approved;
    await appendRecord(transaction, desk.id, {
      kind: 'policy',
      event: 'approved',
      subject: { type: 'pricing-policy', id, version: approved.version },
      by: userId,
      reason,
      details: {
        number,
        makerIds,
        ...(before ? { supersedes: before.id } : {}),
        routes: { primaryEuropean, checkEuropean, primaryAmerican, checkAmerican },
        refinement,
        unitTolerance,
        moneyTolerance,
      },
    });
    return approved;
  });
