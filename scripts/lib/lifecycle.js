/**
 * What a launcher does around its work: says each step, runs commands, and undoes what it has
 * begun, last first, when the work ends, fails or is interrupted.
 */
const { spawn } = require('node:child_process');
const { root } = require('./paths');
const { descendants, signal } = require('./processes');

/** Something the person can put right: shown as its one sentence, without a stack. */
class Refusal extends Error {}

const cleanups = [];
let stopped;

function say(sentence) {
  process.stdout.write(`${sentence}\n`);
}

/** Registers what undoes the next step; call it before the step begins. */
function onStop(cleanup) {
  cleanups.push(cleanup);
}

async function undoAll() {
  for (let cleanup = cleanups.pop(); cleanup; cleanup = cleanups.pop()) {
    try {
      await cleanup();
    } catch (error) {
      process.stderr.write(`${error.stack}\n`);
      process.exitCode = 1;
    }
  }
}

function stopAll() {
  stopped ??= undoAll();
  return stopped;
}

function isStopping() {
  return stopped !== undefined;
}

function report(error) {
  process.stderr.write(`${error instanceof Refusal ? error.message : error.stack}\n`);
}

/** Starts a child in this process's group, so that a killed group leaves none behind. */
function startChild(command, args, options = {}) {
  if (isStopping()) throw new Refusal('Stopping.');
  const child = spawn(command, args, { cwd: root, stdio: 'inherit', ...options });
  const ended = new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('exit', (code, signal) => resolve({ code, signal }));
  });
  // Whoever waits for the end hears of the error; nobody may be waiting yet.
  ended.catch(() => {});
  return { child, ended };
}

/**
 * Asks a child to end, and ends it when it has not done so in time; what it started itself and
 * left behind, such as the test runner's workers, is ended after it.
 */
async function endChild({ child, ended }, timeoutMs) {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const below = descendants(child.pid);
  child.kill('SIGTERM');
  const timer = setTimeout(() => child.kill('SIGKILL'), timeoutMs);
  await ended;
  clearTimeout(timer);
  for (const pid of below) signal(pid, 'SIGKILL');
}

/** Runs a command to its end; gives its exit code. */
async function run(command, args, options) {
  const started = startChild(command, args, options);
  const cleanup = () => endChild(started, 2000);
  onStop(cleanup);
  try {
    const { code } = await started.ended;
    // A command that Ctrl-C reached as well may still end with 0, its work half done.
    if (isStopping()) throw new Refusal('Stopping.');
    return code ?? 1;
  } finally {
    const index = cleanups.indexOf(cleanup);
    if (index >= 0) cleanups.splice(index, 1);
  }
}

/**
 * Runs a launcher: `work` gives the exit code. Ctrl-C, a closed terminal and SIGTERM undo
 * everything and end with 130 while the work goes on, with 0 once `work` called `ready()`.
 */
function main(work) {
  let interruptedCode = 130;
  const ready = () => {
    interruptedCode = 0;
  };
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => {
      if (isStopping()) return;
      say('Stopping.');
      stopAll().then(() => process.exit(process.exitCode ?? interruptedCode));
    });
  }
  const finish = async (code) => {
    if (isStopping()) return;
    await stopAll();
    process.exit(process.exitCode ?? code);
  };
  work(ready).then(finish, (error) => {
    if (isStopping()) return undefined;
    report(error);
    return finish(1);
  });
}

module.exports = { Refusal, say, onStop, startChild, endChild, run, main };
