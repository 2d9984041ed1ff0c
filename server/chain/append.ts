/**
 * The only way into a chain. Compute first and append last: the head stays locked until the
 * transaction ends, and everyone else who appends waits. Of two chains the valuations come first.
 */
import { QueryTypes, type Transaction } from 'sequelize';
import type { ChainBody, ValuationBody } from '@/shared/contracts/chain-bodies';
import { sequelize } from '../database';
import { canonicalJson } from './canonical-json';

export type ChainKind = 'valuations' | 'records';

export const chainOf = (kind: ChainKind, deskId: string): string => `${kind}/${deskId}`;

/** Place and seal of an entry. */
export type Sealed = { position: number; at: string; hash: string };

/** `append` takes so many at once. */
const largestBatch = 1000;

type AppendedRow = { entry_position: string; entry_at: string; entry_hash: string };

async function appendBatch(
  transaction: Transaction,
  chain: string,
  bodies: readonly string[],
): Promise<Sealed[]> {
  const rows = await sequelize.query<AppendedRow>(
    'SELECT * FROM append($chain, $bodies::text[]) ORDER BY entry_position',
    { bind: { chain, bodies }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map((row) => ({
    position: Number(row.entry_position),
    at: row.entry_at,
    hash: row.entry_hash,
  }));
}

/** Seals the bodies in the order given; gives where each of them stands. */
export async function appendToChain(
  transaction: Transaction,
  chain: string,
  bodies: readonly ChainBody[],
): Promise<Sealed[]> {
  const texts = bodies.map(canonicalJson);
  const sealed: Sealed[] = [];
  for (let from = 0; from < texts.length; from += largestBatch)
    sealed.push(...(await appendBatch(transaction, chain, texts.slice(from, from + largestBatch))));
  return sealed;
}

export const appendRecord = (transaction: Transaction, deskId: string, body: ChainBody) =>
  appendToChain(transaction, chainOf('records', deskId), [body]);

/** Nobody else appends to the chain until the transaction ends; gives the head's position. */
export async function lockChain(transaction: Transaction, chain: string): Promise<number> {
  const [row] = await sequelize.query<{ position: string }>(
    'SELECT lock_chain($chain) AS position',
    {
      bind: { chain },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  return Number(row.position);
}

const keyOf = ({ runId, tradeVersionId, route }: ValuationBody) =>
  `${runId} ${tradeVersionId} ${route}`;

/**
 * Appends the valuations that are not there yet: a chunk of a run that is done a second time
 * doubles nothing. Looked up under the head's lock, so that two workers cannot both find none.
 */
export async function appendValuations(
  transaction: Transaction,
  deskId: string,
  bodies: readonly ValuationBody[],
): Promise<Sealed[]> {
  const chain = chainOf('valuations', deskId);
  await lockChain(transaction, chain);
  const present = await sequelize.query<{ key: string }>(
    `SELECT concat_ws(' ', run_id, trade_version_id, route) AS key FROM chain_entries
      WHERE kind = 'valuation' AND run_id = ANY ($runs::uuid[])
        AND trade_version_id = ANY ($versions::uuid[])`,
    {
      bind: {
        runs: [...new Set(bodies.map(({ runId }) => runId))],
        versions: [...new Set(bodies.map(({ tradeVersionId }) => tradeVersionId))],
      },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
  const keys = new Set(present.map(({ key }) => key));
  return appendToChain(
    transaction,
    chain,
    bodies.filter((body) => !keys.has(keyOf(body))),
  );
}
