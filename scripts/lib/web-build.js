/** The pages: exported when anything that they are made from is new. */
const fs = require('node:fs');
const path = require('node:path');
const { takeCheckoutLock } = require('./install');
const { Refusal, run, say } = require('./lifecycle');
const { cacheFolder, root, webFolder } = require('./paths');
const { hashInputs, isMadeFrom, writeStamp } = require('./stamp');

const inputs = [
  'app',
  'components',
  'hooks',
  'constants',
  'shared',
  'pricing',
  'assets',
  'public',
  'types',
  'app.json',
  'babel.config.js',
  'metro.config.js',
  'tsconfig.json',
  'package.json',
  'package-lock.json',
  'scripts/web-unused.js',
  'scripts/without-descriptions.js',
  'scripts/zod-locales.js',
];

const expoCli = path.join(root, 'node_modules', 'expo', 'bin', 'cli');

/** Expo without network or questions; Metro keeps its cache in TMPDIR, so in this checkout. */
function expoEnvironment() {
  const temporary = path.join(cacheFolder, 'tmp');
  fs.mkdirSync(temporary, { recursive: true });
  return { ...process.env, EXPO_OFFLINE: '1', EXPO_NO_TELEMETRY: '1', TMPDIR: temporary };
}

async function ensureWebBuild() {
  const release = await takeCheckoutLock();
  try {
    const hash = hashInputs(root, inputs);
    if (isMadeFrom(webFolder, hash)) return;
    say('Exporting the pages (about a minute the first time).');
    const made = path.join(cacheFolder, 'export');
    fs.rmSync(made, { recursive: true, force: true });
    const code = await run(
      process.execPath,
      [expoCli, 'export', '--platform', 'web', '--output-dir', made],
      { env: { ...expoEnvironment(), CI: '1', NODE_ENV: 'production' } },
    );
    if (code !== 0 || !fs.existsSync(path.join(made, 'index.html')))
      throw new Refusal('The export of the pages failed; its message is above.');
    writeStamp(made, hash);
    fs.rmSync(webFolder, { recursive: true, force: true });
    fs.renameSync(made, webFolder);
  } finally {
    release();
  }
}

module.exports = { ensureWebBuild, expoCli, expoEnvironment };
