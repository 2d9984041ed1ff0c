/**
 * `npm run --silent verify -- file manifest [--key public.pem]`: tells whether an export and its
 * manifest are as they were signed, without network or database. Without `--key` the public key of
 * this checkout's own service is taken.
 */
const fs = require('node:fs');
const path = require('node:path');
const { parseArgs } = require('node:util');
const { Refusal, main, run } = require('./lib/lifecycle');
const { root, stateFolder } = require('./lib/paths');

function readArguments() {
  try {
    return parseArgs({ options: { key: { type: 'string' } }, allowPositionals: true });
  } catch (error) {
    throw new Refusal(`${error.message} Give: npm run verify -- file manifest [--key public.pem]`, {
      cause: error,
    });
  }
}

function existing(file, what) {
  if (!fs.existsSync(file)) throw new Refusal(`There is no ${what} at ${file}.`);
  return path.resolve(file);
}

main(async () => {
  const { values, positionals } = readArguments();
  if (positionals.length !== 2)
    throw new Refusal('Give the file and its manifest: npm run verify -- file manifest');
  const ownKey = path.join(stateFolder(), 'keys', 'chain-signing.public.pem');
  const key = existing(values.key ?? ownKey, 'public key (give one with --key)');
  const [file, manifest] = [existing(positionals[0], 'file'), existing(positionals[1], 'manifest')];
  const installed = await run(process.execPath, [path.join(__dirname, 'install.js')], {
    stdio: ['inherit', process.stderr.fd, 'inherit'],
  });
  if (installed !== 0) return installed;
  const script = path.join(root, 'server', 'verify-export.ts');
  return run(process.execPath, ['--require', 'tsx/cjs', script, '--key', key, file, manifest]);
});
