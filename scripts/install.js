/** The packages alone: for a launcher that must keep what the installation prints out of its own. */
const { ensureInstalled } = require('./lib/install');
const { main } = require('./lib/lifecycle');

main(async () => {
  await ensureInstalled();
  return 0;
});
