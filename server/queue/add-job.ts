import type { Transaction } from 'sequelize';
import { sequelize } from '../database';

type Payload = Readonly<Record<string, unknown>>;

/** Puts a job into the queue together with the rows that it is about, or not at all. */
export async function addJob(transaction: Transaction, task: string, payload: Payload) {
  await sequelize.query('SELECT graphile_worker.add_job($task, $payload::json)', {
    bind: { task, payload: JSON.stringify(payload) },
    transaction,
  });
}

/** Many jobs of one kind; a higher number lets jobs with a lower one go first. */
export async function addJobs(
  transaction: Transaction,
  task: string,
  payloads: readonly Payload[],
  priority: number,
) {
  await sequelize.query(
    `SELECT graphile_worker.add_job($task, job.payload, priority := $priority)
      FROM json_array_elements($payloads::json) AS job (payload)`,
    { bind: { task, payloads: JSON.stringify(payloads), priority }, transaction },
  );
}
