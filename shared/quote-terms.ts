/**
 * From the terms of a quote to the engine's request, in one place: the ticket and the server must
 * price the very same numbers.
 */
import Decimal from 'decimal.js';
import { yearFraction, type PricingRequest, type VanillaContract } from '@/pricing/contract';
import type { QuoteTerms } from './contracts/quotes';
import { instantInZone } from './dates';

/** What a desk says about the end of an option's life. */
export type DeskClock = { timeZone: string; expiryCutoff: string };

export type PricedTerms = Pick<
  QuoteTerms,
  'kind' | 'exercise' | 'strike' | 'expiryDate' | 'market' | 'pricedAt'
>;

/** When an option of that day expires, in milliseconds since 1970. */
export const expiryInstantMs = (expiryDate: string, desk: DeskClock): number =>
  instantInZone(expiryDate, desk.expiryCutoff, desk.timeZone);

/** The request for these terms; an expiry that has passed gives one that the engine refuses. */
/** Desks trade vanilla options. */
type VanillaRequest = PricingRequest & { contract: VanillaContract };

export function pricingRequestOf(terms: PricedTerms, desk: DeskClock): VanillaRequest {
  const expiry = yearFraction(Date.parse(terms.pricedAt), expiryInstantMs(terms.expiryDate, desk));
  return {
    contract: {
      payoff: 'vanilla',
      exercise: terms.exercise,
      kind: terms.kind,
      strike: Number(terms.strike),
      expiry,
    },
    market: terms.market,
  };
}

export type PositionTerms = Pick<QuoteTerms, 'direction' | 'quantity' | 'contractSize'>;

/** Wide enough for the product of a double's text and two booked decimals. */
const ExactDecimal = Decimal.clone({ precision: 70 });

/** Units held: positive when the desk buys, negative when it sells. */
export function positionUnits({ direction, quantity, contractSize }: PositionTerms): Decimal {
  const units = new ExactDecimal(quantity).times(contractSize);
  return direction === 'buy' ? units : units.negated();
}

/** Booked amounts keep this many decimals; screens round further, to the currency's minor unit. */
const totalDecimals = 10;

/** The position's value: positive when the desk holds it, as an exact decimal of the value's text. */
export const positionTotal = (value: number, terms: PositionTerms): string =>
  positionUnits(terms).times(value).toDecimalPlaces(totalDecimals).toFixed();
