import { Op, type WhereOptions } from 'sequelize';
import { z } from 'zod';
import type { HistoryFilter } from '@/shared/contracts/history';
import { addDays, instantInZone } from '@/shared/dates';
import { AppError } from '@/shared/errors';
import { chainOf } from '../chain/append';
import type { Desk } from '../models/desk';

const startOf = (date: string, { timeZone }: Desk) =>
  new Date(instantInZone(date, '00:00', timeZone)).toISOString();

/**
 * The values of a desk that a filter lets through: one entry a value, that of the primary route.
 * Days are the desk's; instants are stored as text of one form, whose order is that of time.
 */
export function matching(desk: Desk, filter: HistoryFilter): WhereOptions[] {
  const { trade, run, bookId, underlyingId, verdict, from, to } = filter;
  const conditions: WhereOptions[] = [{ chain: chainOf('valuations', desk.id), role: 'primary' }];
  if (trade !== undefined) conditions.push({ tradeNumber: trade });
  if (run !== undefined) conditions.push({ runNumber: run });
  if (bookId !== undefined) conditions.push({ bookId });
  if (underlyingId !== undefined) conditions.push({ underlyingId });
  if (verdict !== undefined) conditions.push({ verdict });
  if (from !== undefined) conditions.push({ valuedAt: { [Op.gte]: startOf(from, desk) } });
  if (to !== undefined) conditions.push({ valuedAt: { [Op.lt]: startOf(addDays(to, 1), desk) } });
  return conditions;
}

/** A row's place in the order: by valuation instant, then by position. */
export type HistoryKey = { valuedAt: string; position: number };

const cursorSchema = z.tuple([z.iso.datetime(), z.number().int().min(1)]);

export const historyCursor = ({ valuedAt, position }: HistoryKey): string =>
  Buffer.from(JSON.stringify([valuedAt, position])).toString('base64url');

function keyOf(cursor: string): HistoryKey {
  try {
    const [valuedAt, position] = cursorSchema.parse(
      JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')),
    );
    return { valuedAt, position };
  } catch (error) {
    if (!(error instanceof SyntaxError || error instanceof z.ZodError)) throw error;
    const message = 'Take the cursor from the page before, unchanged.';
    throw new AppError('validation-failed', [{ path: 'cursor', code: 'not-a-cursor', message }]);
  }
}

/** What comes after a place, newest first. */
export const beyond = ({ valuedAt, position }: HistoryKey): WhereOptions[] => [
  { valuedAt: { [Op.lte]: valuedAt } },
  { [Op.or]: [{ valuedAt: { [Op.lt]: valuedAt } }, { position: { [Op.lt]: position } }] },
];

export const beyondCursor = (cursor: string | undefined): WhereOptions[] =>
  cursor === undefined ? [] : beyond(keyOf(cursor));
