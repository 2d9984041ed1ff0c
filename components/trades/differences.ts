import Decimal from 'decimal.js';
import { tradeText } from '@/constants/texts/trades';
import type { TradeVersion } from '@/shared/contracts/trades';
import { formatInstant } from '@/shared/format/dates';
import { formatQuantity } from '@/shared/format/numbers';

export type Difference = { field: string; before: string; after: string };

type Field = keyof typeof tradeText.fields;

const decimals: readonly Field[] = ['quantity', 'contractSize', 'strike', 'premiumAmount'];

function words(field: Field, text: string, timeZone: string): string {
  if (decimals.includes(field)) return formatQuantity(text);
  if (field === 'tradedAt') return formatInstant(text, timeZone);
  return text;
}

const isSame = (field: Field, before: string, after: string) =>
  before === after || (decimals.includes(field) && new Decimal(before).eq(after));

/** Every field that a version changes, with what stood there before. */
export function differencesOf(
  before: TradeVersion,
  after: TradeVersion,
  timeZone: string,
): Difference[] {
  const fields = Object.keys(tradeText.fields) as Field[];
  return fields
    .filter((field) => !isSame(field, before[field], after[field]))
    .map((field) => ({
      field: tradeText.fields[field],
      before: words(field, before[field], timeZone),
      after: words(field, after[field], timeZone),
    }));
}
