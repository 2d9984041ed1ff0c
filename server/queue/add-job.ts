import type { Transaction } from 'sequelize';
import { sequelize } from '../database';

/** Puts a job into the queue together with the rows that it is about, or not at all. */
export async function addJob(
  transaction: Transaction,
  task: string,
  payload: Readonly<Record<string, unknown>>,
) {
  await sequelize.query('SELECT graphile_worker.add_job($task, $payload::json)', {
    bind: { task, payload: JSON.stringify(payload) },
    transaction,
  });
}
