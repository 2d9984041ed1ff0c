/**
 * One position so large that the tolerance in money leaves little per unit. Its strike is looked for
 * where the sizes of the first policy let the routes lie further apart than they admit, so that the
 * last run has a disagreement to explain.
 */
import type { Market, VanillaContract } from '@/pricing/contract';
import { dateOfTenor, instantInZone } from '@/shared/dates';
import { pricingRequestOf } from '@/shared/quote-terms';
import { sequelize } from '../database';
import { today, type DeskActor } from '../services/access';
import { listBooks } from '../services/books';
import { approvedSnapshot } from '../services/market-data';
import { valueTrades } from '../services/run-threads';
import { approveTrade, proposeTrade } from '../services/trade-acts';
import { firstSizes, moneyTolerances } from './policies';
import { saveQuote, type Listed } from './quotes';
import { agreedDaysAgo } from './trades';

export type LargeTradePlan = {
  listed: Listed;
  bookCode: string;
  proposer: DeskActor;
  approver: DeskActor;
};

const quantity = '5000';
const tenor = '6m';
const agreedDays = 18;

/** From fifteen per cent below the price to fifteen above it. */
const moneynesses = Array.from({ length: 61 }, (_, index) => 0.85 + 0.005 * index);

async function disagreeingStrike(
  contractOf: (strike: string) => VanillaContract,
  { market, priceDecimals, contractSize, currency }: Listed['underlying'],
): Promise<string> {
  const tolerance = Number(moneyTolerances[currency]) / (Number(quantity) * Number(contractSize));
  const strikes = moneynesses.map((share) => (market.spot * share).toFixed(priceDecimals));
  const findings = await valueTrades(
    strikes.map((strike) => ({
      contract: contractOf(strike),
      market,
      tolerance,
      primary: { name: 'closed-form' },
      check: { name: 'heat-crank-nicolson', ...firstSizes['heat-crank-nicolson'] },
    })),
  );
  const index = findings.findIndex(({ verdict }) => verdict === 'disagree');
  if (index < 0) throw new Error('No strike of the demonstration makes the routes disagree.');
  return strikes[index];
}

export async function seedLargeTrade({ listed, bookCode, proposer, approver }: LargeTradePlan) {
  const { desk } = proposer;
  const { id: underlyingId, underlying } = listed;
  const expiryDate = dateOfTenor(tenor, today(desk));
  const close = await approvedSnapshot(desk.id);
  const book = (await listBooks(desk)).find(({ code }) => code === bookCode);
  if (expiryDate === null || !close || !book) throw new Error('The desk is not set up yet.');
  const valuedAtMs = instantInZone(close.date, desk.expiryCutoff, desk.timeZone);
  const market: Market = underlying.market;
  const terms = {
    kind: 'put' as const,
    exercise: 'european' as const,
    direction: 'sell' as const,
    quantity,
    note: 'The whole season in one deal',
    underlyingId,
    contractSize: underlying.contractSize,
    expiryDate,
    market,
  };
  const contractOf = (strike: string) =>
    pricingRequestOf({ ...terms, strike, pricedAt: new Date(valuedAtMs).toISOString() }, desk)
      .contract;
  const strike = await disagreeingStrike(contractOf, underlying);
  const quote = await saveQuote(proposer, {
    ...terms,
    strike,
    pricedAt: new Date(Date.now()).toISOString(),
  });
  const trade = await proposeTrade(
    proposer,
    {
      quoteId: quote.id,
      bookId: book.id,
      counterparty: 'Ashcombe Shipping',
      premiumAmount: Math.abs(Number(quote.total)).toFixed(2),
      premiumCurrency: underlying.currency,
      ...agreedDaysAgo(desk, agreedDays),
      note: '',
    },
    (write) => sequelize.transaction(write),
  );
  await approveTrade(approver, { tradeId: trade.id, version: trade.version });
}
