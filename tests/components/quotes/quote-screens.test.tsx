import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { QuoteListScreen } from '@/components/quotes/quote-list-screen';
import { QuoteScreen } from '@/components/quotes/quote-screen';
import { quotesText } from '@/constants/texts/quotes';
import { recomputeText } from '@/constants/texts/recompute';
import type { Quote } from '@/shared/contracts/quotes';
import { playDialogs, playWindow } from '../browser';
import { quoteFor } from '../play-quotes';
import { desk, wheat } from '../../hooks/ticket-examples';

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));
jest.mock('@/hooks/pricing-thread', () => jest.requireActual('../play-thread'));

// Real prices by three routes: a busy machine takes its time.
jest.setTimeout(60_000);

const quote = quoteFor(
  {
    underlyingId: wheat.id,
    direction: 'sell',
    quantity: '10',
    contractSize: '500',
    kind: 'put',
    exercise: 'american',
    strike: '210.0000000000',
    expiryDate: '2027-03-01',
    market: { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 },
    pricedAt: '2026-12-01T10:00:00.000Z',
    indicativeValue: 9,
    note: 'asked by telephone',
  },
  1,
);

const answer = (status: number, body: unknown) =>
  Promise.resolve({ ok: status < 400, status, json: () => Promise.resolve(body) });

/** A server that has these quotes, and tells which addresses were read. */
function playQuotes(quotes: readonly Quote[]) {
  const read: string[] = [];
  const fetch = jest.fn((url: string) => {
    read.push(url);
    const found = quotes.find(({ id }) => url.endsWith(id));
    return answer(200, found ?? { items: quotes, nextCursor: null });
  });
  Object.assign(globalThis, { fetch });
  return read;
}

const inQueries = (node: React.ReactNode) =>
  render(<QueryClientProvider client={new QueryClient()}>{node}</QueryClientProvider>);

beforeEach(() => {
  playWindow({ wide: true });
  playDialogs();
});

describe('the list of quotes', () => {
  const noFilter = { search: '', verdict: null };

  it('shows each quote with value, error, verdict and position, and links to its page', async () => {
    playQuotes([quote]);
    inQueries(<QuoteListScreen desk={desk} filter={noFilter} onFilter={() => undefined} />);
    const row = (await screen.findByRole('link', { name: 'Q-0001' })).closest('tr');
    if (!row) throw new Error('The link stands in no row.');
    expect(row.textContent).toContain('put 210.00, American, 2027-03-01');
    expect(row.textContent).toMatch(/\u2212\d\d\u00a0\d{3}\.\d\d\u00a0EUR/);
    expect(within(row).getByText('agree')).toBeTruthy();
  });

  it('asks the server for what is searched, once typing rests', async () => {
    const read = playQuotes([quote]);
    const onFilter = jest.fn();
    inQueries(<QuoteListScreen desk={desk} filter={noFilter} onFilter={onFilter} />);
    await userEvent.type(await screen.findByRole('searchbox', { name: 'Search' }), 'wheat');
    const wanted = { search: 'wheat', verdict: null };
    await waitFor(() => expect(onFilter).toHaveBeenLastCalledWith(wanted));
    inQueries(
      <QuoteListScreen
        desk={desk}
        filter={{ search: 'wheat', verdict: 'wide' }}
        onFilter={onFilter}
      />,
    );
    await waitFor(() => expect(read.at(-1)).toContain('search=wheat&verdict=wide'));
  });

  it('offers the ticket where there is no quote yet', async () => {
    playQuotes([]);
    inQueries(<QuoteListScreen desk={desk} filter={noFilter} onFilter={() => undefined} />);
    expect(await screen.findByRole('link', { name: quotesText.openTicket })).toBeTruthy();
  });
});

describe('a quote’s page', () => {
  it('says what the ticket showed where the server found another number', async () => {
    playQuotes([quote]);
    inQueries(<QuoteScreen desk={desk} quoteId={quote.id} />);
    expect(await screen.findByText(/^9\.0000, apart by \u22120\.0/)).toBeTruthy();
    expect(screen.getByText('asked by telephone')).toBeTruthy();
  });

  it('makes the stored numbers again, to the bit', async () => {
    playQuotes([quote]);
    inQueries(<QuoteScreen desk={desk} quoteId={quote.id} />);
    await userEvent.click(await screen.findByRole('button', { name: recomputeText.act }));
    expect(await screen.findByText(recomputeText.allSame(3))).toBeTruthy();
  });

  it('shows a single altered bit', async () => {
    const [first, ...others] = quote.routes;
    if (!first.result.ok) throw new Error('The example has no first route.');
    const altered = { ...first.result, value: first.result.value * (1 + 2 ** -52) };
    const stored = { ...quote, routes: [{ ...first, result: altered }, ...others] };
    playQuotes([stored]);
    inQueries(<QuoteScreen desk={desk} quoteId={quote.id} />);
    await userEvent.click(await screen.findByRole('button', { name: recomputeText.act }));
    expect(await screen.findByText(recomputeText.someDiffer)).toBeTruthy();
    expect(screen.getAllByText(recomputeText.same)).toHaveLength(2);
  });

  it('is not offered as a start of a ticket to those who may not price', async () => {
    playQuotes([quote]);
    inQueries(<QuoteScreen desk={{ ...desk, permissions: ['read-desk'] }} quoteId={quote.id} />);
    await screen.findByRole('button', { name: recomputeText.act });
    expect(screen.queryByRole('link', { name: quotesText.useTerms })).toBeNull();
  });
});
