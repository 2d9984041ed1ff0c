import Decimal from 'decimal.js';
import { formatNumber, hardSpace, type Amount, type SignStyle } from './numbers';

/** Decimals of a currency's minor unit, from the ISO 4217 table that Intl carries. */
export const minorUnitDecimals = (currency: string): number =>
  new Intl.NumberFormat('en', { style: 'currency', currency }).resolvedOptions()
    .maximumFractionDigits ?? 2;

/** The amount alone, rounded to the minor unit, halves away from zero. */
export const formatAmount = (
  amount: Amount,
  currency: string,
  sign: SignStyle = 'negative',
): string => {
  const decimals = minorUnitDecimals(currency);
  return formatNumber(new Decimal(amount).toFixed(decimals), decimals, sign);
};

export const formatMoney = (
  amount: Amount,
  currency: string,
  sign: SignStyle = 'negative',
): string => `${formatAmount(amount, currency, sign)}${hardSpace}${currency}`;
