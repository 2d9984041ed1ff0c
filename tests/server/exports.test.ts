/** Files of the history: what stands in them, what they are signed with, what gives a forgery away. */
import { asSuperuser, testEnvironment } from './support/environment';
import { workOff } from './support/queue';
import { call, withServer } from './support/server';
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import ExcelJS from 'exceljs';
import { exportColumns } from '@/server/exports/columns';
import { csvLine } from '@/server/exports/csv';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import {
  createExport,
  getExport,
  getExportFile,
  listExports,
  type ExportFormat,
  type HistoryExport,
  type Manifest,
} from '@/shared/contracts/exports';
import type { HistoryFilter } from '@/shared/contracts/history';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';
import { storeValuations, valuationBody, valuationPair } from '../factories/valuations';

withServer();

let desk: Desk;
let auditor: TestMember;
let wheat: Underlying;
let folder: string;

beforeAll(async () => {
  desk = await makeDesk();
  auditor = await makeMember(desk, 'auditor');
  wheat = await makeUnderlying(desk, { symbol: '=WHT' });
  const days = ['27', '28', '29', '30'];
  for (const day of days)
    await storeValuations(desk, [
      ...valuationPair(wheat, { valuedAt: `2026-11-${day}T16:30:00.000Z`, bookCode: '-GRAIN' }),
    ]);
  await storeValuations(desk, [
    valuationBody(wheat, {
      valuedAt: '2026-11-26T16:30:00.000Z',
      tradeNumber: 'T-0002',
      result: { ok: false, code: 'numerical-failure', path: '', message: 'No value.' },
    }),
  ]);
  folder = mkdtempSync(path.join(os.tmpdir(), 'driftless-export-'));
});

/** Made once: every row of it is looked at by several tests. */
let csv: Made;
beforeAll(async () => {
  csv = await make('csv');
});

afterAll(() => rmSync(folder, { recursive: true, force: true }));

const asAuditor = () => ({ params: { deskId: desk.id }, token: auditor.token });

async function ask(format: ExportFormat, filter: HistoryFilter = {}): Promise<HistoryExport> {
  const answer = await call(createExport, { ...asAuditor(), body: { format, filter } });
  expect({ status: answer.status, issues: answer.body.issues }).toEqual({ status: 201 });
  return answer.body;
}

type Made = { bytes: Buffer; manifest: Manifest };

async function make(format: ExportFormat, filter: HistoryFilter = {}): Promise<Made> {
  const { id } = await ask(format, filter);
  await workOff();
  const params = { deskId: desk.id, exportId: id };
  const { body } = await call(getExport, { params, token: auditor.token });
  expect(body).toMatchObject({ status: 'ready', done: body.total });
  const file = await call(getExportFile, { params, token: auditor.token });
  expect(file.body.fileName).toBe(body.manifest.fileName);
  return { bytes: Buffer.from(file.body.base64, 'base64'), manifest: body.manifest };
}

const linesOf = (bytes: Buffer) => bytes.toString('utf8').split('\r\n');
const columnAt = (name: string) => exportColumns.findIndex((column) => column.name === name);

test('CSV: a heading, then a row a value, newest first', () => {
  const { bytes, manifest } = csv;
  const [heading, ...rows] = linesOf(bytes);
  expect(heading).toBe(exportColumns.map(({ name }) => name).join(','));
  expect(rows.pop()).toBe('');
  expect(rows.map((row) => row.slice(0, 10))).toEqual([
    '2026-11-30',
    '2026-11-29',
    '2026-11-28',
    '2026-11-27',
    '2026-11-26',
  ]);
  expect(manifest).toMatchObject({
    rows: 5,
    bytes: bytes.length,
    chain: { firstPosition: 1, lastPosition: 9, headPosition: 9 },
    madeBy: auditor.user.id,
  });
});

test('CSV: numbers are the stored doubles, to the last bit', () => {
  const { result } = valuationBody(wheat);
  const cells = linesOf(csv.bytes)[1].split(',');
  expect(Number(cells[columnAt('value')])).toBe(result.ok ? result.value : null);
  expect(Number(cells[columnAt('theta')])).toBe(result.ok ? result.greeks.theta : null);
});

test('CSV: a text that begins like a formula is prefixed, a negative number is not', () => {
  const cells = linesOf(csv.bytes)[1].split(',');
  expect(cells[columnAt('underlying')]).toBe("'=WHT");
  expect(cells[columnAt('book')]).toBe("'-GRAIN");
  expect(cells[columnAt('delta')]).toMatch(/^-0\.\d+$/);
});

test.each([
  ['=1+1', "'=1+1"],
  ['+1', "'+1"],
  ['-1', "'-1"],
  ['@SUM(A1)', "'@SUM(A1)"],
  ['\t=1', "'\t=1"],
  ['\r=1', '"\'\r=1"'],
  ['=HYPERLINK("x","y")', '"\'=HYPERLINK(""x"",""y"")"'],
  ['two, "three"', '"two, ""three"""'],
  ['two\nlines', '"two\nlines"'],
  ['a=b', 'a=b'],
  [-1.5, '-1.5'],
  [1e-7, '1e-7'],
  [null, ''],
  [true, 'true'],
  [new Date('2026-11-30T16:30:00Z'), '2026-11-30T16:30:00.000Z'],
])('CSV writes %j as %j', (cell, text) => {
  expect(csvLine([cell])).toBe(`${text}\r\n`);
});

