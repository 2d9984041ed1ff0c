/**
 * One process at a time. The kernel keeps the lock (flock) for as long as this process holds the
 * file open, so the lock of a process that was killed is free at once: there is no stale one.
 */
const { spawnSync } = require('node:child_process');
const fs = require('node:fs');
const path = require('node:path');
const { setTimeout: delay } = require('node:timers/promises');

/** Gives the function that releases the lock, or null when another process holds it. */
function tryLock(file) {
  fs.mkdirSync(path.dirname(file), { recursive: true });
  const descriptor = fs.openSync(file, 'a', 0o600);
  // flock locks the open file that it inherits as descriptor 3, which is this process's own.
  const { status, error } = spawnSync('flock', ['--exclusive', '--nonblock', '3'], {
    stdio: ['ignore', 'ignore', 'inherit', descriptor],
  });
  if (status === 0) return () => fs.closeSync(descriptor);
  fs.closeSync(descriptor);
  if (error) throw error;
  return null;
}

/** Waits for the lock; `onWait` is called once when it is not free. */
async function takeLock(file, onWait) {
  let release = tryLock(file);
  if (!release) onWait();
  while (!release) {
    await delay(200);
    release = tryLock(file);
  }
  return release;
}

module.exports = { tryLock, takeLock };
