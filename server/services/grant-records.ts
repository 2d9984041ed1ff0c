import type { Transaction } from 'sequelize';
import { appendRecord } from '../chain/append';
import { Grant } from '../models/grant';

type NewGrant = Pick<Grant, 'deskId' | 'subjectId' | 'kind' | 'reason' | 'madeById'> &
  Partial<Pick<Grant, 'permission' | 'role' | 'previousRole' | 'endsOn' | 'endedGrantId'>>;

/** Adds a change of what someone may do, and seals it into the desk's records. */
export async function addGrant(grant: NewGrant, transaction: Transaction): Promise<void> {
  const { id } = await Grant.create(grant, { transaction });
  const { deskId, subjectId, kind, reason, madeById, ...details } = grant;
  await appendRecord(transaction, deskId, {
    kind: 'permission-change',
    event: kind,
    subject: { type: 'member', id: subjectId },
    by: madeById,
    reason,
    details: { grantId: id, ...details },
  });
}
