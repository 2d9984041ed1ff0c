/** What the kernel says of processes, tried on a real one with a child of its own. */
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { commandLine, descendants, signal, waitForEnd } from '@/scripts/lib/processes';

test('a process below a process is found, and its end is seen', async () => {
  const shell = spawn('sh', ['-c', 'sleep 600 & echo $!; wait'], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const shellEnded = once(shell, 'exit');
  const [said] = await once(shell.stdout, 'data');
  const sleeper = Number(String(said));
  expect(descendants(process.pid)).toEqual(expect.arrayContaining([shell.pid, sleeper]));
  expect(descendants(sleeper)).toEqual([]);
  expect(await waitForEnd(sleeper, 0)).toBe(false);
  signal(sleeper, 'SIGKILL');
  expect(await waitForEnd(sleeper, 5000)).toBe(true);
  await shellEnded;
  expect(commandLine(sleeper)).toEqual([]);
  signal(sleeper, 'SIGKILL');
});
