/** The stored values of a desk, read from the chain itself: there is no second copy of them. */
import { Op } from 'sequelize';
import {
  recordBodySchema,
  valuationBodySchema,
  type ValuationBody,
} from '@/shared/contracts/chain-bodies';
import type {
  HistoryFilter,
  HistoryRow,
  HistoryValue,
  SealedRecord,
} from '@/shared/contracts/history';
import { AppError } from '@/shared/errors';
import { chainOf } from '../chain/append';
import { ChainEntry } from '../models/chain-entry';
import type { Desk } from '../models/desk';
import { Underlying } from '../models/underlying';
import { User } from '../models/user';
import { beyond, beyondCursor, historyCursor, matching } from './history-filter';

/** What is shown of one value: a trade has a handful of records, market data and policy likewise. */
const mostRecords = 200;

const newestFirst = [
  ['valuedAt', 'DESC'],
  ['position', 'DESC'],
] satisfies [string, string][];

const valuationOf = (entry: ChainEntry): ValuationBody =>
  valuationBodySchema.parse(JSON.parse(entry.body));

const distinct = (ids: readonly (string | null)[]): string[] => [
  ...new Set(ids.filter((id) => id !== null)),
];

async function underlyingsOf(desk: Desk, ids: readonly (string | null)[]) {
  const rows = await Underlying.findAll({ where: { deskId: desk.id, id: distinct(ids) } });
  return (id: string): HistoryRow['underlying'] => {
    const row = rows.find((underlying) => underlying.id === id);
    if (!row) throw new Error(`The chain names underlying ${id}, which the desk does not have.`);
    const { symbol, name, currency, unit, priceDecimals } = row;
    return { id, symbol, name, currency, unit, priceDecimals };
  };
}

const pairKey = ({ runId, tradeVersionId }: ChainEntry) => `${runId} ${tradeVersionId}`;

/** The check entries that belong to these primary ones, by run and trade version. */
export async function findChecks(primary: readonly ChainEntry[]) {
  if (primary.length === 0) return () => undefined;
  const checks = await ChainEntry.findAll({
    where: {
      chain: primary[0].chain,
      role: 'check',
      kind: 'valuation',
      runId: distinct(primary.map(({ runId }) => runId)),
      tradeVersionId: distinct(primary.map(({ tradeVersionId }) => tradeVersionId)),
    },
    order: [['position', 'DESC']],
  });
  const byPair = new Map(checks.map((entry) => [pairKey(entry), entry]));
  return (entry: ChainEntry) => byPair.get(pairKey(entry));
}

export async function listHistory(
  desk: Desk,
  query: HistoryFilter & { cursor?: string; limit: number },
): Promise<{ items: HistoryRow[]; nextCursor: string | null }> {
  const { cursor, limit, ...filter } = query;
  const entries = await ChainEntry.findAll({
    where: { [Op.and]: [...matching(desk, filter), ...beyondCursor(cursor)] },
    order: newestFirst,
    limit: limit + 1,
  });
  const shown = entries.slice(0, limit);
  const checkOf = await findChecks(shown);
  const underlyingOf = await underlyingsOf(
    desk,
    shown.map(({ underlyingId }) => underlyingId),
  );
  const items = shown.map((entry): HistoryRow => {
    const body = valuationOf(entry);
    const check = checkOf(entry);
    return {
      position: Number(entry.position),
      hash: entry.hash,
      underlying: underlyingOf(body.underlyingId),
      body,
      check: check ? valuationOf(check) : null,
    };
  });
  const last = items.at(-1);
  return {
    items,
    nextCursor:
      entries.length > limit && last
        ? historyCursor({ valuedAt: last.body.valuedAt, position: last.position })
        : null,
  };
}

const sealOf = ({ position, at, previousHash, hash }: ChainEntry) => ({
  position: Number(position),
  at,
  previous: previousHash,
  hash,
});

/** Everything on record about what a value rests on. */
async function recordsOf(desk: Desk, body: ValuationBody): Promise<SealedRecord[]> {
  const { tradeId, tradeVersionId, runId, snapshotId, policyId } = body;
  const entries = await ChainEntry.findAll({
    where: {
      chain: chainOf('records', desk.id),
      kind: { [Op.ne]: 'valuation' },
      subjectId: [tradeId, tradeVersionId, runId, snapshotId, policyId],
    },
    order: [['position', 'ASC']],
    limit: mostRecords,
  });
  const records = entries.map((entry) => ({
    ...sealOf(entry),
    body: recordBodySchema.parse(JSON.parse(entry.body)),
  }));
  const people = await User.findAll({
    attributes: ['id', 'name'],
    where: { id: [...new Set(records.map((record) => record.body.by))] },
  });
  return records.map((record) => {
    const by = people.find(({ id }) => id === record.body.by);
    if (!by) throw new Error(`Record ${record.position} names a person who does not exist.`);
    return { ...record, by: { id: by.id, name: by.name } };
  });
}

async function valueBefore(desk: Desk, entry: ChainEntry): Promise<HistoryValue['before']> {
  const { tradeNumber, valuedAt, position } = entry;
  if (tradeNumber === null || valuedAt === null) throw new Error('This entry is no valuation.');
  const before = await ChainEntry.findOne({
    where: {
      [Op.and]: [
        ...matching(desk, { trade: tradeNumber }),
        ...beyond({ valuedAt, position: Number(position) }),
      ],
    },
    order: newestFirst,
  });
  if (!before) return null;
  const { result, valuedAt: then } = valuationOf(before);
  return {
    position: Number(before.position),
    valuedAt: then,
    value: result.ok ? result.value : null,
  };
}

/** One value by the position of any of its entries. */
export async function readHistoryValue(desk: Desk, position: number): Promise<HistoryValue> {
  const chain = chainOf('valuations', desk.id);
  const named = await ChainEntry.findOne({ where: { chain, position } });
  if (!named) throw new AppError('not-found');
  const { runId, tradeVersionId } = named;
  const entries = await ChainEntry.findAll({
    where: { chain, kind: 'valuation', runId, tradeVersionId },
    order: [
      ['role', 'DESC'],
      ['position', 'ASC'],
    ],
  });
  const [primary] = entries;
  const body = valuationOf(primary);
  const underlyingOf = await underlyingsOf(desk, [body.underlyingId]);
  return {
    underlying: underlyingOf(body.underlyingId),
    valuations: entries.map((entry) => ({ ...sealOf(entry), body: valuationOf(entry) })),
    records: await recordsOf(desk, body),
    before: await valueBefore(desk, primary),
  };
}
