/**
 * Numbers of a close that are allowed and yet unlikely. They are shown while the close is typed, and
 * whoever saves or approves it confirms each of them.
 */
import type { Market } from '@/pricing/contract';
import { formatPercent } from './format/numbers';

/** Against the last approved close; common practice for a first check, no source. */
const largestMove = 0.2;
/** Between 1 % and 300 % a year; common practice, no source. */
const usualVolatility = { min: 0.01, max: 3 };

export const marketWarningCodes = ['large-move', 'unusual-volatility'] as const;

export type MarketWarning = {
  underlyingId: string;
  code: (typeof marketWarningCodes)[number];
  message: string;
};

export type QuotedMarket = { underlyingId: string; symbol: string; market: Market };

/** What a person confirms is the warning of this underlying, whatever its words. */
export const warningKey = ({ underlyingId, code }: Omit<MarketWarning, 'message'>): string =>
  `${underlyingId} ${code}`;

function moveWarning({ symbol, market }: QuotedMarket, before: Market | undefined) {
  if (!before) return null;
  const move = market.spot / before.spot - 1;
  if (Math.abs(move) <= largestMove) return null;
  const size = formatPercent(Math.round(Math.abs(move) * 1000) / 1000, 1);
  return `${symbol}: the price is ${size} ${move > 0 ? 'above' : 'below'} the close before.`;
}

function volatilityWarning({ symbol, market: { volatility } }: QuotedMarket) {
  if (volatility >= usualVolatility.min && volatility <= usualVolatility.max) return null;
  const { min, max } = usualVolatility;
  const size = formatPercent(volatility, 0);
  return `${symbol}: a volatility of ${size} is outside ${formatPercent(min, 0)} to ${formatPercent(max, 0)}.`;
}

export function marketWarnings(
  quotes: readonly QuotedMarket[],
  before: ReadonlyMap<string, Market>,
): MarketWarning[] {
  return quotes.flatMap((quote) => {
    const { underlyingId } = quote;
    const messages = {
      'large-move': moveWarning(quote, before.get(underlyingId)),
      'unusual-volatility': volatilityWarning(quote),
    };
    return marketWarningCodes.flatMap((code) => {
      const message = messages[code];
      return message === null ? [] : [{ underlyingId, code, message }];
    });
  });
}
