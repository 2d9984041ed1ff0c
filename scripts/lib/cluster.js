/**
 * A PostgreSQL cluster of this checkout's own: made at the first start, listening on loopback
 * only, adopted when it outlived the launcher that started it.
 *
 * The server process gets two addresses of it. DATABASE_URL is the role `app`, which serves
 * requests. DATABASE_OWNER_URL is the cluster's superuser, which runs migrations as `SET ROLE
 * owner`; `owner` cannot sign in. Both roles are made here because their passwords are kept here;
 * the first migration makes them as well where a database comes from elsewhere.
 */
const { spawn, spawnSync } = require('node:child_process');
const crypto = require('node:crypto');
const fs = require('node:fs');
const path = require('node:path');
const { setTimeout: delay } = require('node:timers/promises');
const { postgresPrograms } = require('./debian');
const { Refusal, onStop, run, say } = require('./lifecycle');
const { host, probePort } = require('./ports');
const { commandLine, signal, waitForEnd } = require('./processes');

const superuser = 'postgres';
const database = 'driftless';

/** PostgreSQL refuses to run as root; then everything of it belongs to Debian's own user. */
function postgresUser() {
  if (process.getuid() !== 0) return {};
  const [uid, gid] = ['-u', '-g'].map((flag) =>
    Number(spawnSync('id', [flag, 'postgres'], { encoding: 'utf8' }).stdout),
  );
  return { uid, gid };
}

/** Makes a private folder; it belongs to PostgreSQL's user when there is one. */
function makePrivateFolder(folder, { uid, gid } = {}) {
  fs.mkdirSync(folder, { recursive: true, mode: 0o700 });
  fs.chmodSync(folder, 0o700);
  if (uid !== undefined) fs.chownSync(folder, uid, gid);
}

function checkReachable(folder, user) {
  const { status } = spawnSync('test', ['-x', folder], { ...user, cwd: '/' });
  if (status !== 0)
    throw new Refusal(
      `PostgreSQL’s user cannot reach ${folder}; set DRIFTLESS_DATA to a folder below one that all may enter, such as /var/lib.`,
    );
}

/** The cluster's passwords, made once; written whole or not at all. */
function readSecrets(folder) {
  const file = path.join(folder, 'secrets.json');
  if (!fs.existsSync(file)) {
    if (fs.existsSync(path.join(folder, 'postgres')))
      throw new Refusal(`${file} is missing, and the database beside it cannot be opened without.`);
    const password = () => crypto.randomBytes(24).toString('hex');
    const secrets = { [superuser]: password(), app: password() };
    fs.writeFileSync(`${file}.new`, JSON.stringify(secrets), { mode: 0o600 });
    fs.renameSync(`${file}.new`, file);
  }
  return JSON.parse(fs.readFileSync(file, 'utf8'));
}

/** Makes the data folder under another name first: under its own name it is always whole. */
async function makeData(folder, user, password) {
  const data = path.join(folder, 'postgres');
  if (fs.existsSync(data)) return;
  say('Making the database cluster.');
  const made = `${data}.new`;
  fs.rmSync(made, { recursive: true, force: true });
  const passwordFile = path.join(folder, 'initdb-password');
  fs.writeFileSync(passwordFile, password, { mode: 0o600 });
  if (user.uid !== undefined) fs.chownSync(passwordFile, user.uid, user.gid);
  const args = [
    '--encoding=UTF8',
    '--locale=C.UTF-8',
    '--auth=scram-sha-256',
    `--username=${superuser}`,
    `--pwfile=${passwordFile}`,
    '--no-instructions',
    `--pgdata=${made}`,
  ];
  const stdio = ['ignore', 'ignore', 'inherit'];
  const initdb = path.join(postgresPrograms(), 'initdb');
  const code = await run(initdb, args, { ...user, stdio, cwd: '/' });
  fs.rmSync(passwordFile);
  if (code !== 0) throw new Refusal('PostgreSQL’s initdb failed; its message above says why.');
  fs.renameSync(made, data);
}

/** The pid file of a data folder, as far as it is written. */
function readPidFile(data) {
  const file = path.join(data, 'postmaster.pid');
  if (!fs.existsSync(file)) return null;
  const lines = fs.readFileSync(file, 'utf8').split('\n');
  return { pid: Number(lines[0]), port: Number(lines[3]), status: (lines[7] ?? '').trim() };
}

/** The server that runs on a data folder; null when none does, whatever a crash left behind. */
function findServer(data) {
  const server = readPidFile(data);
  if (!server) return null;
  const words = commandLine(server.pid);
  return (words[0] ?? '').endsWith('/postgres') && words.includes(data) ? server : null;
}

/**
 * PostgreSQL itself replaces a pid file whose process is gone, after a look whether children of
 * that server still write. It refuses when the number now belongs to another program: then, and
 * only then, the file is removed here.
 */
