import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { HistoryListScreen } from '@/components/history/history-list-screen';
import { ValueScreen } from '@/components/history/value-screen';
import { historyText, valueText } from '@/constants/texts/history';
import { recomputeText } from '@/constants/texts/recompute';
import { engineVersion, price } from '@/pricing/index';
import type { ValuationBody } from '@/shared/contracts/chain-bodies';
import type { HistoryExport } from '@/shared/contracts/exports';
import type { HistoryRow, HistoryValue } from '@/shared/contracts/history';
import { playDialogs, playWindow } from '../browser';
import { saying } from '../saying';
import { desk, wheat } from '../../hooks/ticket-examples';

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));
jest.mock('@/hooks/pricing-thread', () => jest.requireActual('../play-thread'));

jest.setTimeout(60_000);

const id = (digit: number) => `${digit}0000000-0000-4000-8000-000000000000`;
const auditor = { ...desk, permissions: ['read-desk' as const, 'export-history' as const] };

function bodyOf(day: number, fields: Partial<ValuationBody> = {}): ValuationBody {
  const method = { name: 'closed-form' as const };
  const request: ValuationBody['request'] = {
    contract: { payoff: 'vanilla', exercise: 'european', kind: 'put', strike: 210, expiry: 0.5 },
    market: { spot: 210 + day, rate: 0.03, carry: 'future', volatility: 0.245 },
    method,
  };
  return {
    kind: 'valuation',
    runId: id(1),
    runNumber: 'R-0007',
    tradeId: id(2),
    tradeNumber: 'T-0012',
    tradeVersionId: id(3),
    route: method.name,
    role: 'primary',
    request,
    result: price(request),
    engine: engineVersion,
    snapshotId: id(4),
    policyId: id(5),
    valuedAt: `2026-11-${10 + day}T16:30:00.000Z`,
    underlyingId: wheat.id,
    bookId: id(6),
    bookCode: 'GRAIN',
    tolerance: 0.01,
    verdict: 'agree',
    refuted: false,
    ...fields,
  };
}

const hash = (digit: string) => digit.repeat(64);

const rows: HistoryRow[] = [3, 2, 1].map((day) => ({
  position: 2 * day,
  hash: hash('a'),
  underlying: wheat,
  body: bodyOf(day, day === 2 ? { verdict: 'disagree' } : {}),
  check: null,
}));

const valueWith = (body: ValuationBody): HistoryValue => ({
  underlying: wheat,
  valuations: [
    { position: 6, at: '2026-11-13T17:00:00.000001Z', previous: hash('b'), hash: hash('a'), body },
  ],
  records: [
    {
      position: 3,
      at: '2026-11-12T09:00:00.000001Z',
      previous: hash('c'),
      hash: hash('d'),
      by: { id: id(7), name: 'Desk head' },
      body: {
        kind: 'approval',
        event: 'approved',
        subject: { type: 'trade-version', id: id(3) },
        by: id(7),
        reason: 'Within the limits of the book',
        details: {},
      },
    },
  ],
  before: { position: 4, valuedAt: '2026-11-12T16:30:00.000Z', value: 12 },
});

const ready: HistoryExport = {
  id: id(8),
  format: 'xlsx',
  filter: {},
  status: 'ready',
  total: 3,
  done: 3,
  createdBy: { id: id(7), name: 'Auditor' },
  createdAt: '2026-12-01T10:00:00.000Z',
  manifest: {
    version: 1,
    exportId: id(8),
    deskId: desk.id,
    fileName: 'history.xlsx',
    format: 'xlsx',
    filter: {},
    rows: 3,
    bytes: 10,
    sha256: hash('e'),
    chain: { name: 'x', firstPosition: 2, lastPosition: 6, headPosition: 6, headHash: hash('a') },
    engines: [engineVersion],
    caution: 'Indicative.',
    madeBy: id(7),
    madeAt: '2026-12-01T10:00:01.000Z',
    keyId: '0123456789abcdef',
    signature: 'f'.repeat(128),
  },
};

type Sent = { url: string; method: string; body: unknown };

/** A server that has these rows and this value; it tells what it was asked. */
function playServer(shown: readonly HistoryRow[], value: HistoryValue | null = null): Sent[] {
  const sent: Sent[] = [];
  const fetch = jest.fn((url: string, init: { method: string; body?: string }) => {
    sent.push({ url, method: init.method, body: init.body && JSON.parse(init.body) });
    const body = url.includes('/exports')
      ? ready
      : url.includes('/underlyings')
        ? { underlyings: [] }
        : url.includes('/history/')
          ? value
          : { items: shown, nextCursor: null };
    return Promise.resolve({ ok: true, status: 200, json: () => Promise.resolve(body) });
  });
  Object.assign(globalThis, { fetch });
  return sent;
}

const inQueries = (node: React.ReactNode) =>
  render(<QueryClientProvider client={new QueryClient()}>{node}</QueryClientProvider>);

beforeEach(() => {
  playWindow({ wide: true });
  playDialogs();
});

