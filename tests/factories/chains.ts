import { createHash, randomUUID } from 'node:crypto';
import { chainOf } from '@/server/chain/append';
import { ChainVerification } from '@/server/models/chain-verification';
import type { Desk } from '@/server/models/desk';
import { HistoryExport } from '@/server/models/history-export';
import type { User } from '@/server/models/user';
import type { Manifest } from '@/shared/contracts/exports';

export const makeVerification = (desk: Desk, user: User) =>
  ChainVerification.create({
    deskId: desk.id,
    chain: chainOf('records', desk.id),
    status: 'finished',
    heldPosition: null,
    heldHash: null,
    startedById: user.id,
    finishedAt: new Date(),
  });

/** An export that is ready; its manifest is signed by nobody. */
export function makeExport(desk: Desk, user: User) {
  const id = randomUUID();
  const content = Buffer.from('value\r\n');
  const sha256 = createHash('sha256').update(content).digest('hex');
  const now = new Date();
  const manifest: Manifest = {
    version: 1,
    exportId: id,
    deskId: desk.id,
    fileName: 'history.csv',
    format: 'csv',
    filter: {},
    rows: 0,
    bytes: content.length,
    sha256,
    chain: {
      name: chainOf('valuations', desk.id),
      firstPosition: null,
      lastPosition: null,
      headPosition: null,
      headHash: null,
    },
    engines: [],
    caution: 'Made for a test.',
    madeBy: user.id,
    madeAt: now.toISOString(),
    keyId: '0'.repeat(16),
    signature: '0'.repeat(128),
  };
  return HistoryExport.create({
    id,
    deskId: desk.id,
    format: 'csv',
    filter: {},
    upToPosition: '0',
    status: 'ready',
    total: 0,
    content,
    sha256,
    manifest,
    createdById: user.id,
    createdAt: now,
    readyAt: now,
  });
}
