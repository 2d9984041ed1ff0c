/** The server: bundled when anything that it is made from is new. */
const fs = require('node:fs');
const path = require('node:path');
const { takeCheckoutLock } = require('./install');
const { Refusal, say } = require('./lifecycle');
const { buildFolder, cacheFolder, root } = require('./paths');
const { hashInputs, isMadeFrom, writeStamp } = require('./stamp');

const inputs = [
  'server',
  'shared',
  'pricing',
  'scripts/lib/server-build.js',
  'tsconfig.json',
  'package.json',
  'package-lock.json',
];

/** Each worker thread is an entry of its own, beside the two commands. */
function entryPoints() {
  const threads = fs.readdirSync(path.join(root, 'server', 'threads'));
  return ['server/main.ts', 'server/seed.ts', ...threads.map((name) => `server/threads/${name}`)];
}

async function bundle(folder) {
  // Required here: the package is there only once the packages are installed.
  const esbuild = require('esbuild');
  try {
    await esbuild.build({
      absWorkingDir: root,
      entryPoints: entryPoints(),
      outbase: '.',
      outdir: folder,
      bundle: true,
      platform: 'node',
      target: 'node20',
      format: 'cjs',
      packages: 'external',
      sourcemap: true,
      logLevel: 'warning',
    });
  } catch (error) {
    throw new Refusal('The server could not be built; the messages above say why.', {
      cause: error,
    });
  } finally {
    await esbuild.stop();
  }
}

async function ensureServerBuild() {
  const release = await takeCheckoutLock();
  try {
    const hash = hashInputs(root, inputs);
    if (isMadeFrom(buildFolder, hash)) return;
    say('Building the server.');
    const made = path.join(cacheFolder, 'server-build');
    fs.rmSync(made, { recursive: true, force: true });
    await bundle(made);
    writeStamp(made, hash);
    fs.rmSync(buildFolder, { recursive: true, force: true });
    fs.renameSync(made, buildFolder);
  } finally {
    release();
  }
}

module.exports = { ensureServerBuild };
