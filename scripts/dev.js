/** `npm run dev`: server and pages follow every change of their source, both on one address. */
const path = require('node:path');
const { startProxy } = require('./lib/dev-proxy');
const { makeKeysFolder, openDatabase, takeHome, writeRunning } = require('./lib/home');
const { ensureInstalled } = require('./lib/install');
const { endChild, main, onStop, say, startChild } = require('./lib/lifecycle');
const { root } = require('./lib/paths');
const { choosePort, host, probePort } = require('./lib/ports');
const { ensureServerBuild } = require('./lib/server-build');
const { demonstrationSignIns, seedDatabase, serviceEnvironment } = require('./lib/service');
const { expoCli, expoEnvironment } = require('./lib/web-build');

function startWatched(args, env) {
  // Neither may read the keyboard: Ctrl-C is this launcher's.
  const started = startChild(process.execPath, args, {
    env,
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  onStop(() => endChild(started, 5000));
  return started;
}

main(async (ready) => {
  const home = await takeHome();
  if (home.address) {
    say(`Driftless already runs at ${home.address}`);
    return 0;
  }
  const port = await choosePort(process.env.PORT);
  await ensureInstalled();
  const database = await openDatabase(home.folder);
  const keysFolder = makeKeysFolder(home.folder);
  const serverPort = await probePort(0);
  const metroPort = await probePort(0);
  const environment = {
    ...serviceEnvironment({ database, keysFolder, port: serverPort }),
    NODE_ENV: 'development',
  };
  const isOwn = database.pid !== null;
  if (isOwn) {
    await ensureServerBuild();
    await seedDatabase(environment);
  }
  const tsx = path.join(root, 'node_modules', 'tsx', 'dist', 'cli.mjs');
  const server = startWatched([tsx, 'watch', 'server/main.ts'], environment);
  const metroArgs = ['start', '--web', '--localhost', '--port', String(metroPort)];
  const metro = startWatched([expoCli, ...metroArgs], expoEnvironment());
  await startProxy(port, { serverPort, metroPort });
  writeRunning(home.folder, { pid: server.child.pid, port });
  ready();
  say(`\nBoth sides at http://${host}:${port}`);
  if (isOwn) say(['Demonstration sign-ins:', ...demonstrationSignIns()].join('\n'));
  await Promise.race([server.ended, metro.ended]);
  return 1;
});
