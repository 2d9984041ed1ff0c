import { removeFolder } from './support/environment';
import { spawn } from 'node:child_process';
import { mkdtempSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { keyNamed } from '@/server/keys';

afterAll(removeFolder);

const folder = mkdtempSync(path.join(os.tmpdir(), 'driftless-keys-'));
afterAll(() => rmSync(folder, { recursive: true }));

const root = path.join(__dirname, '..', '..');

test('a key is made once, and only its owner may read it', () => {
  const keysDir = path.join(folder, 'once', 'keys');
  const key = keyNamed('access-token', keysDir);
  expect(key).toHaveLength(32);
  expect(keyNamed('access-token', keysDir)).toEqual(key);
  expect(keyNamed('another', keysDir)).not.toEqual(key);
  expect(statSync(keysDir).mode & 0o777).toBe(0o700);
  expect(statSync(path.join(keysDir, 'access-token.key')).mode & 0o777).toBe(0o600);
});

test('a file that holds no key is named', () => {
  writeFileSync(path.join(folder, 'broken.key'), 'half');
  expect(() => keyNamed('broken', folder)).toThrow('broken.key does not hold a key');
});

test('processes that start at once get one key', async () => {
  const keysDir = path.join(folder, 'raced');
  const program = `process.stdout.write(require('./server/keys').keyNamed('k', process.argv[1]).toString('hex'))`;
  const readKey = () =>
    new Promise<string>((resolve, reject) => {
      const args = ['--require', 'tsx/cjs', '-e', program, keysDir];
      const child = spawn(process.execPath, args, { cwd: root, env: { ...process.env } });
      let text = '';
      child.stdout.on('data', (chunk) => (text += String(chunk)));
      child.on('error', reject);
      child.on('close', () => resolve(text));
    });
  const keys = await Promise.all(Array.from({ length: 4 }, readKey));
  expect(keys[0]).toMatch(/^[0-9a-f]{64}$/);
  expect(new Set(keys).size).toBe(1);
  expect(readdirSync(keysDir)).toEqual(['k.key']);
}, 60_000);