describe('the history', () => {
  it('shows a value a row, with its day, trade, book and run', async () => {
    playServer(rows);
    inQueries(<HistoryListScreen desk={auditor} filter={{}} onFilter={jest.fn()} />);
    const table = await screen.findByRole('table', { name: historyText.caption });
    const [, newest] = within(table).getAllByRole('row');
    expect(within(newest).getByText(saying(/^2026-11-13/))).toBeTruthy();
    expect(within(newest).getByRole('link', { name: 'T-0012' })).toBeTruthy();
    expect(within(newest).getByRole('link', { name: 'R-0007' })).toBeTruthy();
  });

  it('asks the server for what is filtered, and for nothing else', async () => {
    const sent = playServer(rows);
    const filter = { trade: 'T-0012', verdict: 'disagree' as const };
    inQueries(<HistoryListScreen desk={auditor} filter={filter} onFilter={jest.fn()} />);
    await screen.findByRole('table', { name: historyText.caption });
    const { url } = sent.find((each) => each.url.includes('/history?')) ?? { url: '' };
    expect(Object.fromEntries(new URL(url, 'http://desk').searchParams)).toEqual({
      trade: 'T-0012',
      verdict: 'disagree',
      limit: '100',
    });
  });

  it('draws one trade’s values as a line that the arrow keys read', async () => {
    playServer(rows);
    inQueries(
      <HistoryListScreen desk={auditor} filter={{ trade: 'T-0012' }} onFilter={jest.fn()} />,
    );
    const chart = await screen.findByRole('application');
    expect(screen.getByText(historyText.exception)).toBeTruthy();
    fireEvent.keyDown(chart, { key: 'Home' });
    expect(screen.getByText(saying(/^2026-11-11 .*agree$/))).toBeTruthy();
    fireEvent.keyDown(chart, { key: 'ArrowRight' });
    expect(screen.getByText(saying(/^2026-11-12 .*disagree$/))).toBeTruthy();
  });

  it('changes the filter once the typing has stopped', async () => {
    playServer(rows);
    const onFilter = jest.fn();
    inQueries(<HistoryListScreen desk={auditor} filter={{}} onFilter={onFilter} />);
    await userEvent.type(await screen.findByLabelText(historyText.tradeField), 'T-0012');
    await waitFor(() => expect(onFilter).toHaveBeenLastCalledWith({ trade: 'T-0012' }));
  });

  it('asks for a day once it is one, and says how to type one that is not', async () => {
    playServer(rows);
    const onFilter = jest.fn();
    inQueries(<HistoryListScreen desk={auditor} filter={{}} onFilter={onFilter} />);
    const field = await screen.findByLabelText(historyText.from);
    await userEvent.type(field, '2026-11-31');
    await userEvent.tab();
    expect(screen.getByText(historyText.noDay)).toBeTruthy();
    expect(onFilter).not.toHaveBeenCalled();
    await userEvent.clear(field);
    await userEvent.type(field, '2026-11-30');
    expect(onFilter).toHaveBeenLastCalledWith({ from: '2026-11-30' });
    expect(screen.queryByText(historyText.noDay)).toBeNull();
  });

  it('exports what is filtered, and offers file and manifest', async () => {
    const sent = playServer(rows);
    const filter = { run: 'R-0007' };
    inQueries(<HistoryListScreen desk={auditor} filter={filter} onFilter={jest.fn()} />);
    await userEvent.click(await screen.findByRole('button', { name: historyText.exportXlsx }));
    expect(await screen.findByText(historyText.exportReady('history.xlsx', 3))).toBeTruthy();
    expect(screen.getByRole('button', { name: historyText.saveManifest })).toBeTruthy();
    expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({ format: 'xlsx', filter });
  });

  it('offers no export to those who may not', async () => {
    playServer(rows);
    const analyst = { ...desk, permissions: ['read-desk' as const] };
    inQueries(<HistoryListScreen desk={analyst} filter={{}} onFilter={jest.fn()} />);
    await screen.findByRole('table', { name: historyText.caption });
    expect(screen.queryByRole('button', { name: historyText.exportCsv })).toBeNull();
  });

  it('says what to do when nothing fits', async () => {
    playServer([]);
    const onFilter = jest.fn();
    inQueries(<HistoryListScreen desk={auditor} filter={{ run: 'R-1' }} onFilter={onFilter} />);
    await screen.findByText(historyText.nothingFoundTitle);
    const [clear] = screen.getAllByRole('button', { name: historyText.clear });
    await userEvent.click(clear);
    expect(onFilter).toHaveBeenCalledWith({});
  });
});

describe('one value', () => {
  const recompute = () => screen.findByRole('button', { name: recomputeText.act });

  it('shows inputs, seal and approvals', async () => {
    playServer([], valueWith(bodyOf(3)));
    inQueries(<ValueScreen desk={auditor} position="6" />);
    await screen.findByRole('region', { name: valueText.inputsTitle });
    expect(screen.getByText(hash('a'))).toBeTruthy();
    const records = screen.getByRole('table', { name: valueText.recordsTitle });
    expect(within(records).getByText('approval: approved')).toBeTruthy();
    expect(within(records).getByText('Within the limits of the book')).toBeTruthy();
  });

  it('is made again to the bit', async () => {
    playServer([], valueWith(bodyOf(3)));
    inQueries(<ValueScreen desk={auditor} position="6" />);
    await userEvent.click(await recompute());
    expect(await screen.findByText(recomputeText.allSame(1))).toBeTruthy();
  });

  it('shows a single altered bit', async () => {
    const body = bodyOf(3);
    if (!body.result.ok) throw new Error('The example has no value.');
    const altered = { ...body.result, value: body.result.value * (1 + 2 ** -52) };
    playServer([], valueWith({ ...body, result: altered }));
    inQueries(<ValueScreen desk={auditor} position="6" />);
    await userEvent.click(await recompute());
    expect(await screen.findByText(recomputeText.someDiffer)).toBeTruthy();
  });

  it('says why there is none', async () => {
    const result = {
      ok: false as const,
      code: 'numerical-failure' as const,
      path: '',
      message: 'The grid did not settle.',
    };
    playServer([], valueWith(bodyOf(3, { result })));
    inQueries(<ValueScreen desk={auditor} position="6" />);
    expect(await screen.findByText(valueText.failed)).toBeTruthy();
  });
});
