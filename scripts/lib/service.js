/** The running product: web and worker in one child process, watched until it is ready. */
const fs = require('node:fs');
const path = require('node:path');
const { setTimeout: delay } = require('node:timers/promises');
const { Refusal, endChild, onStop, run, say, startChild } = require('./lifecycle');
const { buildFolder, root, webFolder } = require('./paths');
const { host } = require('./ports');

const stopTimeoutMs = 6000;

/** What the server process reads; `server/env.ts` checks it. */
function serviceEnvironment({ database, keysFolder, port }) {
  return {
    // The launcher says each step in plain words; a line per request would bury them.
    LOG_LEVEL: 'warn',
    ...process.env,
    DATABASE_URL: database.appUrl,
    DATABASE_OWNER_URL: database.ownerUrl,
    PORT: String(port),
    DRIFTLESS_KEYS_DIR: keysFolder,
    DRIFTLESS_CHECKOUT: root,
    DRIFTLESS_WEB_DIR: webFolder,
  };
}

/** Writes demonstration data into a database that has no users yet; else nothing happens. */
async function seedDatabase(environment) {
  const args = ['--enable-source-maps', path.join(buildFolder, 'server', 'seed.js')];
  if ((await run(process.execPath, args, { env: environment })) !== 0)
    throw new Refusal('The demonstration data could not be written; the message above says why.');
}

/** What the health page of a port answers; null when nothing readable answers there. */
async function readHealth(port) {
  try {
    const url = `http://${host}:${port}/api/v1/health`;
    const response = await fetch(url, { signal: AbortSignal.timeout(3000) });
    return await response.json();
  } catch {
    // Not listening yet, or not this product: both mean that it is not there.
    return null;
  }
}

function isReady(health) {
  return health?.status === 'ready' && health.checkout === root;
}

/** Waits until the service of this checkout is ready; false once `isOver` says that it ended. */
async function waitUntilReady(port, isOver) {
  let told = '';
  while (!isOver()) {
    const health = await readHealth(port);
    if (isReady(health)) return true;
    const parts = Object.entries(health?.parts ?? {});
    const waiting = parts.filter(([, state]) => state !== 'ready').map(([name]) => name);
    if (waiting.length > 0 && waiting.join() !== told) say(`Waiting for: ${waiting.join(', ')}.`);
    told = waiting.join();
    await delay(150);
  }
  return false;
}

/**
 * Starts web and worker. The channel to the child closes when this launcher is killed, and the
 * child ends by that; asked to end, it stops taking requests first and then its worker.
 */
function startService(environment) {
  const main = path.join(buildFolder, 'server', 'main.js');
  const service = startChild(
    process.execPath,
    ['--enable-source-maps', main, '--services=web,worker'],
    {
      env: { ...environment, NODE_ENV: 'production' },
      stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    },
  );
  onStop(() => endChild(service, stopTimeoutMs));
  return service;
}

const hasEnded = ({ child }) => child.exitCode !== null || child.signalCode !== null;

/** The people that demonstration data brings, one line each. */
function demonstrationSignIns() {
  const file = path.join(root, 'server', 'seed', 'sign-ins.json');
  const people = JSON.parse(fs.readFileSync(file, 'utf8'));
  const width = Math.max(...people.map(({ email }) => email.length));
  return people.map(
    ({ email, password, role, desk }) => `  ${email.padEnd(width)}  ${password}  ${role}, ${desk}`,
  );
}

module.exports = {
  demonstrationSignIns,
  hasEnded,
  isReady,
  readHealth,
  seedDatabase,
  serviceEnvironment,
  startService,
  waitUntilReady,
};
