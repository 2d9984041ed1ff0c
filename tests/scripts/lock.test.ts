/**
 * The launchers' lock. The kernel's promise (flock(2): a lock is released when every descriptor of
 * the open file is closed, however the process ends) is tried with a process that is killed.
 */
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { takeLock, tryLock } from '@/scripts/lib/lock';

const lockModule = path.resolve(__dirname, '../../scripts/lib/lock.js');

let folder: string;
let file: string;

beforeEach(() => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'driftless-lock-'));
  file = path.join(folder, 'below', 'one.lock');
});

afterEach(() => fs.rmSync(folder, { recursive: true }));

/** Another process that takes the lock, says so, and then does nothing more. */
async function startHolder() {
  const code = `require(${JSON.stringify(lockModule)}).tryLock(${JSON.stringify(file)});
    process.stdout.write('taken'); setInterval(() => {}, 1000);`;
  const holder = spawn(process.execPath, ['-e', code], { stdio: ['ignore', 'pipe', 'inherit'] });
  const [said] = await once(holder.stdout, 'data');
  expect(String(said)).toBe('taken');
  return holder;
}

test('is held by one and free again when released', () => {
  const release = tryLock(file);
  expect(release).not.toBeNull();
  expect(tryLock(file)).toBeNull();
  release?.();
  const again = tryLock(file);
  expect(again).not.toBeNull();
  again?.();
});

test('another process has to wait, and takes over when the holder is killed', async () => {
  const holder = await startHolder();
  expect(tryLock(file)).toBeNull();
  const onWait = jest.fn();
  const taken = takeLock(file, onWait);
  expect(onWait).toHaveBeenCalledTimes(1);
  holder.kill('SIGKILL');
  const release = await taken;
  expect(tryLock(file)).toBeNull();
  release();
});

test('a child of the holder does not keep the lock', async () => {
  const release = tryLock(file);
  const child = spawn('cat', [], { stdio: ['pipe', 'ignore', 'inherit'] });
  await once(child, 'spawn');
  release?.();
  const again = tryLock(file);
  expect(again).not.toBeNull();
  again?.();
  child.stdin.end();
  await once(child, 'exit');
});
