/**
 * A creating request acts once however often it is sent: its answer is stored under its key in the
 * transaction of the write itself, and given again when the same request comes a second time.
 */
import { createHash } from 'node:crypto';
import { Op, type Transaction } from 'sequelize';
import { AppError } from '@/shared/errors';
import { sequelize } from '../database';
import { IdempotencyKey } from '../models/idempotency-key';

const keyLifeMs = 24 * 3_600_000;

/** Runs a write in a transaction; a handler calls it once, after all computing is done. */
export type WriteOnce = <Answer>(
  write: (transaction: Transaction) => Promise<Answer>,
) => Promise<Answer>;

/** Who sent it, what for, under which key, and what was asked. */
export type RequestKey = { userId: string; endpoint: string; key: string; request: unknown };

/** The request was checked by a schema, which also fixed the order of its fields. */
const hashOf = (request: unknown) =>
  createHash('sha256').update(JSON.stringify(request)).digest('hex');

const oldest = () => new Date(Date.now() - keyLifeMs);

/** The answer given before, if any; refuses a key that was used for other content. */
export async function findAnswer(
  { userId, endpoint, key, request }: RequestKey,
  transaction?: Transaction,
): Promise<{ answer: unknown } | null> {
  const row = await IdempotencyKey.findOne({
    where: { userId, endpoint, key, createdAt: { [Op.gt]: oldest() } },
    transaction,
  });
  if (!row) return null;
  if (row.requestHash !== hashOf(request)) throw new AppError('idempotency-key-reused');
  return { answer: row.answer };
}

export const writeOnce =
  (requestKey: RequestKey): WriteOnce =>
  <Answer>(write: (transaction: Transaction) => Promise<Answer>) =>
    sequelize.transaction(async (transaction) => {
      const { userId, endpoint, key, request } = requestKey;
      // Two copies of one request that come together: the second waits here and finds the answer.
      await sequelize.query('SELECT pg_advisory_xact_lock(hashtextextended($name, 0))', {
        bind: { name: `${userId} ${endpoint} ${key}` },
        transaction,
      });
      const before = await findAnswer(requestKey, transaction);
      // The key names the endpoint, so that what was stored is this very write's kind of answer.
      if (before) return before.answer as Answer;
      const answer = await write(transaction);
      await IdempotencyKey.destroy({ where: { userId, endpoint, key }, transaction });
      await IdempotencyKey.create(
        { userId, endpoint, key, requestHash: hashOf(request), answer },
        { transaction },
      );
      return answer;
    });

export const removeExpiredKeys = (): Promise<number> =>
  IdempotencyKey.destroy({ where: { createdAt: { [Op.lte]: oldest() } } });
