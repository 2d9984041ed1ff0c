/** The forms that propose and amend: nothing typed is lost, nothing is sent twice. */
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { AmendScreen } from '@/components/trades/amend-screen';
import { ProposeScreen } from '@/components/trades/propose-screen';
import type { Trade } from '@/shared/contracts/trades';
import { wheat } from '../../hooks/ticket-examples';
import { playDialogs, playWindow } from '../browser';
import { quoteFor } from '../play-quotes';
import {
  ben,
  book,
  deskOf,
  playServer,
  problem,
  tradeWith,
  version,
  type Sent,
} from './play-trades';

jest.setTimeout(60_000);

const mockReplace = jest.fn();
jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: mockReplace }) }));

const quote = quoteFor(
  {
    underlyingId: wheat.id,
    direction: 'sell',
    quantity: '10',
    contractSize: '50',
    kind: 'put',
    exercise: 'european',
    strike: '210',
    expiryDate: '2027-03-01',
    market: { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 },
    pricedAt: '2026-12-01T10:00:00.000Z',
    indicativeValue: 9,
    note: 'asked by telephone',
  },
  1,
);

const other = { ...book, id: '66666666-6666-4666-8666-666666666662', code: 'FREIGHT' };
const trade = tradeWith([version()]);

let sent: Sent[];
let answer: () => ReturnType<typeof problem> | 'away';
let shown: Trade;
let unmount: () => void;

function open(screenOf: () => React.ReactNode) {
  sent = playServer(
    () => ({
      [`/quotes/${quote.id}`]: quote,
      [`/trades/${trade.id}`]: shown,
      '/books': { books: [book, other] },
    }),
    () => answer(),
  );
  ({ unmount } = render(
    <QueryClientProvider
      client={new QueryClient({ defaultOptions: { mutations: { retry: false } } })}
    >
      {screenOf()}
    </QueryClientProvider>,
  ));
}

const propose = () => <ProposeScreen desk={deskOf('analyst')} userId={ben.id} quoteId={quote.id} />;
const amend = () => <AmendScreen desk={deskOf('analyst')} userId={ben.id} tradeId={trade.id} />;

const field = (name: string) => screen.findByLabelText<HTMLInputElement>(name);
const retype = async (name: string, text: string) => {
  await userEvent.clear(await field(name));
  await userEvent.type(await field(name), text);
};
const pressPropose = async () =>
  userEvent.click(await screen.findByRole('button', { name: 'Propose trade' }));
const pressAmend = async () =>
  userEvent.click(await screen.findByRole('button', { name: 'Propose the amendment' }));

async function fillProposal() {
  await userEvent.selectOptions(await field('Book'), book.id);
  await retype('Counterparty', 'Grenmoor Mills');
  await retype('Premium', '4.5k');
}

beforeEach(() => {
  localStorage.clear();
  mockReplace.mockClear();
  playWindow({ wide: true });
  playDialogs();
  shown = trade;
  answer = () => ({ status: 201, body: trade });
});

test('begins with what the quote says, and sends what was typed as the shared schema has it', async () => {
  open(propose);
  expect((await field('Premium')).value).toMatch(/^\d+\.?\d{0,2}$/);
  expect((await field('Agreed at')).value).toBe('2026-12-01 11:00');
  expect((await field('Note')).value).toBe('asked by telephone');
  await fillProposal();
  await retype('Premium paid on', '2026-12-03');
  expect(screen.getByText(/A trade is proposed on GRAIN\. It waits/)).toBeTruthy();
  await pressPropose();
  await waitFor(() => expect(mockReplace).toHaveBeenCalled());
  expect(mockReplace.mock.calls[0][0]).toMatch(new RegExp(`/trades/${trade.id}$`));
  expect(sent[0]).toMatchObject({
    path: 'trades',
    body: {
      quoteId: quote.id,
      bookId: book.id,
      counterparty: 'Grenmoor Mills',
      premiumAmount: '4500',
      premiumCurrency: 'EUR',
      premiumDate: '2026-12-03',
      // Berlin is an hour ahead of UTC in December.
      tradedAt: '2026-12-01T10:00:00.000Z',
    },
  });
});

