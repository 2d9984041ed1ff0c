/** The two Debian packages that npm cannot bring: PostgreSQL, and Chromium for the browser tests. */
const { spawnSync } = require('node:child_process');
const fs = require('node:fs');
const path = require('node:path');
const { Refusal, run, say } = require('./lifecycle');

const serverFolder = '/usr/lib/postgresql';
const clusterDefaults = '/etc/postgresql-common/createcluster.conf';
const chromium = '/usr/bin/chromium';

/** Major versions of PostgreSQL whose server is installed, newest first. */
function installedVersions() {
  if (!fs.existsSync(serverFolder)) return [];
  return fs
    .readdirSync(serverFolder)
    .filter((version) => fs.existsSync(path.join(serverFolder, version, 'bin', 'initdb')))
    .sort((a, b) => Number(b) - Number(a));
}

/** The folder of PostgreSQL's programs, of one major version or of the newest. */
function postgresPrograms(version = installedVersions()[0]) {
  const folder = path.join(serverFolder, String(version), 'bin');
  if (!fs.existsSync(path.join(folder, 'postgres')))
    throw new Refusal(
      `The database was made by PostgreSQL ${version}, which is no longer installed: apt-get install postgresql-${version}.`,
    );
  return folder;
}

async function aptGet(...args) {
  // dpkg's lock may be held by an upgrade of the machine: waiting is better than failing.
  const waiting = ['-o', 'DPkg::Lock::Timeout=900', '-o', 'Dpkg::Use-Pty=0', '-qq'];
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C.UTF-8' };
  return (await run('apt-get', [...waiting, ...args], { env })) === 0;
}

async function installPackages(...names) {
  return aptGet('install', '--yes', '--no-install-recommends', ...names);
}

/**
 * Installs the server without a cluster of the machine's own: Debian's package creates and starts
 * one at its first installation unless this file says no. The file is put back afterwards.
 */
async function installPostgres() {
  if (!(await installPackages('postgresql-common'))) return false;
  const before = fs.readFileSync(clusterDefaults, 'utf8');
  try {
    fs.writeFileSync(clusterDefaults, `${before}\ncreate_main_cluster = false\n`);
    return await installPackages('postgresql');
  } finally {
    fs.writeFileSync(clusterDefaults, before);
  }
}

async function ensurePackage(name, isInstalled, install) {
  if (isInstalled()) return;
  const asRoot = `apt-get update && apt-get install ${name}`;
  if (process.getuid() !== 0 || spawnSync('apt-get', ['--version']).error)
    throw new Refusal(`The Debian package ${name} is needed; as root: ${asRoot}`);
  say(`Installing the Debian package ${name} (apt-get).`);
  // Without a network the update fails, and the packages may still be in apt's own cache.
  if (!(await aptGet('update'))) say('apt-get update failed; trying the lists that are there.');
  if (!(await install()) || !isInstalled())
    throw new Refusal(`apt-get could not install ${name}; its message above says why.`);
}

const ensurePostgres = () =>
  ensurePackage('postgresql', () => installedVersions().length > 0, installPostgres);

const ensureChromium = () =>
  ensurePackage(
    'chromium',
    () => fs.existsSync(chromium),
    () => installPackages('chromium'),
  );

module.exports = { ensurePostgres, ensureChromium, postgresPrograms };
