/** `npm run seed`: demonstration data into the database that the environment names. */
const { ensureInstalled } = require('./lib/install');
const { Refusal, main } = require('./lib/lifecycle');
const { ensureServerBuild } = require('./lib/server-build');
const { seedDatabase } = require('./lib/service');

main(async () => {
  if (!process.env.DATABASE_URL || !process.env.DATABASE_OWNER_URL)
    throw new Refusal(
      'Set DATABASE_URL (role app) and DATABASE_OWNER_URL (migrations) to the database to fill; npm start fills its own by itself.',
    );
  await ensureInstalled();
  await ensureServerBuild();
  await seedDatabase(process.env);
  return 0;
});
