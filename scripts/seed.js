/** `npm run seed`: demonstration data into the database that the environment names. */
const { makeKeysFolder, openDatabase } = require('./lib/home');
const { ensureInstalled } = require('./lib/install');
const { Refusal, main } = require('./lib/lifecycle');
const { stateFolder } = require('./lib/paths');
const { ensureServerBuild } = require('./lib/server-build');
const { seedDatabase, serviceEnvironment } = require('./lib/service');

main(async () => {
  if (!process.env.DATABASE_URL)
    throw new Refusal(
      'Set DATABASE_URL (role app) and DATABASE_OWNER_URL (migrations) to the database to fill; npm start fills its own by itself.',
    );
  const folder = stateFolder();
  const database = await openDatabase(folder);
  await ensureInstalled();
  await ensureServerBuild();
  const keysFolder = makeKeysFolder(folder);
  await seedDatabase(serviceEnvironment({ database, keysFolder, port: 0 }));
  return 0;
});
