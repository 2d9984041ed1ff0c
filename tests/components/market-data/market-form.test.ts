/** What becomes of cells that come from a spreadsheet. */
import {
  cellName,
  fieldOfIssue,
  gridDefaults,
  marketValues,
  readGrid,
  readPasted,
  sampleFile,
} from '@/components/market-data/market-form';
import { share, wheat } from '../../hooks/ticket-examples';

const underlyings = [wheat, share];
const market = { spot: 212.4, rate: 0.026, carry: 'future', volatility: 0.245 } as const;
const quotes = [{ underlyingId: wheat.id, market }];

describe('the grid', () => {
  test('leaves out rows that nobody has touched, and reads the others whole', () => {
    const values = gridDefaults('2026-11-30', underlyings, quotes);
    const { symbol } = wheat;
    expect(readGrid(values, underlyings)).toEqual({
      quotes: [{ underlyingId: wheat.id, symbol, market }],
      errors: {},
    });
    const begun = { ...values, date: '30.11.2026', [cellName(share.id, 'price')]: '38.6' };
    expect(Object.keys(readGrid(begun, underlyings).errors)).toEqual([
      'date',
      cellName(share.id, 'rate'),
      cellName(share.id, 'yield'),
      cellName(share.id, 'volatility'),
    ]);
  });

  test('finds the cell of a complaint of the server', () => {
    const draft = { date: '2026-11-30', source: 'typed', quotes, confirmedWarnings: [] } as const;
    const at = (path: string) =>
      fieldOfIssue(
        { path, code: '', message: '' },
        { ...draft, quotes: [...quotes], confirmedWarnings: [] },
      );
    expect(at('quotes.0.market.spot')).toBe(cellName(wheat.id, 'price'));
    expect(at('quotes.0.underlyingId')).toBe(cellName(wheat.id, 'price'));
    expect(at('date')).toBe('date');
    expect(at('confirmedWarnings')).toBeNull();
  });
});

describe('pasting', () => {
  const at = cellName(wheat.id, 'price');

  test('one cell is the browser’s own business', () => {
    expect(readPasted('212,4\r\n', underlyings, at)).toBeNull();
  });

  test('rows that begin with a symbol find their place, whatever their order', () => {
    const text = `${share.symbol}\t38,6\t2,6\t2,8\t31\r\n${wheat.symbol.toLowerCase()}\t212,4\t2,6\t\t24,5\r\nOATS\t1\t2\t3\t4\r\n`;
    const pasted = readPasted(text, underlyings, at);
    expect(pasted).toMatchObject({ rowCount: 2, unknown: ['OATS'] });
    const values = { ...gridDefaults('2026-11-30', underlyings, []), ...pasted?.values };
    expect(readGrid(values, underlyings).quotes).toMatchObject([
      { market },
      { market: { spot: 38.6, rate: 0.026, yield: 0.028, volatility: 0.31 } },
    ]);
  });

  test('headings say which column is which', () => {
    const text = `symbol\tvolatility %\tprice\n${wheat.symbol}\t24.5\t212.4`;
    expect(readPasted(text, underlyings, at)?.values).toEqual({
      [cellName(wheat.id, 'volatility')]: '24.5',
      [cellName(wheat.id, 'price')]: '212.4',
    });
  });

  test('bare numbers go right and down from their cell, and not beyond the grid', () => {
    const text = '2.6\t\t24.5\n2.7\t2.8\t31\n9\t9\t9';
    expect(readPasted(text, underlyings, cellName(wheat.id, 'rate'))).toEqual({
      rowCount: 2,
      unknown: [],
      values: {
        [cellName(wheat.id, 'rate')]: '2.6',
        [cellName(wheat.id, 'yield')]: '',
        [cellName(wheat.id, 'volatility')]: '24.5',
        [cellName(share.id, 'rate')]: '2.7',
        [cellName(share.id, 'yield')]: '2.8',
        [cellName(share.id, 'volatility')]: '31',
      },
    });
  });
});

test('the sample file holds every underlying with what is in the grid', () => {
  const values = { ...gridDefaults('2026-11-30', underlyings, []), ...marketValues(quotes) };
  expect(sampleFile(underlyings, values)).toBe(
    [
      'symbol,price,rate %,yield %,volatility %',
      `${wheat.symbol},212.4,2.6,,24.5`,
      `${share.symbol},,,,`,
      '',
    ].join('\r\n'),
  );
});
