/**
 * A database, a folder of keys and a web export of this test file's own. Imported before anything
 * of the server, which reads its environment as it loads.
 */
import { randomBytes } from 'node:crypto';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { Client } from 'pg';

const appUrl = process.env.DATABASE_URL;
const ownerUrl = process.env.DATABASE_OWNER_URL;
if (!appUrl || !ownerUrl)
  throw new Error(
    'Set DATABASE_URL and DATABASE_OWNER_URL to a cluster for tests; npm test starts one by itself.',
  );

export const adminUrl = ownerUrl;

export const databaseName = `driftless_test_${randomBytes(6).toString('hex')}`;

export function withDatabase(url: string, name: string): string {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  return changed.href;
}

const folder = mkdtempSync(path.join(os.tmpdir(), 'driftless-server-'));
const webDir = path.join(folder, 'web');

/** A page that is told from any other by its text. */
export const indexHtml = '<!doctype html><title>The test’s own page</title>';

function makeWebExport() {
  const scripts = path.join(webDir, '_expo', 'static', 'js', 'web');
  mkdirSync(scripts, { recursive: true });
  writeFileSync(path.join(webDir, 'index.html'), indexHtml);
  writeFileSync(path.join(webDir, 'favicon.svg'), '<svg xmlns="http://www.w3.org/2000/svg"/>');
  writeFileSync(path.join(scripts, 'entry-0123456789abcdef.js'), '"use strict";');
}

makeWebExport();

export const testEnvironment = {
  DATABASE_URL: withDatabase(appUrl, databaseName),
  DATABASE_OWNER_URL: withDatabase(ownerUrl, databaseName),
  DRIFTLESS_KEYS_DIR: path.join(folder, 'keys'),
  DRIFTLESS_WEB_DIR: webDir,
  DRIFTLESS_CHECKOUT: process.cwd(),
  PORT: '0',
  LOG_LEVEL: 'error',
  PASSWORD_COST: '4',
};
Object.assign(process.env, testEnvironment);

/** Runs SQL as the cluster's superuser, in this file's database unless another is named. */
export async function asSuperuser<Row extends object>(
  sql: string,
  values: readonly unknown[] = [],
  name = databaseName,
): Promise<Row[]> {
  const client = new Client({ connectionString: withDatabase(adminUrl, name) });
  await client.connect();
  try {
    const { rows } = await client.query<Row>(sql, [...values]);
    return rows;
  } finally {
    await client.end();
  }
}

const maintenanceName = 'postgres';

export const createEmptyDatabase = (name = databaseName) =>
  asSuperuser(`CREATE DATABASE ${name}`, [], maintenanceName);

export const dropDatabase = (name = databaseName) =>
  asSuperuser(`DROP DATABASE IF EXISTS ${name} WITH (FORCE)`, [], maintenanceName);

export const removeFolder = () => rmSync(folder, { recursive: true, force: true });
