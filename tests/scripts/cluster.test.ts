/** Whether the pid file of a data folder names a server that runs, or is left from a crash. */
import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { findServer, stopServer } from '@/scripts/lib/cluster';

let data: string;
const children: ChildProcess[] = [];

beforeEach(() => {
  data = fs.mkdtempSync(path.join(os.tmpdir(), 'driftless-data-'));
});

afterEach(async () => {
  for (const child of children.splice(0)) {
    if (child.exitCode !== null || child.signalCode !== null) continue;
    child.kill('SIGKILL');
    await once(child, 'exit');
  }
  fs.rmSync(data, { recursive: true });
});

/** A process that looks to the kernel like the program and arguments given. */
async function startAs(program: string, ...words: string[]): Promise<number> {
  const code = 'setInterval(() => {}, 1000)';
  const child = spawn(process.execPath, ['-e', code, '--', ...words], { argv0: program });
  children.push(child);
  await once(child, 'spawn');
  if (child.pid === undefined) throw new Error('no process');
  return child.pid;
}

/** The lines of postmaster.pid, as PostgreSQL's manual, “Database File Layout”, lists them. */
function writePidFile(pid: number, status = 'ready   ') {
  const lines = [pid, data, 1_700_000_000, 41_033, '', '127.0.0.1', '   123   456', status, ''];
  fs.writeFileSync(path.join(data, 'postmaster.pid'), lines.join('\n'));
}

test('no pid file: no server', () => {
  expect(findServer(data)).toBeNull();
});

test('a pid file whose process is gone is stale', async () => {
  const pid = await startAs('/usr/lib/postgresql/15/bin/postgres', '-D', data);
  const [child] = children;
  child.kill('SIGKILL');
  await once(child, 'exit');
  writePidFile(pid);
  expect(findServer(data)).toBeNull();
});

test('a number that now belongs to another program is stale', async () => {
  writePidFile(await startAs('/usr/bin/editor', data));
  expect(findServer(data)).toBeNull();
});

test('a server of another data folder is not ours', async () => {
  writePidFile(await startAs('/usr/lib/postgresql/15/bin/postgres', '-D', `${data}-other`));
  expect(findServer(data)).toBeNull();
});

test('a server of this data folder is found with port and status', async () => {
  const pid = await startAs('/usr/lib/postgresql/15/bin/postgres', '-D', data);
  writePidFile(pid, 'starting');
  expect(findServer(data)).toEqual({ pid, port: 41_033, status: 'starting' });
});

test('a server that is stopped is waited for', async () => {
  const pid = await startAs('/usr/lib/postgresql/15/bin/postgres', '-D', data);
  writePidFile(pid);
  await stopServer(data);
  expect(findServer(data)).toBeNull();
});
