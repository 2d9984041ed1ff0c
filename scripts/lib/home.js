/**
 * The one running product of a checkout: who holds its state folder, where it answers, and the
 * database that it uses. `npm start` and `npm run dev` share it.
 */
const fs = require('node:fs');
const path = require('node:path');
const { setTimeout: delay } = require('node:timers/promises');
const { makePrivateFolder, startCluster } = require('./cluster');
const { ensurePostgres } = require('./debian');
const { Refusal, onStop, say } = require('./lifecycle');
const { tryLock } = require('./lock');
const { root, stateFolder } = require('./paths');
const { host } = require('./ports');
const { commandLine, signal, waitForEnd } = require('./processes');
const { isReady, readHealth } = require('./service');

const runningFile = (folder) => path.join(folder, 'running.json');

function readRunning(folder) {
  const file = runningFile(folder);
  return fs.existsSync(file) ? JSON.parse(fs.readFileSync(file, 'utf8')) : null;
}

/** Remembers where the product answers, for a second start and for the one after a crash. */
function writeRunning(folder, running) {
  const file = runningFile(folder);
  fs.writeFileSync(`${file}.new`, JSON.stringify({ ...running, checkout: root }), { mode: 0o600 });
  fs.renameSync(`${file}.new`, file);
  onStop(() => fs.rmSync(file, { force: true }));
}

/** Ends the server process of a launcher that was killed, should it still be there. */
async function endOrphan(folder) {
  const running = readRunning(folder);
  if (!running) return;
  const isOurs = commandLine(running.pid).some((word) => word.startsWith(running.checkout));
  if (isOurs && !(await waitForEnd(running.pid, 3000))) {
    say('Ending the server process of an earlier start.');
    signal(running.pid, 'SIGKILL');
    await waitForEnd(running.pid, 2000);
  }
  fs.rmSync(runningFile(folder), { force: true });
}

/**
 * Takes the state folder for this process. When another start has it, waits until that one is
 * ready and gives its address; should it end before, this process takes its place.
 */
async function takeHome() {
  const folder = stateFolder();
  fs.mkdirSync(path.dirname(folder), { recursive: true });
  makePrivateFolder(folder);
  const lock = path.join(folder, 'start.lock');
  let told = false;
  while (!tryLock(lock)) {
    const running = readRunning(folder);
    if (running && running.checkout !== root)
      throw new Refusal(`DRIFTLESS_DATA ${folder} is in use by the checkout ${running.checkout}.`);
    if (running && isReady(await readHealth(running.port)))
      return { folder, address: `http://${host}:${running.port}` };
    if (!told) say('Another start of this checkout is under way; waiting for it.');
    told = true;
    await delay(300);
  }
  await endOrphan(folder);
  return { folder, address: null };
}

/** The database named by the environment, or a cluster of the checkout's own. */
async function openDatabase(folder) {
  const { DATABASE_URL, DATABASE_OWNER_URL } = process.env;
  if (DATABASE_URL && DATABASE_OWNER_URL)
    return { appUrl: DATABASE_URL, ownerUrl: DATABASE_OWNER_URL, pid: null };
  if (DATABASE_URL || DATABASE_OWNER_URL)
    throw new Refusal(
      'Set both DATABASE_URL (role app) and DATABASE_OWNER_URL (migrations), or neither.',
    );
  await ensurePostgres();
  say('Starting the database.');
  return startCluster(folder);
}

function makeKeysFolder(folder) {
  const keys = path.join(folder, 'keys');
  makePrivateFolder(keys);
  return keys;
}

/** Where the product of this checkout answers; null while it does not. */
async function runningAddress() {
  const running = readRunning(stateFolder());
  const answers = running !== null && isReady(await readHealth(running.port));
  return answers ? `http://${host}:${running.port}` : null;
}

module.exports = { runningAddress, makeKeysFolder, openDatabase, takeHome, writeRunning };
