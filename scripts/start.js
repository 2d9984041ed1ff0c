/** `npm start`: brings the product up on this machine, from nothing if need be. */
const { setTimeout: delay } = require('node:timers/promises');
const { makeKeysFolder, openDatabase, takeHome, writeRunning } = require('./lib/home');
const { ensureInstalled } = require('./lib/install');
const { Refusal, main, say } = require('./lib/lifecycle');
const { choosePort, host, probePort } = require('./lib/ports');
const { commandLine } = require('./lib/processes');
const { ensureServerBuild } = require('./lib/server-build');
const {
  demonstrationSignIns,
  hasEnded,
  seedDatabase,
  serviceEnvironment,
  startService,
  waitUntilReady,
} = require('./lib/service');
const { ensureWebBuild } = require('./lib/web-build');

/** Starts the service; takes the next port when another program snatched the chosen one. */
async function bringUp(home, database) {
  const keysFolder = makeKeysFolder(home.folder);
  for (;;) {
    const port = await choosePort(process.env.PORT);
    const environment = serviceEnvironment({ database, keysFolder, port });
    const service = startService(environment);
    writeRunning(home.folder, { pid: service.child.pid, port });
    if (await waitUntilReady(port, () => hasEnded(service))) return { port, service };
    const isSnatched = !process.env.PORT && (await probePort(port)) === null;
    if (!isSnatched) throw new Refusal('The server ended; its last message above says why.');
  }
}

/** Gives the sentence that says what ended, once service or database has. */
async function watch(service, databasePid) {
  for (;;) {
    if (hasEnded(service)) return 'The server ended; its last message above says why.';
    if (databasePid !== null && commandLine(databasePid).length === 0)
      return 'The database ended; postgres.log in the data folder says why.';
    await delay(1000);
  }
}

main(async (ready) => {
  const began = Date.now();
  const home = await takeHome();
  if (home.address) {
    say(`Driftless already runs at ${home.address}`);
    return 0;
  }
  await choosePort(process.env.PORT);
  await ensureInstalled();
  const database = await openDatabase(home.folder);
  await ensureWebBuild();
  await ensureServerBuild();
  const isOwn = database.pid !== null;
  if (isOwn) {
    say('Bringing the tables up to date; demonstration data, if there is none yet.');
    const keysFolder = makeKeysFolder(home.folder);
    await seedDatabase(serviceEnvironment({ database, keysFolder, port: 0 }));
  }
  say('Starting web and worker.');
  const { port, service } = await bringUp(home, database);
  ready();
  say(`\nReady after ${Math.round((Date.now() - began) / 1000)} s: http://${host}:${port}`);
  if (isOwn) say(['Demonstration sign-ins:', ...demonstrationSignIns()].join('\n'));
  say('Ctrl-C stops it.');
  throw new Refusal(await watch(service, database.pid));
});
