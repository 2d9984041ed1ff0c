/** The batch command, as a program of its own: what goes in, what comes out, and nothing else. */
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { price } from '@/pricing/index';
import european from '@/tests/reference/european.json';

const root = path.resolve(__dirname, '..', '..');
let folder: string;

beforeAll(() => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'value-'));
});
afterAll(() => fs.rmSync(folder, { recursive: true }));

function valueOf(content: string) {
  const file = path.join(folder, 'cases.json');
  fs.writeFileSync(file, content);
  const script = path.join(root, 'scripts', 'value.ts');
  const env = { ...process.env, INIT_CWD: folder };
  const args = ['--require', 'tsx/cjs', script, 'cases.json'];
  return spawnSync(process.execPath, args, { cwd: root, env, encoding: 'utf8' });
}

it('values each case in order, and gives failures their place', () => {
  const good = european.cases.slice(0, 5).map(({ id, request }) => ({ id, request }));
  const bad = { id: 'bad', request: { contract: {}, market: {} } };
  const { status, stdout, stderr } = valueOf(JSON.stringify([...good, bad, 7]));
  expect(stderr).toBe('');
  expect(status).toBe(0);
  const expected = [...good, bad].map(({ id, request }) => ({ id, result: price(request) }));
  expect(JSON.parse(stdout)).toEqual([...expected, { id: null, result: price(7) }]);
});

it.each(['{}', 'not JSON'])('refuses a file that holds %s', (content) => {
  const { status, stdout, stderr } = valueOf(content);
  expect(status).toBe(1);
  expect(stdout).toBe('');
  expect(stderr).not.toBe('');
});
