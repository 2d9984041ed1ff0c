/** Quotes of both desks, made one by one as a ticket would make them. */
import type { Market } from '@/pricing/contract';
import type { QuoteDraft } from '@/shared/contracts/quotes';
import { dateOfTenor } from '@/shared/dates';
import { pricingRequestOf } from '@/shared/quote-terms';
import { sequelize } from '../database';
import { today, type DeskActor } from '../services/access';
import { priceRoutes } from '../services/pricing';
import { createQuote } from '../services/quotes';
import type { SeedUnderlying } from './underlyings';

export type Listed = { id: string; underlying: SeedUnderlying };

type Pattern = Pick<QuoteDraft, 'kind' | 'exercise' | 'direction' | 'quantity' | 'note'> & {
  moneyness: number;
  tenor: string;
  /** Where the market stood against its close. */
  move: number;
  /** Numbers asked for in place of the close's. */
  assumed?: { rate: number; volatility: number; yield: number };
};

const patterns: readonly Pattern[] = [
  {
    kind: 'put',
    exercise: 'american',
    direction: 'sell',
    quantity: '10',
    moneyness: 0.98,
    tenor: '6m',
    move: 0.004,
    note: 'Asked by phone; floor for the new crop',
  },
  {
    kind: 'call',
    exercise: 'european',
    direction: 'sell',
    quantity: '25',
    moneyness: 1.05,
    tenor: '3m',
    move: -0.006,
    note: '',
  },
  {
    kind: 'put',
    exercise: 'european',
    direction: 'buy',
    quantity: '4',
    moneyness: 1,
    tenor: '1m',
    move: 0.002,
    note: '',
  },
  {
    kind: 'call',
    exercise: 'american',
    direction: 'buy',
    quantity: '12.5',
    moneyness: 1.1,
    tenor: '1y',
    move: 0,
    note: 'Covers the forward sale',
  },
];

/** Dear money and a calm market: the drift outweighs the moves, and the walks say that they are rough. */
const roughPattern: Pattern = {
  kind: 'put',
  exercise: 'american',
  direction: 'sell',
  quantity: '1',
  moneyness: 1,
  tenor: '10y',
  move: 0,
  assumed: { rate: 0.1, volatility: 0.1, yield: 0 },
  note: 'What if money were dear for ten years; not for a client',
};

const minuteMs = 60_000;
const spacingMs = 25 * minuteMs;

const rounded = (value: number, decimals: number) => Number(value.toFixed(decimals));

function marketAt({ market, priceDecimals }: SeedUnderlying, { move, assumed }: Pattern): Market {
  return { ...market, ...assumed, spot: rounded(market.spot * (1 + move), priceDecimals) };
}

type QuoteTerms = Omit<QuoteDraft, 'indicativeValue'>;

/** What the ticket showed: the browser prices with the same engine. */
async function indicativeValue(terms: QuoteTerms, actor: DeskActor) {
  const { contract, market } = pricingRequestOf(terms, actor.desk);
  const [{ result }] = await priceRoutes(contract, market);
  if (!result.ok) throw new Error(`A quote of the demonstration has no price: ${result.message}`);
  return result.value;
}

/** Saves a quote as a ticket would. */
export async function saveQuote(actor: DeskActor, terms: QuoteTerms) {
  const draft = { ...terms, indicativeValue: await indicativeValue(terms, actor) };
  return createQuote(actor, draft, (write) => sequelize.transaction(write));
}

async function seedQuote(actor: DeskActor, listed: Listed, pattern: Pattern, pricedAt: Date) {
  const { id, underlying } = listed;
  const { moneyness, tenor, kind, exercise, direction, quantity, note } = pattern;
  const expiryDate = dateOfTenor(tenor, today(actor.desk));
  if (expiryDate === null) throw new Error(`${tenor} is no tenor.`);
  await saveQuote(actor, {
    kind,
    exercise,
    direction,
    quantity,
    note,
    underlyingId: id,
    contractSize: underlying.contractSize,
    strike: (underlying.market.spot * moneyness).toFixed(underlying.priceDecimals),
    expiryDate,
    market: marketAt(underlying, pattern),
    pricedAt: pricedAt.toISOString(),
  });
}

/** Oldest first, the last one a few minutes ago. */
export async function seedQuotes(
  actors: readonly DeskActor[],
  listed: readonly Listed[],
  patternCount: number,
) {
  const usual = patterns
    .slice(0, patternCount)
    .flatMap((pattern) => listed.map((each) => ({ pattern, listed: each })));
  const shares = listed.filter(({ underlying }) => underlying.kind === 'share').slice(0, 1);
  const planned = [...usual, ...shares.map((each) => ({ pattern: roughPattern, listed: each }))];
  const now = Date.now();
  for (const [index, plan] of planned.entries()) {
    const pricedAt = new Date(now - (planned.length - index) * spacingMs);
    await seedQuote(actors[index % actors.length], plan.listed, plan.pattern, pricedAt);
  }
}
