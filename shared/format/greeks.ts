/**
 * The Greeks as people read them. The engine gives every sensitivity per 1.00 of its variable and
 * theta per year; a screen shows them per one point (0.01), per basis point (0.0001) or per
 * calendar day. The factors stand in this table only.
 */
import type { Greeks } from '@/pricing/contract';
import { alignDecimals, formatNumber, formatPower, type AlignedText } from './numbers';

const perPoint = 1e-2;
const perBasisPoint = 1e-4;
const perDay = 1 / 365;

type GreekRow = { greek: keyof Greeks; label: string; per: string; scale: number };

const greekTable: readonly GreekRow[] = [
  { greek: 'delta', label: 'delta', per: 'per 1.00', scale: 1 },
  { greek: 'gamma', label: 'gamma', per: 'per 1.00', scale: 1 },
  { greek: 'vega', label: 'vega', per: 'per point', scale: perPoint },
  { greek: 'theta', label: 'theta', per: 'per day', scale: perDay },
  { greek: 'rho', label: 'rho', per: 'per point', scale: perPoint },
  { greek: 'rho', label: 'rho', per: 'per basis point', scale: perBasisPoint },
  { greek: 'yieldRho', label: 'yield', per: 'per point', scale: perPoint },
  { greek: 'vanna', label: 'vanna', per: 'per 1.00 and point', scale: perPoint },
  { greek: 'volga', label: 'volga', per: 'per point, twice', scale: perPoint * perPoint },
];

export type ShownGreek = { label: string; per: string; value: number };

/** The Greeks that the result has, scaled for the screen, in the order of the table. */
export function shownGreeks(greeks: Greeks): ShownGreek[] {
  return greekTable.flatMap(({ greek, label, per, scale }) => {
    const value = greeks[greek];
    return value === null || value === undefined ? [] : [{ label, per, value: value * scale }];
  });
}

const significantDigits = 4;
const mostDecimals = 6;
/** What six decimals would not show any more is written with a power of ten. */
const smallestPlain = 1e-5;

function spellSensitivity(value: number): string {
  if (value === 0) return '0';
  if (Math.abs(value) < smallestPlain) return formatPower(value, 2);
  const power = Number(value.toExponential(significantDigits - 1).split('e')[1]);
  const decimals = Math.min(mostDecimals, Math.max(0, significantDigits - 1 - power));
  return formatNumber(value, decimals);
}

/** A column of sensitivities with up to four significant digits each, aligned on the point. */
export const formatSensitivities = (values: readonly number[]): AlignedText[] =>
  alignDecimals(values.map(spellSensitivity));
