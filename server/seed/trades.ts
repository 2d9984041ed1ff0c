/** Books and trades of both desks: proposed from quotes, approved by someone else, some unfinished. */
import type { BookDraft } from '@/shared/contracts/books';
import type { QuoteSummary } from '@/shared/contracts/quotes';
import type { Trade } from '@/shared/contracts/trades';
import { addDays, dateInZone, instantInZone } from '@/shared/dates';
import { sequelize } from '../database';
import type { DeskActor } from '../services/access';
import { createBook } from '../services/books';
import { listQuotes } from '../services/quotes';
import { amendTrade, approveTrade, proposeTrade, returnTrade } from '../services/trade-acts';
import { closeTrade, recordExpiry } from '../services/trade-ends';
import type { WriteOnce } from '../services/write-once';

export type BookPlan = BookDraft & { symbols: readonly string[] };

export type TradePlan = {
  books: readonly BookPlan[];
  proposers: readonly DeskActor[];
  approvers: readonly DeskActor[];
  count: number;
};

const once: WriteOnce = (write) => sequelize.transaction(write);

const counterparties = [
  'Grenmoor Mills',
  'Hollin Feed and Seed',
  'Ashcombe Shipping',
  'Pellow Bakeries',
  'Tarnfield Growers North',
  'Wexley Port Authority',
  'Northgate Malting',
  'Silverdale Foods',
];

/** Deals of the last two months. */
const oldestDealDays = 60;

const pick = <Item>(items: readonly Item[], index: number): Item => items[index % items.length];

type Zone = { timeZone: string };

/** When it was agreed, and when its premium is due. */
export function agreedDaysAgo({ timeZone }: Zone, days: number, time = '11:20') {
  const day = addDays(dateInZone(Date.now(), timeZone), -days);
  return {
    tradedAt: new Date(instantInZone(day, time, timeZone)).toISOString(),
    premiumDate: addDays(day, 2),
  };
}

function proposalOf(quote: QuoteSummary, bookId: string, actor: DeskActor, index: number) {
  // What was really agreed lies a little beside the server's own value.
  const agreed = Math.abs(Number(quote.total)) * (1 + ((index % 5) - 1) / 100);
  return {
    quoteId: quote.id,
    bookId,
    counterparty: pick(counterparties, index * 3),
    premiumAmount: agreed.toFixed(2),
    premiumCurrency: quote.underlying.currency,
    ...agreedDaysAgo(
      actor.desk,
      1 + ((index * 7) % oldestDealDays),
      `1${index % 6}:2${index % 10}`,
    ),
    note: index % 9 === 0 ? 'Agreed by phone, confirmed by letter' : '',
  };
}

/** One more lot, as a client asks for when the price was good. */
const oneMoreLot = ({ version, versions: [latest] }: Trade) => ({
  direction: latest.direction,
  quantity: String(Number(latest.quantity) + 1),
  contractSize: latest.contractSize,
  kind: latest.kind,
  exercise: latest.exercise,
  strike: latest.strike,
  expiryDate: latest.expiryDate,
  counterparty: latest.counterparty,
  premiumAmount: latest.premiumAmount,
  premiumCurrency: latest.premiumCurrency,
  premiumDate: latest.premiumDate,
  tradedAt: latest.tradedAt,
  note: latest.note,
  reason: 'The client takes one more lot at the same price',
  version,
});

type Hands = { proposer: DeskActor; approver: DeskActor };
type Fate = (trade: Trade, hands: Hands) => Promise<Trade>;

const goLive: Fate = ({ id: tradeId, version }, { approver }) =>
  approveTrade(approver, { tradeId, version });

const wait: Fate = async (trade) => trade;

const comeBack: Fate = ({ id: tradeId, version }, { approver }) =>
  returnTrade(approver, {
    tradeId,
    version,
    reason: 'The premium is that of the call; the client bought the put',
  });

const beAmended: Fate = async (trade, hands) => {
  const live = await goLive(trade, hands);
  return amendTrade(hands.proposer, live.id, oneMoreLot(live), once);
};

const growByALot: Fate = async (trade, hands) => goLive(await beAmended(trade, hands), hands);

const beClosed: Fate = async (trade, hands) => {
  const live = await goLive(trade, hands);
  const { premiumAmount, premiumCurrency } = live.versions[0];
  return closeTrade(hands.approver, live.id, {
    version: live.version,
    date: dateInZone(Date.now(), hands.approver.desk.timeZone),
    amount: `-${premiumAmount}`,
    currency: premiumCurrency,
    reason: 'Bought back: the client has sold the crop forward',
  });
};

const beExercised: Fate = async (trade, hands) => {
  const live = await goLive(trade, hands);
  const date = dateInZone(Date.now(), hands.proposer.desk.timeZone);
  const { id, version } = live;
  return recordExpiry(hands.proposer, id, { version, outcome: 'exercised', date });
};

/** Nearly every trade is live; a few of each desk show what else may become of one. */
function fateOf(index: number, quote: QuoteSummary, count: number): Fate {
  const left = count - index;
  if (left <= 4) return wait;
  if (left === 5) return comeBack;
  if (left === 6) return beAmended;
  if (left === 7) return beClosed;
  if (left < 16 && left > 7 && quote.exercise === 'american') return beExercised;
  return index % 12 === 5 ? growByALot : goLive;
}

async function openBooks(head: DeskActor, plans: readonly BookPlan[]) {
  const opened = [];
  for (const { symbols, ...draft } of plans) {
    const { id } = await createBook(head, draft, once);
    opened.push({ id, symbols });
  }
  return opened;
}

/** What was only asked out of curiosity, such as ten years ahead, is not traded. */
const longestDays = 730;

async function tradedQuotes({ desk }: DeskActor): Promise<QuoteSummary[]> {
  const { items } = await listQuotes(desk, { limit: 200 });
  const last = addDays(dateInZone(Date.now(), desk.timeZone), longestDays);
  return items.filter(({ expiryDate }) => expiryDate <= last);
}

/** Proposes one trade after the other, each by someone else than who approves it. */
export async function seedTrades({ books, proposers, approvers, count }: TradePlan) {
  const [head] = approvers;
  const opened = await openBooks(head, books);
  const quotes = await tradedQuotes(head);
  for (let index = 0; index < count; index += 1) {
    const quote = pick(quotes, index * 5);
    const book = opened.find(({ symbols }) => symbols.includes(quote.underlying.symbol));
    if (!book) throw new Error(`No book takes ${quote.underlying.symbol}.`);
    const hands = { proposer: pick(proposers, index), approver: pick(approvers, index) };
    const proposal = proposalOf(quote, book.id, hands.proposer, index);
    const trade = await proposeTrade(hands.proposer, proposal, once);
    await fateOf(index, quote, count)(trade, hands);
  }
}

export const commodityBooks: readonly BookPlan[] = [
  {
    code: 'GRAIN',
    name: 'Grain and oilseed',
    symbols: ['WHEAT-DEC', 'RAPE-MAY', 'BARLEY-MAR'],
  },
  {
    code: 'FREIGHT-EQ',
    name: 'Freight, shares and index',
    symbols: ['FREIGHT-Q1', 'MILL', 'FERTI', 'FOOD-40'],
  },
];

export const treasuryBooks: readonly BookPlan[] = [
  { code: 'EURO', name: 'Pairs with the euro', symbols: ['EUR/USD', 'EUR/SEK', 'GBP/EUR'] },
  { code: 'CROSS', name: 'Other pairs', symbols: ['USD/NOK'] },
];
