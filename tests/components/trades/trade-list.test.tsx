/** A book’s rows: a sortable table where there is room, cards where there is not. */
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { TradeList } from '@/components/trades/trade-list';
import type { TradeFilter } from '@/hooks/use-trades';
import type { TradeSummary } from '@/shared/contracts/trades';
import { wheat } from '../../hooks/ticket-examples';
import { playDialogs, playWindow } from '../browser';
import { deskOf, playServer, problem, tradeWith, version } from './play-trades';

jest.setTimeout(60_000);

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

const valued: TradeSummary = tradeWith([version({ state: 'approved' })], {
  status: 'live',
  lastValuation: {
    runId: '99999999-9999-4999-8999-999999999991',
    snapshotDate: '2026-11-30',
    value: 13.2343,
    errorEstimate: 0.00021,
    total: '-6617.15',
    change: -0.116,
    tolerance: 0.001,
    verdict: 'disagree',
    refuted: false,
    strip: [
      { name: 'heat-crank-nicolson', value: 13.2343, errorEstimate: 0.00021 },
      { name: 'lattice-crr', value: 13.2443, errorEstimate: 0.0003 },
    ],
  },
});

const filter: TradeFilter = {
  bookId: null,
  search: '',
  status: null,
  verdict: null,
  underlyingId: null,
  sort: 'number',
  direction: 'descending',
};

function open(items: readonly TradeSummary[], onFilter = jest.fn(), change: object = {}) {
  playServer(
    () => ({ '/trades': { items, nextCursor: null }, '/underlyings': { underlyings: [wheat] } }),
    () => problem(405, 'method-not-allowed'),
  );
  render(
    <QueryClientProvider client={new QueryClient()}>
      <TradeList
        desk={deskOf('analyst')}
        userId="ben"
        caption="Trades on GRAIN"
        filter={{ ...filter, ...change }}
        onFilter={onFilter}
      />
    </QueryClientProvider>,
  );
  return onFilter;
}

beforeEach(() => {
  localStorage.clear();
  playWindow({ wide: true });
  playDialogs();
});

test('a row has value with error, strip with verdict, change, position and status', async () => {
  open([valued]);
  const table = await screen.findByRole('table', { name: 'Trades on GRAIN' });
  const row = within(table).getAllByRole('row')[1];
  expect(within(row).getByRole('link').textContent).toBe('T-0001live');
  expect(row.textContent).toContain('put 210.00, American, 2027-06-01');
  expect(row.textContent).toContain('13.2343± 0.0003');
  expect(row.textContent).toContain('\u22120.1160');
  expect(row.textContent).toContain('\u22126\u00a0617.15\u00a0EUR');
  expect(within(row).getByText('disagree')).toBeTruthy();
});

test('headings ask for another order, say which one holds, and turn it round', async () => {
  const onFilter = open([valued]);
  const heading = (name: string) => screen.findByRole('columnheader', { name });
  expect((await heading('trade')).getAttribute('aria-sort')).toBe('descending');
  const press = async (name: string) =>
    userEvent.click(within(await heading(name)).getByRole('button'));
  await press('change');
  expect(onFilter).toHaveBeenLastCalledWith({ sort: 'change', direction: 'descending' });
  await press('expires');
  expect(onFilter).toHaveBeenLastCalledWith({ sort: 'expiry', direction: 'ascending' });
  await press('trade');
  expect(onFilter).toHaveBeenLastCalledWith({ sort: 'number', direction: 'ascending' });
  expect(within(await heading('agreement')).queryByRole('button')).toBeNull();
});

test('columns can be hidden, and stay so', async () => {
  open([valued]);
  await screen.findByRole('columnheader', { name: 'change' });
  await userEvent.click(screen.getByRole('button', { name: 'Columns' }));
  await userEvent.click(screen.getByRole('checkbox', { name: 'change', hidden: true }));
  expect(screen.queryByRole('columnheader', { name: 'change', hidden: true })).toBeNull();
  expect(
    localStorage.getItem(
      'driftless.hidden-columns.trades.ben.11111111-1111-4111-8111-111111111111',
    ),
  ).toBe('["change"]');
});

test('a phone shows cards, and chooses the order by its name', async () => {
  playWindow({ wide: false });
  const onFilter = open([valued]);
  const card = within(await screen.findByRole('listitem'));
  expect(card.getByRole('link', { name: 'T-0001' })).toBeTruthy();
  expect(card.getByText(/^change .0\.1160$/)).toBeTruthy();
  await userEvent.selectOptions(screen.getByLabelText('Order'), 'largest fall');
  expect(onFilter).toHaveBeenLastCalledWith({ sort: 'change', direction: 'ascending' });
});

test('filters are handed on, and one press clears those that find nothing', async () => {
  const onFilter = open([], jest.fn(), { status: 'live', search: 'rye' });
  await userEvent.selectOptions(screen.getByLabelText('Verdict'), 'disagree');
  expect(onFilter).toHaveBeenLastCalledWith({ verdict: 'disagree' });
  await userEvent.click(await screen.findByRole('button', { name: 'Clear the filters' }));
  expect(onFilter).toHaveBeenLastCalledWith({
    search: '',
    status: null,
    verdict: null,
    underlyingId: null,
  });
});
