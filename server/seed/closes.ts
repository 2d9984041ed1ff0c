/** Two months of closes of both desks: an invented walk that ends at the numbers of the last day. */
import seedrandom from 'seedrandom';
import type { Market } from '@/pricing/contract';
import type { SnapshotDraft } from '@/shared/contracts/market-data';
import { addDays } from '@/shared/dates';
import { marketWarnings, warningKey } from '@/shared/market-warnings';
import { sequelize } from '../database';
import { today, type DeskActor } from '../services/access';
import {
  approveSnapshot,
  createSnapshot,
  restateSnapshot,
  saveSnapshot,
} from '../services/market-drafts';
import type { WriteOnce } from '../services/write-once';
import type { Listed } from './quotes';

export type ClosePlan = {
  listed: readonly Listed[];
  maker: DeskActor;
  checker: DeskActor;
  /** Fixes the walk, whatever the day of seeding. */
  seed: string;
};

const once: WriteOnce = (write) => sequelize.transaction(write);

/** About two months, and one that waits. */
const approvedDays = 43;
/** So many closes before the last one, one was restated. */
const restatedBefore = 9;
const tradingDaysPerYear = 252;

const isWeekday = (date: string) => ![0, 6].includes(new Date(date).getUTCDay());

/** The last business days up to a day, newest first. */
function businessDays(last: string, count: number): string[] {
  const days: string[] = [];
  for (let date = last; days.length < count; date = addDays(date, -1))
    if (isWeekday(date)) days.push(date);
  return days;
}

const rounded = (value: number, decimals: number) => Number(value.toFixed(decimals));

/** The sum of twelve even draws less six is close enough to a normal draw. */
const nearlyNormal = (draw: () => number) =>
  Array.from({ length: 12 }, draw).reduce((sum, each) => sum + each, -6);

type Close = { underlyingId: string; market: Market };

/** One step of the walk: forward or back, it looks the same. */
function stepped(market: Market, base: Market, priceDecimals: number, draw: () => number): Market {
  const daily = market.volatility / Math.sqrt(tradingDaysPerYear);
  const drift = 0.2 * (base.volatility / market.volatility - 1);
  return {
    ...market,
    spot: rounded(market.spot * Math.exp(daily * nearlyNormal(draw)), priceDecimals),
    volatility: rounded(market.volatility * (1 + drift + 0.02 * nearlyNormal(draw)), 4),
    rate: rounded(market.rate + 0.00005 * nearlyNormal(draw), 5),
  };
}

const step = (closes: readonly Close[], listed: readonly Listed[], draw: () => number): Close[] =>
  closes.map(({ underlyingId, market }, index) => {
    const { underlying } = listed[index];
    const next = stepped(market, underlying.market, underlying.priceDecimals, draw);
    return { underlyingId, market: next };
  });

/** The closes of so many days, newest first, the first of them as listed. */
function walkBack(listed: readonly Listed[], days: number, draw: () => number): Close[][] {
  let closes = listed.map(({ id, underlying }) => ({
    underlyingId: id,
    market: underlying.market,
  }));
  return Array.from({ length: days }, () => {
    const shown = closes;
    closes = step(closes, listed, draw);
    return shown;
  });
}

const draftOf = (date: string, quotes: Close[]): SnapshotDraft => ({
  date,
  source: 'file',
  quotes,
  confirmedWarnings: [],
});

async function enterAndApprove({ maker, checker }: ClosePlan, draft: SnapshotDraft) {
  const { id, version } = await createSnapshot(maker, draft, once);
  await approveSnapshot(checker, id, { version, confirmedWarnings: [] });
  return id;
}

/** The settlement price of the first underlying was corrected a day later. */
async function restate({ maker, checker }: ClosePlan, id: string, draft: SnapshotDraft) {
  const reason = 'The exchange has corrected its settlement price';
  const restated = await restateSnapshot(maker, id, reason, once);
  const [first, ...others] = draft.quotes;
  const market = { ...first.market, spot: rounded(first.market.spot * 1.004, 4) };
  const { version } = await saveSnapshot(maker, restated.id, {
    ...draft,
    quotes: [{ ...first, market }, ...others],
    version: restated.version,
  });
  await approveSnapshot(checker, restated.id, { version, confirmedWarnings: [] });
}

/** Waits for a risk officer; one price has moved so far that it has to be looked at. */
async function enterWaiting({ listed, maker }: ClosePlan, date: string, quotes: Close[]) {
  const moved = quotes.map((quote, index) => {
    if (index !== quotes.length - 1) return quote;
    const { priceDecimals } = listed[index].underlying;
    const spot = rounded(quote.market.spot * 1.24, priceDecimals);
    return { ...quote, market: { ...quote.market, spot } };
  });
  const before = new Map(quotes.map(({ underlyingId, market }) => [underlyingId, market]));
  const named = moved.map((quote) => ({ ...quote, symbol: '' }));
  const confirmedWarnings = marketWarnings(named, before).map(warningKey);
  await createSnapshot(maker, { ...draftOf(date, moved), confirmedWarnings }, once);
}

export async function seedCloses(plan: ClosePlan) {
  const draw = seedrandom(plan.seed);
  const [waiting, ...dates] = businessDays(today(plan.maker.desk), approvedDays + 1);
  const closes = walkBack(plan.listed, dates.length, draw);
  for (const [index, date] of [...dates.entries()].reverse()) {
    const draft = draftOf(date, closes[index]);
    const id = await enterAndApprove(plan, draft);
    if (index === restatedBefore) await restate(plan, id, draft);
  }
  await enterWaiting(plan, waiting, closes[0]);
}
