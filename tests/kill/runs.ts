/**
 * Kills the worker, the server or PostgreSQL itself (SIGKILL) at random moments of a run, each time
 * in the middle of a chunk, and compares what is left in the end with a run that was left alone:
 *
 *   npx tsx tests/kill/runs.ts [kills] [trades]
 *
 * on a cluster of its own, which keeps what it has committed.
 */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { startCluster } from '@/scripts/lib/cluster';
import { main, onStop } from '@/scripts/lib/lifecycle';
import { probePort } from '@/scripts/lib/ports';

const [kills = 20, trades = 400] = process.argv.slice(2).map(Number);

void main(async () => {
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'driftless-kill-'));
  onStop(() => fs.rmSync(folder, { recursive: true, force: true }));
  const port = await probePort(0);
  const startDatabase = () => startCluster(folder, { port });
  const { appUrl, ownerUrl } = await startDatabase();
  Object.assign(process.env, { DATABASE_URL: appUrl, DATABASE_OWNER_URL: ownerUrl });
  // Loaded late: the server reads its environment as it loads.
  const { killRuns } = await import('./scenario');
  return killRuns({ kills, trades, folder, startDatabase });
});