function removeStalePidFile(data) {
  const left = readPidFile(data);
  if (left && !findServer(data) && commandLine(left.pid).length > 0)
    fs.rmSync(path.join(data, 'postmaster.pid'));
}

/** Waits for a running server to be ready, or to be gone; null when it is gone. */
async function settle(data, isOver = () => false) {
  for (;;) {
    const server = findServer(data);
    if (server?.status === 'ready') return server;
    if (!server && isOver()) return null;
    await delay(50);
  }
}

function launch(folder, user, port, settings) {
  const data = path.join(folder, 'postgres');
  const version = fs.readFileSync(path.join(data, 'PG_VERSION'), 'utf8').trim();
  const options = {
    port,
    listen_addresses: host,
    unix_socket_directories: '',
    timezone: 'UTC',
    log_timezone: 'UTC',
    ...settings,
  };
  const args = Object.entries(options).flatMap(([name, value]) => ['-c', `${name}=${value}`]);
  const log = fs.openSync(path.join(folder, 'postgres.log'), 'w', 0o600);
  const child = spawn(path.join(postgresPrograms(version), 'postgres'), ['-D', data, ...args], {
    ...user,
    cwd: '/',
    detached: true,
    stdio: ['ignore', log, log],
  });
  fs.closeSync(log);
  child.unref();
  return child;
}

/** Starts the server, a few times over: a port may be snatched, a killed server's last children linger. */
async function startServer(folder, user, settings) {
  const data = path.join(folder, 'postgres');
  for (let attempt = 1; attempt <= 5; attempt += 1) {
    removeStalePidFile(data);
    const child = launch(folder, user, await probePort(0), settings);
    let failure = null;
    child.once('error', (error) => (failure = error));
    const server = await settle(data, () => failure !== null || child.exitCode !== null);
    if (server) return server;
    if (failure) throw failure;
    await delay(500);
  }
  const log = fs.readFileSync(path.join(folder, 'postgres.log'), 'utf8').trim();
  throw new Refusal(`PostgreSQL does not start; its last words:\n${log.slice(-2000)}`);
}

/** Runs SQL as the superuser; gives what it prints. Nothing secret is on a command line. */
function query({ port, password, name }, sql) {
  const { status, stdout, stderr } = spawnSync(
    path.join(postgresPrograms(), 'psql'),
    ['--no-psqlrc', '--no-password', '--quiet', '--tuples-only', '--set=ON_ERROR_STOP=1'],
    {
      cwd: '/',
      encoding: 'utf8',
      input: sql,
      env: {
        PGHOST: host,
        PGPORT: port,
        PGUSER: superuser,
        PGPASSWORD: password,
        PGDATABASE: name,
      },
    },
  );
  if (status !== 0) throw new Error(`psql: ${stderr}`);
  return stdout.trim();
}

function makeRoles(port, secrets) {
  const admin = { port, password: secrets[superuser], name: 'postgres' };
  const role = (name, attributes) =>
    `do $$ begin
       if not exists (select from pg_roles where rolname = '${name}') then create role ${name}; end if;
     end $$;
     alter role ${name} nosuperuser nocreatedb nocreaterole ${attributes};`;
  query(admin, role('owner', 'nologin') + role('app', `login password '${secrets.app}'`));
  if (query(admin, `select 1 from pg_database where datname = '${database}'`) === '')
    query(admin, `create database ${database} owner owner`);
}

async function stopServer(data) {
  const server = findServer(data);
  if (!server) return;
  // SIGINT is PostgreSQL's fast stop, SIGQUIT the immediate one, from which it recovers.
  signal(server.pid, 'SIGINT');
  if (await waitForEnd(server.pid, 2000)) return;
  signal(server.pid, 'SIGQUIT');
  if (!(await waitForEnd(server.pid, 1000))) signal(server.pid, 'SIGKILL');
}

/** Starts or adopts the cluster of a folder, and stops it with this launcher. */
async function startCluster(givenFolder, settings = {}) {
  const user = postgresUser();
  makePrivateFolder(givenFolder, user);
  // One name for one folder: a running server is recognised by it.
  const folder = fs.realpathSync(givenFolder);
  if (user.uid !== undefined) checkReachable(folder, user);
  const secrets = readSecrets(folder);
  await makeData(folder, user, secrets[superuser]);
  const data = path.join(folder, 'postgres');
  onStop(() => stopServer(data));
  const running = findServer(data) ? await settle(data, () => true) : null;
  if (running) say('The database of an earlier start still runs; using it.');
  const server = running ?? (await startServer(folder, user, settings));
  makeRoles(server.port, secrets);
  const address = (role) =>
    `postgres://${role}:${secrets[role]}@${host}:${server.port}/${database}`;
  return { pid: server.pid, appUrl: address('app'), ownerUrl: address(superuser) };
}

module.exports = { findServer, makePrivateFolder, startCluster, stopServer };
