/** The server as a process of its own, on this file's database. */
import { testEnvironment } from './environment';
import { fork, type ChildProcess } from 'node:child_process';
import { createServer } from 'node:net';
import path from 'node:path';

const root = path.join(__dirname, '..', '..', '..');

export const freePort = () =>
  new Promise<number>((resolve) => {
    const probe = createServer().listen(0, '127.0.0.1', () => {
      const bound = probe.address();
      if (bound === null || typeof bound === 'string') throw new Error('No port was given.');
      probe.close(() => resolve(bound.port));
    });
  });

export const startProcess = (port: number, ...args: string[]): ChildProcess =>
  fork(path.join(root, 'server', 'main.ts'), args, {
    cwd: root,
    env: { ...process.env, ...testEnvironment, PORT: String(port) },
    execArgv: ['--require', 'tsx/cjs'],
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  });

export const ended = (child: ChildProcess) =>
  new Promise<number | null>((resolve) => {
    if (child.exitCode !== null || child.signalCode !== null) resolve(child.exitCode);
    else child.once('exit', resolve);
  });

export async function isReady(port: number): Promise<boolean> {
  try {
    return (await fetch(`http://127.0.0.1:${port}/api/v1/health`)).ok;
  } catch {
    // Not listening yet.
    return false;
  }
}
