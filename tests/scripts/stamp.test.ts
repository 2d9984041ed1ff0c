/** When something counts as made from these inputs, and when it has to be made again. */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { hashInputs, isMadeFrom, writeStamp } from '@/scripts/lib/stamp';

let base: string;

function write(name: string, content: string) {
  fs.mkdirSync(path.dirname(path.join(base, name)), { recursive: true });
  fs.writeFileSync(path.join(base, name), content);
}

beforeEach(() => {
  base = fs.mkdtempSync(path.join(os.tmpdir(), 'driftless-stamp-'));
  write('source/a.ts', 'one');
  write('source/deep/b.ts', 'two');
  write('lock.json', '{}');
});

afterEach(() => fs.rmSync(base, { recursive: true }));

const hash = () => hashInputs(base, ['source', 'lock.json', 'absent']);

test('the same content in another folder has the same hash', () => {
  const copy = fs.mkdtempSync(path.join(os.tmpdir(), 'driftless-stamp-'));
  fs.cpSync(base, copy, { recursive: true });
  expect(hashInputs(copy, ['source', 'lock.json', 'absent'])).toBe(hash());
  fs.rmSync(copy, { recursive: true });
});

test.each([
  ['a changed file', () => write('source/deep/b.ts', 'two!')],
  ['a new file', () => write('source/c.ts', '')],
  ['a removed file', () => fs.rmSync(path.join(base, 'source/a.ts'))],
  [
    'a renamed file',
    () => fs.renameSync(path.join(base, 'source/a.ts'), path.join(base, 'source/z.ts')),
  ],
  [
    'text moved from one file to the next',
    () => {
      write('source/a.ts', 'onetw');
      write('source/deep/b.ts', 'o');
    },
  ],
  ['an input that appears', () => write('absent', '')],
])('%s gives another hash', (_, change) => {
  const before = hash();
  change();
  expect(hash()).not.toBe(before);
});

test('a folder counts as made only with the stamp of the same inputs', () => {
  const made = path.join(base, 'made');
  expect(isMadeFrom(made, hash())).toBe(false);
  fs.mkdirSync(made);
  expect(isMadeFrom(made, hash())).toBe(false);
  writeStamp(made, hash());
  expect(isMadeFrom(made, hash())).toBe(true);
  write('lock.json', '{ }');
  expect(isMadeFrom(made, hash())).toBe(false);
});
