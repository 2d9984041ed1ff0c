/** Where things lie: the checkout itself, what is made inside it, and what is kept outside. */
const crypto = require('node:crypto');
const fs = require('node:fs');
const os = require('node:os');
const path = require('node:path');

const root = fs.realpathSync(path.join(__dirname, '..', '..'));

/** Names a checkout's own folder outside of it: two checkouts never share a database. */
function checkoutHash(checkout) {
  return crypto.createHash('sha256').update(checkout).digest('hex').slice(0, 16);
}

/**
 * The folder of the database, its passwords and the server's keys.
 * @param {{ DRIFTLESS_DATA?: string }} environment
 */
function stateFolder(environment = process.env) {
  if (environment.DRIFTLESS_DATA) return path.resolve(environment.DRIFTLESS_DATA);
  const parent =
    process.getuid() === 0
      ? '/var/lib/driftless'
      : path.join(os.homedir(), '.local', 'state', 'driftless');
  return path.join(parent, checkoutHash(root));
}

module.exports = {
  root,
  cacheFolder: path.join(root, '.cache'),
  webFolder: path.join(root, 'dist'),
  buildFolder: path.join(root, 'build'),
  checkoutHash,
  stateFolder,
};