test('XLSX: read again, every cell has its type, and the heading stays in sight', async () => {
  const { bytes, manifest } = await make('xlsx');
  const workbook = new ExcelJS.Workbook();
  await workbook.xlsx.load(
    bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length) as ArrayBuffer,
  );
  const sheet = workbook.getWorksheet('Values');
  if (!sheet) throw new Error('The workbook has no values.');
  expect(sheet.rowCount).toBe(manifest.rows + 1);
  expect(sheet.views[0]).toMatchObject({ state: 'frozen', ySplit: 1 });
  const cell = (row: number, name: string) => sheet.getRow(row).getCell(columnAt(name) + 1);
  const { result } = valuationBody(wheat);
  expect(cell(2, 'value').value).toBe(result.ok ? result.value : null);
  expect(cell(2, 'value').type).toBe(ExcelJS.ValueType.Number);
  expect(cell(2, 'valued_at').value).toEqual(new Date('2026-11-30T16:30:00.000Z'));
  expect(cell(2, 'valued_at').type).toBe(ExcelJS.ValueType.Date);
  expect(cell(2, 'underlying').value).toBe('=WHT');
  expect(cell(2, 'underlying').type).toBe(ExcelJS.ValueType.String);
  expect(cell(2, 'refuted').value).toBe(false);
  expect(cell(6, 'value').type).toBe(ExcelJS.ValueType.Null);
  expect(cell(6, 'failure').value).toBe('numerical-failure');
  expect(workbook.getWorksheet('About')?.getColumn(1).values).toContain('caution');
});

test('a filter that nothing fits gives a file with a heading only', async () => {
  const { bytes, manifest } = await make('csv', { trade: 'T-9999' });
  expect(linesOf(bytes)).toHaveLength(2);
  expect(manifest).toMatchObject({
    rows: 0,
    filter: { trade: 'T-9999' },
    chain: { firstPosition: null, lastPosition: null },
  });
});

test('what was stored after the export was asked for is not part of it', async () => {
  const other = await makeDesk();
  const { token } = await makeMember(other, 'auditor');
  const underlying = await makeUnderlying(other);
  await storeValuations(other, [...valuationPair(underlying)]);
  const body = { format: 'csv', filter: {} };
  const params = { deskId: other.id };
  const { id } = (await call(createExport, { params, body, token })).body;
  await storeValuations(other, [...valuationPair(underlying)]);
  await workOff();
  const { manifest } = (await call(getExport, { params: { ...params, exportId: id }, token })).body;
  expect(manifest).toMatchObject({ rows: 1, chain: { lastPosition: 1, headPosition: 4 } });
});

test('the heads are signed when a file is made', async () => {
  const { manifest } = csv;
  const anchors = await asSuperuser<{ hash: string; purpose: string }>(
    'SELECT hash, purpose FROM chain_anchors WHERE chain = $1 ORDER BY signed_at LIMIT 1',
    [manifest.chain.name],
  );
  expect(anchors).toEqual([{ hash: manifest.chain.headHash, purpose: 'export' }]);
});

test('the list names every export, and a file that is not ready is not found', async () => {
  const { id } = await ask('csv');
  const list = await call(listExports, asAuditor());
  expect(list.body.items[0]).toMatchObject({ id, status: 'queued', manifest: null });
  const params = { deskId: desk.id, exportId: id };
  expect((await call(getExportFile, { params, token: auditor.token })).status).toBe(404);
  await workOff();
  expect((await call(getExportFile, { params, token: auditor.token })).status).toBe(200);
});

describe('checked offline with the command', () => {
  const pathOf = (name: string) => path.join(folder, name);

  function verify(file: Buffer, manifest: object, key = 'chain-signing.public.pem') {
    writeFileSync(pathOf('file'), file);
    writeFileSync(pathOf('manifest.json'), JSON.stringify(manifest, null, 2));
    const script = path.resolve('scripts/verify.js');
    const keyFile = path.resolve(testEnvironment.DRIFTLESS_KEYS_DIR, key);
    const { status, stdout, stderr } = spawnSync(
      process.execPath,
      [script, '--key', keyFile, pathOf('file'), pathOf('manifest.json')],
      { encoding: 'utf8', env: { NODE_ENV: 'test', PATH: process.env.PATH } },
    );
    return { status, said: stdout || stderr };
  }

  test('the file and manifest as they were made', () => {
    expect(verify(csv.bytes, csv.manifest)).toEqual({
      status: 0,
      said: 'The file is the one that was signed.\n',
    });
  });

  test('one digit of the file changed', () => {
    const text = csv.bytes.toString('utf8');
    const at = text.indexOf('212.4');
    const changed = Buffer.from(`${text.slice(0, at)}212.5${text.slice(at + 5)}`);
    const { status, said } = verify(changed, csv.manifest);
    expect({ status, said }).toEqual({
      status: 1,
      said: 'The file was changed after it was written: its SHA-256 does not fit.\n',
    });
  });

  test.each([
    ['the count of rows', (manifest: Manifest) => ({ ...manifest, rows: 4 })],
    ['the hash', (manifest: Manifest) => ({ ...manifest, sha256: 'a'.repeat(64) })],
    ['the filter', (manifest: Manifest) => ({ ...manifest, filter: { trade: 'T-0001' } })],
    ['who made it', (manifest: Manifest) => ({ ...manifest, madeBy: manifest.exportId })],
  ])('%s in the manifest changed', (_what, change) => {
    const { status, said } = verify(csv.bytes, change(csv.manifest));
    expect(status).toBe(1);
    expect(said).toContain('its signature does not fit');
  });
});
