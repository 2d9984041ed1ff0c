import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { TicketScreen } from '@/components/ticket/ticket-screen';
import { ticketText } from '@/constants/texts/ticket';
import { price } from '@/pricing/index';
import { pricingRequestOf } from '@/shared/quote-terms';
import { formatNumber } from '@/shared/format/numbers';
import { playDialogs, playWindow } from '../browser';
import { saying } from '../saying';
import { desk, wheat } from '../../hooks/ticket-examples';
import { playServer } from './play-server';

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));
jest.mock('@/hooks/pricing-thread', () => jest.requireActual('../play-thread'));

// Real prices by three routes at each key: a busy machine takes its time.
jest.setTimeout(60_000);

const now = new Date('2026-12-01T10:00:20Z');
const minute = '2026-12-01T10:00:00.000Z';

const renderTicket = () =>
  render(
    <QueryClientProvider
      client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}
    >
      <TicketScreen userId="analyst" desk={desk} from={null} onFromTaken={() => undefined} />
    </QueryClientProvider>,
  );

const person = () => userEvent.setup({ advanceTimers: jest.advanceTimersByTime });

const shownPrice = async () => (await screen.findByTestId('answer-value')).textContent;
const strikeField = () => screen.getByRole('textbox', { name: 'Strike' });
const saveButton = () => screen.getByRole('button', { name: ticketText.save });

/** What the engine says to the terms of the example, told apart from the ticket's own path. */
function expectedPrice(strike: string, exercise: 'european' | 'american') {
  const market = wheat.close?.market;
  if (!market) throw new Error('The example has no close.');
  const terms = { kind: 'put', exercise, strike, expiryDate: '2027-03-01', market } as const;
  const result = price(pricingRequestOf({ ...terms, pricedAt: minute }, desk));
  if (!result.ok) throw new Error(result.message);
  return formatNumber(result.value, 4);
}

beforeEach(() => {
  jest.useFakeTimers({ now, doNotFake: ['queueMicrotask', 'nextTick'] });
  localStorage.clear();
  Element.prototype.scrollIntoView = jest.fn();
  playWindow({ wide: true });
  playDialogs();
});

afterEach(() => jest.useRealTimers());

describe('the ticket', () => {
  it('opens with the last close and its price, by three routes that agree', async () => {
    playServer();
    renderTicket();
    expect(await shownPrice()).toBe(expectedPrice('210', 'european'));
    expect(screen.getByText('Routes agree')).toBeTruthy();
    const routes = screen.getByRole('table', { name: 'Why it can be trusted' });
    expect(within(routes).getAllByRole('row')).toHaveLength(4);
    expect(screen.getByText(saying(/^Market: close of 2026-11-30$/))).toBeTruthy();
  });

  it('follows the keys', async () => {
    playServer();
    renderTicket();
    await shownPrice();
    const keys = person();
    const strike = strikeField();
    await keys.clear(strike);
    await keys.type(strike, '205,5');
    await waitFor(async () => expect(await shownPrice()).toBe(expectedPrice('205.5', 'european')));
    await keys.selectOptions(screen.getByRole('combobox', { name: 'Exercise' }), 'american');
    const expected = expectedPrice('205.5', 'american');
    await waitFor(async () => expect(await shownPrice()).toBe(expected));
  });

  it('keeps the last good price, greyed, while a field stops the next one', async () => {
    playServer();
    renderTicket();
    const before = await shownPrice();
    await person().clear(strikeField());
    expect(screen.getByText(ticketText.missing.strike)).toBeTruthy();
    expect(screen.getByText('Last good price; see the strike.')).toBeTruthy();
    expect(await shownPrice()).toBe(before);
    expect(saveButton().hasAttribute('disabled')).toBe(true);
  });

  it('is still there after a reload', async () => {
    playServer();
    const { unmount } = renderTicket();
    await shownPrice();
    await person().type(strikeField(), '{selectall}199');
    unmount();
    renderTicket();
    await shownPrice();
    expect(strikeField()).toHaveProperty('value', '199');
  });

  it('finds the volatility for a premium', async () => {
    playServer();
    renderTicket();
    await shownPrice();
    const keys = person();
    await keys.click(screen.getByRole('button', { name: ticketText.fromPremium }));
    const premium = screen.getByRole('textbox', { name: 'Premium' });
    await keys.clear(premium);
    await keys.type(premium, expectedPrice('210', 'european'));
    await screen.findByText(/A volatility of .* gives this premium/);
    await keys.click(screen.getByRole('button', { name: ticketText.take }));
    const volatility = screen.getByRole<HTMLInputElement>('textbox', { name: 'Volatility' });
    // The premium was typed with four decimals, which fix the volatility to about 1e-4 of a point.
    expect(Number(volatility.value)).toBeCloseTo(24.5, 3);
  });
});

describe('saving', () => {
  it('says the server’s number and that it has the same bits', async () => {
    const { quotes } = playServer();
    renderTicket();
    await shownPrice();
    await person().click(saveButton());
    expect(await screen.findByText(ticketText.sameBits)).toBeTruthy();
    expect(quotes.size).toBe(1);
    expect(screen.getByRole('link', { name: ticketText.openQuote })).toBeTruthy();
  });

  it('makes one quote of two presses', async () => {
    const { quotes } = playServer();
    renderTicket();
    await shownPrice();
    await person().dblClick(saveButton());
    await screen.findByText(ticketText.sameBits);
    expect(quotes.size).toBe(1);
  });

  it('shows a refusal at its field', async () => {
    const { state } = playServer();
    state.refuses = true;
    renderTicket();
    await shownPrice();
    await person().click(saveButton());
    expect(await screen.findByText('Give a strike that the desk trades.')).toBeTruthy();
    expect(screen.queryByText(ticketText.keptTitle)).toBeNull();
  });

  it('keeps the quote while the server is away, through a reload, and sends it once', async () => {
    const { state, quotes } = playServer();
    const { unmount } = renderTicket();
    await shownPrice();
    state.away = true;
    await person().click(saveButton());
    await screen.findByText(ticketText.keptTitle);
    unmount();
    state.away = false;
    renderTicket();
    await shownPrice();
    await person().click(screen.getByRole('button', { name: ticketText.retry }));
    await screen.findByText(ticketText.sameBits);
    await waitFor(() => expect(screen.queryByText(ticketText.keptTitle)).toBeNull());
    expect(quotes.size).toBe(1);
    expect(new Set(state.posted).size).toBe(1);
  });
});
