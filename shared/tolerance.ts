/**
 * How far routes may lie apart and still agree, per unit: the stricter of what is asked per unit
 * and what is asked in money for the whole position. Ticket, quotes and runs take it from here.
 */
import Decimal from 'decimal.js';

export type ToleranceRule = {
  /** In the quote currency per unit. */
  tolerance: number;
  /** Decimal text, in the quote currency for a whole position; null where none is asked. */
  moneyTolerance: string | null;
};

export type PositionSize = { quantity: string; contractSize: string };

/** Wide enough for the quotient of any two booked decimals. */
const ExactDecimal = Decimal.clone({ precision: 70 });

export function toleranceFor(rule: ToleranceRule, size: PositionSize): number {
  if (rule.moneyTolerance === null) return rule.tolerance;
  const units = new ExactDecimal(size.quantity).times(size.contractSize).abs();
  if (units.isZero()) return rule.tolerance;
  const perUnit = new ExactDecimal(rule.moneyTolerance).div(units).toNumber();
  return Math.min(rule.tolerance, perUnit);
}
