/** What may be wrong with a trade besides its shape, each at the field where it is mended. */
import Decimal from 'decimal.js';
import type { TradeAmendment } from '@/shared/contracts/trade-acts';
import type { Deal, TradedTerms } from '@/shared/contracts/trades';
import { dateInZone } from '@/shared/dates';
import type { Issue } from '@/shared/errors';
import { expiryInstantMs, type DeskClock } from '@/shared/quote-terms';
import { mayEnd, type ExpiryOutcome } from '@/shared/trade-moves';
import type { TradeVersion } from '../models/trade-version';
import { dealOf, termsOf } from './trade-rows';

/** Clocks differ a little. */
const longestFutureMs = 2 * 60_000;

const issue = (path: string, code: string, message: string): Issue => ({ path, code, message });

/** What both a proposal and an amendment must keep. */
export function dealIssues(deal: Deal, expiryDate: string, desk: DeskClock): Issue[] {
  const tradedAt = Date.parse(deal.tradedAt);
  const expiryAt = expiryInstantMs(expiryDate, desk);
  const issues: Issue[] = [];
  if (tradedAt > Date.now() + longestFutureMs)
    issues.push(issue('tradedAt', 'out-of-range', 'A trade cannot be agreed in the future.'));
  else if (tradedAt >= expiryAt)
    issues.push(issue('tradedAt', 'out-of-range', 'This is after the option’s expiry.'));
  if (expiryAt <= Date.now())
    issues.push(
      issue('expiryDate', 'past-expiry', 'This expiry has passed; an option needs a later one.'),
    );
  if (deal.premiumDate < dateInZone(tradedAt, desk.timeZone))
    issues.push(
      issue('premiumDate', 'out-of-range', 'A premium is not paid before the trade is agreed.'),
    );
  return issues;
}

const sameField = (before: string, after: string): boolean =>
  before === after || (isNumber(before) && isNumber(after) && new Decimal(before).eq(after));

const isNumber = (text: string) => /^-?\d+(\.\d+)?$/.test(text);

/** An amendment that changes nothing would ask someone to approve what stands already. */
export function unchangedIssues(latest: TradeVersion, amendment: TradeAmendment): Issue[] {
  const before: TradedTerms & Deal = { ...termsOf(latest), ...dealOf(latest) };
  const after = { ...amendment, tradedAt: new Date(amendment.tradedAt).toISOString() };
  const fields = Object.keys(before) as (keyof typeof before)[];
  if (fields.some((field) => !sameField(before[field], after[field]))) return [];
  return [issue('', 'unchanged', 'Nothing is different from the last version; change something.')];
}

type EndDay = { date: string; today: string; tradedDay: string };

/** An end lies between the trade and today. */
export function endDayIssues({ date, today, tradedDay }: EndDay): Issue[] {
  if (date > today)
    return [issue('date', 'out-of-range', 'This day is yet to come; give today or before.')];
  if (date < tradedDay)
    return [
      issue('date', 'out-of-range', `The trade was agreed on ${tradedDay}; give a later day.`),
    ];
  return [];
}

export function expiryIssues(
  outcome: ExpiryOutcome,
  date: string,
  { exercise, expiryAt, expiryDate }: Pick<TradeVersion, 'exercise' | 'expiryAt' | 'expiryDate'>,
): Issue[] {
  if (!mayEnd(outcome, exercise, expiryAt.getTime(), Date.now()))
    return [
      issue(
        'outcome',
        'before-expiry',
        `This option lives until ${expiryDate}; only an American one is exercised before.`,
      ),
    ];
  const early = outcome === 'exercised' && exercise === 'american';
  if (date > expiryDate || (date < expiryDate && !early))
    return [issue('date', 'out-of-range', `Its day is ${expiryDate}; give that one.`)];
  return [];
}
