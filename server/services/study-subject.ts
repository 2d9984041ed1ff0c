/** What a study is of: a saved quote, a trade on an approved close, or terms of one's own. */
import { instantInZone } from '@/shared/dates';
import type { StudyDraft, StudyTerms } from '@/shared/contracts/studies';
import { AppError, type Issue } from '@/shared/errors';
import { pricingRequestOf } from '@/shared/quote-terms';
import type { Desk } from '../models/desk';
import { Quote } from '../models/quote';
import { Trade } from '../models/trade';
import { TradeVersion } from '../models/trade-version';
import { Underlying } from '../models/underlying';
import { closeThatWasApproved, marketIn } from './market-data';
import { quoteIssues } from './quote-issues';
import { marketOf } from './underlyings';

export type Subject = {
  source: StudyDraft['source']['kind'];
  quoteId: string | null;
  tradeId: string | null;
  tradeVersionId: string | null;
  terms: StudyTerms;
};

type SourceOf<Kind extends Subject['source']> = Extract<StudyDraft['source'], { kind: Kind }>;

function refuse(path: string, code: string, message: string): never {
  throw new AppError('validation-failed', [{ path: `source.${path}`, code, message }]);
}

const noTrade = { tradeId: null, tradeVersionId: null };

async function ofQuote(desk: Desk, { quoteId }: SourceOf<'quote'>): Promise<Subject> {
  const quote =
    (await Quote.findOne({ where: { deskId: desk.id, id: quoteId } })) ??
    refuse('quoteId', 'unknown-quote', 'There is no such quote on this desk; choose another.');
  const { underlyingId, kind, exercise, strike, expiryDate, pricedAt } = quote;
  const terms = {
    underlyingId,
    kind,
    exercise,
    strike,
    expiryDate,
    market: marketOf(quote),
    pricedAt: pricedAt.toISOString(),
  };
  return { source: 'quote', quoteId, ...noTrade, terms };
}

/** As a run on that close would price it: its market, at the desk's cut-off of its day. */
async function ofTrade(desk: Desk, source: SourceOf<'trade'>): Promise<Subject> {
  const trade =
    (await Trade.findOne({ where: { deskId: desk.id, id: source.tradeId } })) ??
    refuse('tradeId', 'unknown-trade', 'There is no such trade on this desk; choose another.');
  const version = await TradeVersion.findByPk(trade.liveVersionId ?? trade.latestVersionId, {
    rejectOnEmpty: true,
  });
  const snapshot =
    (await closeThatWasApproved(desk.id, source.snapshotId)) ??
    refuse('snapshotId', 'not-approved', 'Choose a close that was approved.');
  const { underlyingId, kind, exercise, strike, expiryDate, expiryAt } = version;
  const market =
    marketIn(snapshot, underlyingId) ??
    refuse('snapshotId', 'incomplete-close', `The close of ${snapshot.date} has no market for it.`);
  const pricedAtMs = instantInZone(snapshot.date, desk.expiryCutoff, desk.timeZone);
  if (expiryAt.getTime() <= pricedAtMs)
    refuse('tradeId', 'expired', `Trade ${trade.number} had expired by ${snapshot.date}.`);
  const pricedAt = new Date(pricedAtMs).toISOString();
  return {
    source: 'trade',
    quoteId: null,
    tradeId: trade.id,
    tradeVersionId: version.id,
    terms: { underlyingId, kind, exercise, strike, expiryDate, market, pricedAt },
  };
}

const below = (prefix: string, issues: readonly Issue[]): Issue[] =>
  issues.map((issue) => ({
    ...issue,
    path: issue.path === '' ? prefix : `${prefix}.${issue.path}`,
  }));

async function ofFreeTerms(desk: Desk, { terms }: SourceOf<'free'>): Promise<Subject> {
  const underlying = await Underlying.findOne({
    where: { deskId: desk.id, id: terms.underlyingId, archivedAt: null },
  });
  const issues = quoteIssues(terms, underlying, desk, pricingRequestOf(terms, desk));
  if (issues.length > 0) throw new AppError('validation-failed', below('source.terms', issues));
  return { source: 'free', quoteId: null, ...noTrade, terms };
}

export function subjectOf(desk: Desk, { source }: StudyDraft): Promise<Subject> {
  if (source.kind === 'quote') return ofQuote(desk, source);
  return source.kind === 'trade' ? ofTrade(desk, source) : ofFreeTerms(desk, source);
}
