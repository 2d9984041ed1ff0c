/** Files of closes, good and bad: every problem by row and column, and not one row written. */
import { call, withServer } from './support/server';
import { tableState } from './support/table-state';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import { checkMarketFile, type MarketFileReport } from '@/shared/contracts/market-data';
import { makeShare, makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, type TestMember } from '../factories/people';

withServer();

let desk: Desk;
let wheat: Underlying;
let mill: Underlying;
let analyst: TestMember;

beforeAll(async () => {
  desk = await makeDesk();
  wheat = await makeUnderlying(desk, { symbol: 'WHEAT', name: 'A wheat' });
  mill = await makeShare(desk);
  await mill.update({ symbol: 'MILL' });
  analyst = await makeMember(desk, 'analyst');
});

const send = (bytes: Buffer) =>
  call(checkMarketFile, {
    params: { deskId: desk.id },
    token: analyst.token,
    body: { content: bytes.toString('base64') },
  });

async function check(file: string | Buffer): Promise<MarketFileReport> {
  const before = await tableState();
  const answer = await send(Buffer.from(file));
  expect(answer.status).toBe(200);
  expect(await tableState()).toEqual(before);
  return answer.body;
}

const headings = 'symbol,price,rate %,yield %,volatility %';
const fileOf = (...rows: string[]) => [headings, ...rows, ''].join('\r\n');

const placesOf = ({ problems }: MarketFileReport) =>
  problems.map(({ row, column, code }) => `${row} ${column ?? '-'} ${code}`);

test('a file in order comes back as numbers, percent read as such', async () => {
  const report = await check(fileOf('wheat,212.40,2.6,,24.5', 'MILL,38.6,2.6,2.8 %,31'));
  expect(report).toEqual({
    rowCount: 2,
    problems: [],
    problemCount: 0,
    missing: [],
    quotes: [
      {
        underlyingId: wheat.id,
        market: { spot: 212.4, rate: 0.026, carry: 'future', volatility: 0.245 },
      },
      {
        underlyingId: mill.id,
        market: { spot: 38.6, rate: 0.026, yield: 0.028, volatility: 0.31 },
      },
    ],
  });
});

test('a byte-order mark, blank lines, other orders and quoted cells do no harm', async () => {
  const text =
    '\ufeffPrice,Symbol,Volatility %,Rate %,Yield %\n\n"212.4","WHEAT",24.5,2.6,\n,,,,\n';
  const report = await check(text);
  expect(report).toMatchObject({ problemCount: 0, rowCount: 1, missing: ['MILL'] });
});

test.each<[string, string | Buffer, string[]]>([
  ['empty', '', ['0 - empty']],
  ['white space only', ' \r\n\r\n', ['0 - empty']],
  ['headings only', fileOf(), ['0 - empty']],
  ['binary', Buffer.from([0x00, 0x01, 0x02, 0xfe, 0x00]), ['0 - binary']],
  ['a workbook', Buffer.from([0x50, 0x4b, 0x03, 0x04, 0x14, 0x00]), ['0 - workbook']],
  ['UTF-16', Buffer.from(`\ufeff${fileOf('WHEAT,1,2,,3')}`, 'utf16le'), ['0 - encoding']],
  [
    'Latin-1',
    Buffer.from(fileOf('WHEAT,212.4,2.6,,24.5', 'M\u00dcHLE,1,2,3,4'), 'latin1'),
    ['3 - encoding'],
  ],
  [
    'semicolons and decimal commas',
    fileOf('WHEAT,212.4,2.6,,24.5').replaceAll(',', ';').replaceAll('.', ','),
    [
      '1 - semicolons',
      '2 price decimal-comma',
      '2 rate % decimal-comma',
      '2 volatility % decimal-comma',
    ],
  ],
  ['tabs', fileOf('WHEAT,212.4,2.6,,24.5').replaceAll(',', '\t'), ['1 - tabs']],
  ['quoted decimal commas', fileOf('WHEAT,"212,4",2.6,,24.5'), ['2 price decimal-comma']],
  ['bare decimal commas', fileOf('WHEAT,212,4,2,6,,24,5'), ['2 - too-many-cells']],
  [
    'formula cells',
    fileOf('=A1,1,2,,3', 'WHEAT,=B2*2,@SUM(A1),,+C1', 'MILL,38.6,-0.5,-1,31'),
    ['2 symbol formula', '3 price formula', '3 rate % formula', '3 volatility % formula'],
  ],
  [
    'headings twice, unknown and missing',
    'symbol,price,price,spread,yield %\nWHEAT,1,2,3,\n',
    [
      '1 price duplicate-heading',
      '1 spread unknown-column',
      '1 rate % missing-column',
      '1 volatility % missing-column',
    ],
  ],
  [
    'symbols unknown, twice and absent',
    fileOf('OATS,1,2,3,4', 'WHEAT,212.4,2.6,,24.5', 'wheat,212.4,2.6,,24.5', ',1,2,3,4'),
    ['2 symbol unknown-symbol', '4 symbol duplicate-symbol', '5 symbol missing'],
  ],
  [
    'cells empty, out of range and no numbers',
    fileOf('WHEAT,,2600,2.8,0', 'MILL,n/a,2.6,,31'),
    [
      '2 price not-accepted',
      '2 rate % not-accepted',
      '2 yield % not-accepted',
      '2 volatility % not-accepted',
      '3 price not-accepted',
      '3 yield % not-accepted',
    ],
  ],
  ['a quotation mark left open', fileOf('"WHEAT,212.4,2.6,,24.5'), ['2 - quotation-mark']],
])('%s: each problem at its place', async (_kind, file, places) => {
  const report = await check(file);
  expect(placesOf(report)).toEqual(places);
  expect(report.quotes).toEqual([]);
  expect(report.problemCount).toBe(places.length);
  for (const { message } of report.problems) expect(message).toMatch(/^[A-Z“].*\.$/);
});

test('a file without end lists the first problems and counts the rest', async () => {
  const rows = Array.from({ length: 900 }, (_, index) => `NONE-${index},1,2,,3`);
  const report = await check(fileOf(...rows));
  expect([report.problems.length, report.problemCount]).toEqual([200, 900]);
});

test.each([
  ['above 1 MB', 1_100_000],
  ['of 50 MB', 50_000_000],
])('a file %s is refused unread', async (_size, length) => {
  const answer = await send(Buffer.alloc(length, 'a'));
  expect([answer.status, answer.body.code]).toEqual([413, 'request-too-large']);
});

test('what is not base64 is refused at its field', async () => {
  const answer = await call(checkMarketFile, {
    params: { deskId: desk.id },
    token: analyst.token,
    body: { content: 'not base64!' },
  });
  expect([answer.status, answer.body.issues[0].path]).toEqual([422, 'content']);
});
