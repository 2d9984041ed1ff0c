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

module.exports = { commandLine, waitForEnd, signal };
