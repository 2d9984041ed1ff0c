/** Questions to the kernel about a process. */
const fs = require('node:fs');
const { setTimeout: delay } = require('node:timers/promises');

function readProc(pid, name) {
  try {
    return fs.readFileSync(`/proc/${pid}/${name}`, 'utf8');
  } catch (error) {
    if (error.code === 'ENOENT' || error.code === 'ESRCH') return null;
    throw error;
  }
}

/** The command line as an array; empty when no such process runs (a zombie has none). */
function commandLine(pid) {
  return (readProc(pid, 'cmdline') ?? '').split('\0').filter((word) => word !== '');
}

/** Every process below this one: children, their children, and so on. */
function descendants(pid) {
  const parents = fs
    .readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    // The name of the program stands in brackets and may hold anything; state and parent follow.
    .map((name) => [Number(name), (readProc(name, 'stat') ?? '').split(') ').at(-1).split(' ')[1]])
    .map(([child, parent]) => ({ child, parent: Number(parent) }));
  const below = (one) =>
    parents.filter(({ parent }) => parent === one).flatMap(({ child }) => [child, ...below(child)]);
  return below(pid);
}

/** Waits until the process is gone; false when it still runs after the time given. */
async function waitForEnd(pid, timeoutMs) {
  const deadline = Date.now() + timeoutMs;
  while (commandLine(pid).length > 0) {
    if (Date.now() >= deadline) return false;
    await delay(50);
  }
  return true;
}

function signal(pid, name) {
  try {
    process.kill(pid, name);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

module.exports = { commandLine, descendants, waitForEnd, signal };
