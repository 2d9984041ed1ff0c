/** What may be wrong with a close besides its shape, each at the field where it is mended. */
import type { Transaction } from 'sequelize';
import type { SnapshotDraft } from '@/shared/contracts/market-data';
import { AppError, type Issue } from '@/shared/errors';
import { marketWarnings, warningKey, type QuotedMarket } from '@/shared/market-warnings';
import type { Desk } from '../models/desk';
import { MarketSnapshot } from '../models/market-snapshot';
import type { Underlying } from '../models/underlying';
import { today } from './access';
import { findPrevious, listedUnderlyings, marketsOf } from './market-data';

type Numbers = Pick<SnapshotDraft, 'date' | 'quotes' | 'confirmedWarnings'>;

function quoteIssues(
  quotes: SnapshotDraft['quotes'],
  underlyings: ReadonlyMap<string, Underlying>,
): Issue[] {
  const seen = new Set<string>();
  return quotes.flatMap(({ underlyingId, market }, index): Issue[] => {
    const path = `quotes.${index}`;
    const underlying = underlyings.get(underlyingId);
    if (!underlying || underlying.archivedAt !== null) {
      const message = 'This underlying is not on the desk; leave it out.';
      return [{ path: `${path}.underlyingId`, code: 'unknown-underlying', message }];
    }
    if (seen.has(underlyingId)) {
      const message = `${underlying.symbol} stands here twice; leave one of them out.`;
      return [{ path: `${path}.underlyingId`, code: 'duplicate', message }];
    }
    seen.add(underlyingId);
    const isFuture = underlying.kind === 'future';
    if (isFuture === 'carry' in market) return [];
    return [
      isFuture
        ? {
            path: `${path}.market.yield`,
            code: 'unknown-field',
            message: `${underlying.symbol} is a future and has no yield of its own; leave it out.`,
          }
        : {
            path: `${path}.market.yield`,
            code: 'missing',
            message: `Give the yield or the foreign rate of ${underlying.symbol}.`,
          },
    ];
  });
}

/** A warning that nobody has confirmed stands in the way; one that has gone does not. */
function warningIssues(
  quotes: readonly QuotedMarket[],
  previous: MarketSnapshot | null,
  confirmed: readonly string[],
): Issue[] {
  return marketWarnings(quotes, marketsOf(previous))
    .filter((warning) => !confirmed.includes(warningKey(warning)))
    .map(({ message }) => ({ path: 'confirmedWarnings', code: 'unconfirmed', message }));
}

export async function dateIssues(
  desk: Desk,
  date: string,
  { id, restatesId }: { id: string | null; restatesId: string | null },
  transaction: Transaction,
): Promise<Issue[]> {
  const path = 'date';
  if (date > today(desk))
    return [
      { path, code: 'future', message: 'This day has not come yet; give its date or earlier.' },
    ];
  const others = await MarketSnapshot.findAll({
    where: { deskId: desk.id, date, status: ['draft', 'approved'] },
    transaction,
  });
  const approved = others.find(({ status }) => status === 'approved');
  if (restatesId !== null && approved?.id !== restatesId) {
    const message = 'A restatement keeps its day.';
    return [{ path, code: 'restated-day', message }];
  }
  if (restatesId === null && approved) {
    const message = `The close of ${date} is approved; open it and restate it.`;
    return [{ path, code: 'approved-already', message }];
  }
  if (others.some((other) => other.status === 'draft' && other.id !== id)) {
    const message = `There is a draft of ${date} already; open it in the list.`;
    return [{ path, code: 'draft-already', message }];
  }
  return [];
}

/** Everything that is wrong with the numbers of a draft; what is unlikely only when nothing is wrong. */
export async function refuseWrong(
  desk: Desk,
  numbers: Numbers,
  draft: MarketSnapshot | null,
  transaction: Transaction,
) {
  const listed = await listedUnderlyings(desk.id, transaction);
  const underlyings = new Map(listed.map((row) => [row.id, row]));
  const own = draft ?? { id: null, restatesId: null };
  const issues = [
    ...(await dateIssues(desk, numbers.date, own, transaction)),
    ...quoteIssues(numbers.quotes, underlyings),
  ];
  if (issues.length === 0) {
    const quotes = numbers.quotes.map((quote) => ({
      ...quote,
      symbol: underlyings.get(quote.underlyingId)?.symbol ?? '',
    }));
    const previous = await findPrevious(desk.id, numbers.date, transaction);
    issues.push(...warningIssues(quotes, previous, numbers.confirmedWarnings));
  }
  if (issues.length > 0) throw new AppError('validation-failed', issues);
}
