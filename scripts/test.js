/** `npm test`: every check there is, on databases of its own that are removed afterwards. */
const path = require('node:path');
const { makePrivateFolder } = require('./lib/cluster');
const { ensureChromium, ensurePostgres } = require('./lib/debian');
const { ensureInstalled } = require('./lib/install');
const { Refusal, main, say } = require('./lib/lifecycle');
const { host, probePort } = require('./lib/ports');
const { ensureServerBuild } = require('./lib/server-build');
const {
  hasEnded,
  seedDatabase,
  serviceEnvironment,
  startService,
  waitUntilReady,
} = require('./lib/service');
const { startStages } = require('./lib/stages');
const { removeAbandonedClusters, startTestCluster } = require('./lib/test-cluster');
const { ensureWebBuild } = require('./lib/web-build');

/** bcrypt at its least cost: hashing slowly is no part of what is tested. */
const quickPasswords = { PASSWORD_COST: '4' };

/** Brings up the whole product on a seeded database; gives the environment of the browser tests. */
async function startProduct() {
  const database = await startTestCluster();
  const keysFolder = path.join(database.folder, 'keys');
  makePrivateFolder(keysFolder);
  const port = await probePort(0);
  const environment = {
    ...serviceEnvironment({ database, keysFolder, port }),
    ...quickPasswords,
  };
  await seedDatabase(environment);
  const service = startService(environment);
  if (!(await waitUntilReady(port, () => hasEnded(service))))
    throw new Refusal('The server ended before the browser tests; its last message says why.');
  return { ...environment, E2E_BASE_URL: `http://${host}:${port}` };
}

/** A step whose refusal fails its stage and lets the other stages go on. */
async function attempt(work) {
  try {
    return await work();
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    say(error.message);
    return false;
  }
}

main(async () => {
  await ensureInstalled();
  await ensurePostgres();
  await ensureChromium();
  await removeAbandonedClusters();
  const { stage, runTool, runJest, end } = startStages();
  await stage('format', () => runTool('prettier'));
  await stage('lint', () => runTool('eslint'));
  await stage('types', () => runTool('types'));
  await stage('tests', async () => {
    const database = await startTestCluster();
    const urls = { DATABASE_URL: database.appUrl, DATABASE_OWNER_URL: database.ownerUrl };
    const args = ['--selectProjects', 'node', 'web', '--maxWorkers=100%'];
    return runJest(args, { ...process.env, ...urls, ...quickPasswords });
  });
  await stage('builds', () =>
    attempt(async () => {
      await ensureWebBuild();
      await ensureServerBuild();
      return true;
    }),
  );
  await stage('browser tests', () =>
    attempt(async () => {
      const environment = await startProduct();
      return runJest(['--selectProjects', 'e2e', '--runInBand'], environment);
    }),
  );
  return end();
});
