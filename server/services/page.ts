/** Keyset pages: a cursor names the last row that was given, so new rows shift nothing. */
import { Op, type WhereOptions } from 'sequelize';
import { z } from 'zod';
import { AppError } from '@/shared/errors';

type RowKey = { at: Date; id: string };

const cursorSchema = z.tuple([z.iso.datetime(), z.uuid()]);

const encode = ({ at, id }: RowKey) =>
  Buffer.from(JSON.stringify([at.toISOString(), id])).toString('base64url');

function decode(cursor: string): RowKey {
  try {
    const [at, id] = cursorSchema.parse(
      JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')),
    );
    return { at: new Date(at), id };
  } catch (error) {
    if (!(error instanceof SyntaxError || error instanceof z.ZodError)) throw error;
    const message = 'Take the cursor from the page before, unchanged.';
    throw new AppError('validation-failed', [{ path: 'cursor', code: 'not-a-cursor', message }]);
  }
}

/** The rows after a cursor in the order (instant, id), newest first. */
export function after(instantColumn: string, cursor: string | undefined): WhereOptions {
  if (cursor === undefined) return {};
  const { at, id } = decode(cursor);
  return {
    [instantColumn]: { [Op.lte]: at },
    [Op.or]: [{ [instantColumn]: { [Op.lt]: at } }, { id: { [Op.lt]: id } }],
  };
}

/** Cuts a list that was read one row longer than the page. */
export function pageOf<Row, Item>(
  rows: readonly Row[],
  limit: number,
  itemOf: (row: Row) => Item,
  keyOf: (row: Row) => RowKey,
): { items: Item[]; nextCursor: string | null } {
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  return {
    items: shown.map(itemOf),
    nextCursor: rows.length > limit && last ? encode(keyOf(last)) : null,
  };
}
