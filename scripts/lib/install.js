/** The packages of the lock file, installed when it is new. */
const fs = require('node:fs');
const path = require('node:path');
const { Refusal, run, say } = require('./lifecycle');
const { takeLock } = require('./lock');
const { cacheFolder, root } = require('./paths');
const { hashInputs, isMadeFrom, writeStamp } = require('./stamp');

/** What is made inside the checkout is made by one process at a time. */
function takeCheckoutLock() {
  return takeLock(path.join(cacheFolder, 'make.lock'), () =>
    say('Waiting for another command of this checkout to finish its preparations.'),
  );
}

async function ensureInstalled() {
  const packages = path.join(root, 'node_modules');
  const release = await takeCheckoutLock();
  try {
    const hash = hashInputs(root, ['package.json', 'package-lock.json']);
    if (isMadeFrom(packages, hash)) return;
    say('Installing the packages of package-lock.json (npm ci).');
    const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'];
    if ((await run('npm', args)) !== 0)
      throw new Refusal('npm ci failed; its message above says why.');
    fs.mkdirSync(packages, { recursive: true });
    writeStamp(packages, hash);
  } finally {
    release();
  }
}

module.exports = { ensureInstalled, takeCheckoutLock };
