/** Where a checkout keeps its database: its own place, unless the environment names one. */
import os from 'node:os';
import path from 'node:path';
import { checkoutHash, root, stateFolder } from '@/scripts/lib/paths';

test('the environment names the folder, made absolute', () => {
  expect(stateFolder({ DRIFTLESS_DATA: '/srv/desk' })).toBe('/srv/desk');
  expect(path.isAbsolute(stateFolder({ DRIFTLESS_DATA: 'desk' }))).toBe(true);
});

test('else it is outside the checkout and named after it', () => {
  const folder = stateFolder({});
  expect(path.basename(folder)).toBe(checkoutHash(root));
  expect(folder.startsWith(`${root}/`)).toBe(false);
  expect([os.homedir(), '/var/lib'].some((parent) => folder.startsWith(parent))).toBe(true);
});

test('two checkouts never share one', () => {
  expect(checkoutHash('/srv/one')).not.toBe(checkoutHash('/srv/two'));
});