test('what is missing or wrong is said at its field, and nothing is sent', async () => {
  open(propose);
  await retype('Premium', 'much');
  await retype('Premium paid on', 'soon');
  await retype('Agreed at', 'yesterday');
  await pressPropose();
  const alerts = await screen.findAllByRole('alert');
  expect(alerts.map(({ textContent }) => textContent)).toEqual([
    'Choose the book that the trade goes on.',
    'Say whom the trade is with.',
    '“much” is not a number; type digits, such as 210.5.',
    'Give a day as YYYY-MM-DD or a tenor such as 2d.',
    'Give a day and time as YYYY-MM-DD HH:MM.',
  ]);
  expect(sent).toEqual([]);
});

test('the server’s complaint stands at its field, and what was typed stays', async () => {
  open(propose);
  await fillProposal();
  const message = 'A premium is not paid before the trade is agreed.';
  answer = () =>
    problem(422, 'validation-failed', [{ path: 'premiumDate', code: 'out-of-range', message }]);
  await pressPropose();
  expect(await screen.findByText(message)).toBeTruthy();
  expect((await field('Counterparty')).value).toBe('Grenmoor Mills');
});

test('a lost server loses nothing: after a reload the same press proposes the same trade once', async () => {
  open(propose);
  await fillProposal();
  answer = () => 'away';
  await pressPropose();
  expect(await screen.findByText(/Press again: it is proposed once/)).toBeTruthy();
  const [{ key }] = sent;
  unmount();
  open(propose);
  expect((await field('Counterparty')).value).toBe('Grenmoor Mills');
  answer = () => ({ status: 201, body: trade });
  await pressPropose();
  await waitFor(() => expect(mockReplace).toHaveBeenCalled());
  expect(sent.map((each) => each.key)).toEqual([key]);
  unmount();
  open(propose);
  expect((await field('Counterparty')).value).toBe('');
});

test('another content gets another key', async () => {
  open(propose);
  await fillProposal();
  answer = () => 'away';
  await pressPropose();
  await screen.findByText(/Press again/);
  await retype('Counterparty', 'Hollin Feed');
  await pressPropose();
  await waitFor(() => expect(sent).toHaveLength(2));
  expect(sent[0].key).not.toBe(sent[1].key);
});

test('an amendment keeps the seconds of an instant that was left alone', async () => {
  open(amend);
  await retype('Quantity', '12');
  await retype('Why it is amended', 'Two more lots by phone');
  await pressAmend();
  await waitFor(() => expect(mockReplace).toHaveBeenCalled());
  expect(sent[0].body).toMatchObject({
    quantity: '12',
    tradedAt: '2026-12-01T09:05:42.000Z',
    reason: 'Two more lots by phone',
    version: 4,
  });
});

test('an amendment of what has changed meanwhile is read again and sent again', async () => {
  open(amend);
  await retype('Quantity', '12');
  await retype('Why it is amended', 'Two more lots by phone');
  answer = () => {
    shown = { ...trade, version: 5 };
    return problem(409, 'stale-version');
  };
  await pressAmend();
  expect(await screen.findByText(/Someone changed the trade meanwhile/)).toBeTruthy();
  expect((await field('Quantity')).value).toBe('12');
  answer = () => ({ status: 201, body: trade });
  await pressAmend();
  await waitFor(() => expect(sent).toHaveLength(2));
  expect(sent.map(({ body }) => body.version)).toEqual([4, 5]);
});

test('a trade that has ended is not amended', async () => {
  shown = { ...trade, status: 'closed' };
  open(amend);
  const main = within(await screen.findByRole('main'));
  expect(await main.findByText('closed')).toBeTruthy();
  expect(main.queryByRole('button', { name: 'Propose the amendment' })).toBeNull();
});
