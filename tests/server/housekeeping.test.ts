import { withOwnDatabase } from './support/server';
import { randomUUID } from 'node:crypto';
import { IdempotencyKey } from '@/server/models/idempotency-key';
import { removeExpiredKeys } from '@/server/services/write-once';
import { makeUser } from '../factories/people';

withOwnDatabase();

test('idempotency keys go after 24 hours, and not before', async () => {
  const { id: userId } = await makeUser();
  const hoursAgo = (hours: number) => new Date(Date.now() - hours * 3_600_000);
  const keep = (createdAt: Date) =>
    IdempotencyKey.create({
      userId,
      endpoint: 'POST /desks/:deskId/quotes',
      key: randomUUID(),
      requestHash: '0'.repeat(64),
      answer: {},
      createdAt,
    });
  const [, young] = [await keep(hoursAgo(24.1)), await keep(hoursAgo(23.9))];
  expect(await removeExpiredKeys()).toBe(1);
  const left = await IdempotencyKey.findAll();
  expect(left.map(({ key }) => key)).toEqual([young.key]);
});
