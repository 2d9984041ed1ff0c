/** Clusters of the tests' own, in temporary folders: removed afterwards, by the next run at the latest. */
const fs = require('node:fs');
const os = require('node:os');
const path = require('node:path');
const { startCluster, stopServer } = require('./cluster');
const { onStop } = require('./lifecycle');
const { tryLock } = require('./lock');

const prefix = 'driftless-test-';
const lockFile = (folder) => path.join(folder, 'test.lock');

async function remove(folder) {
  await stopServer(path.join(fs.realpathSync(folder), 'postgres'));
  fs.rmSync(folder, { recursive: true, force: true });
}

/** Removes the clusters of runs that were killed: their lock is free, and not just being taken. */
async function removeAbandonedClusters() {
  for (const name of fs.readdirSync(os.tmpdir())) {
    const folder = path.join(os.tmpdir(), name);
    if (!name.startsWith(prefix) || !fs.existsSync(lockFile(folder))) continue;
    const age = Date.now() - fs.statSync(lockFile(folder)).mtimeMs;
    if (age < 60_000) continue;
    const release = tryLock(lockFile(folder));
    if (!release) continue;
    await remove(folder);
    release();
  }
}

/** Starts an empty cluster. What it holds is thrown away, so nothing is forced to the disk. */
async function startTestCluster() {
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), prefix));
  onStop(() => remove(folder));
  tryLock(lockFile(folder));
  const settings = { fsync: 'off', full_page_writes: 'off', synchronous_commit: 'off' };
  return { folder, ...(await startCluster(folder, settings)) };
}

module.exports = { removeAbandonedClusters, startTestCluster };
