/**
 * Quotes: the server prices what the ticket shows once more, by every route, and keeps terms,
 * market, results and the engine's version, so that the number can be made again.
 */
import { Op, type Transaction, type WhereOptions } from 'sequelize';
import type { MethodName, PricingSuccess, Verdict } from '@/pricing/contract';
import { compareRoutes, engineVersion } from '@/pricing/index';
import type { Route } from '@/shared/contracts/pricing';
import type { Quote as QuoteOnTheWire, QuoteDraft } from '@/shared/contracts/quotes';
import { AppError } from '@/shared/errors';
import { expiryInstantMs, positionTotal, pricingRequestOf } from '@/shared/quote-terms';
import { Desk } from '../models/desk';
import { Quote } from '../models/quote';
import { Underlying } from '../models/underlying';
import type { DeskActor } from './access';
import { containing } from './containing';
import { after, pageOf } from './page';
import { activePolicy, toleranceOf } from './policies';
import { priceRoutes } from './pricing';
import { quoteIssues, ticketIssue } from './quote-issues';
import { quoteOf, summaryOf, withUnderlyingAndMaker } from './quote-rows';
import { findLastClose, yieldOf } from './underlyings';
import type { WriteOnce } from './write-once';

/** Booked amounts have at most fifteen digits before the point. */
const totalLimit = 1e15;

type Succeeded = { name: MethodName; result: PricingSuccess };

/** The route whose value is the quote's; another that worked stands in where it failed. */
function primaryOf(routes: readonly Route[], exercise: QuoteDraft['exercise']): Succeeded {
  const first: MethodName = exercise === 'european' ? 'closed-form' : 'heat-crank-nicolson';
  const succeeded = routes.flatMap(({ name, result }) => (result.ok ? [{ name, result }] : []));
  const primary = succeeded.find(({ name }) => name === first) ?? succeeded.at(0);
  if (primary) return primary;
  const failures = routes.flatMap(({ result }) => (result.ok ? [] : [ticketIssue(result)]));
  throw new AppError('cannot-price', failures);
}

function totalOf(value: number, draft: QuoteDraft): string {
  const total = positionTotal(value, draft);
  if (Math.abs(Number(total)) < totalLimit) return total;
  const message = 'The position’s value is too large to book; give a smaller quantity.';
  throw new AppError('validation-failed', [{ path: 'quantity', code: 'out-of-range', message }]);
}

async function nextNumber(desk: Desk, transaction: Transaction): Promise<string> {
  const locked = await Desk.findByPk(desk.id, { transaction, lock: true, rejectOnEmpty: true });
  const count = locked.lastQuoteNumber + 1;
  await locked.update({ lastQuoteNumber: count }, { transaction });
  return `Q-${String(count).padStart(4, '0')}`;
}

type Priced = { underlying: Underlying; expiryYears: number; routes: Route[]; primary: Succeeded };

async function priceDraft(desk: Desk, draft: QuoteDraft): Promise<Priced> {
  const underlying = await Underlying.findOne({
    where: { deskId: desk.id, id: draft.underlyingId, archivedAt: null },
  });
  const request = pricingRequestOf(draft, desk);
  const issues = quoteIssues(draft, underlying, desk, request);
  if (!underlying || issues.length > 0) throw new AppError('validation-failed', issues);
  const routes = await priceRoutes(request.contract, request.market);
  const primary = primaryOf(routes, draft.exercise);
  return { underlying, expiryYears: request.contract.expiry, routes, primary };
}

/** Prices first and writes last, so that no lock is held while the engine works. */
export async function createQuote(
  actor: DeskActor,
  draft: QuoteDraft,
  writeOnce: WriteOnce,
): Promise<QuoteOnTheWire> {
  const { desk, userId } = actor;
  const { market, pricedAt, ...terms } = draft;
  const { underlying, expiryYears, routes, primary } = await priceDraft(desk, draft);
  const { value, errorEstimate } = primary.result;
  const tolerance = toleranceOf(await activePolicy(desk.id), underlying, draft);
  const { verdict, refuted } = compareRoutes(routes, tolerance);
  const total = totalOf(value, draft);
  const close = await findLastClose(desk.id);
  return writeOnce(async (transaction) => {
    const { id } = await Quote.create(
      {
        ...terms,
        deskId: desk.id,
        number: await nextNumber(desk, transaction),
        spot: market.spot,
        rate: market.rate,
        yield: yieldOf(market),
        volatility: market.volatility,
        pricedAt: new Date(pricedAt),
        expiryAt: new Date(expiryInstantMs(draft.expiryDate, desk)),
        expiryYears,
        snapshotId: close?.id ?? null,
        value,
        errorEstimate,
        total,
        tolerance,
        verdict,
        refuted,
        primaryRoute: primary.name,
        routes,
        engine: engineVersion,
        createdById: userId,
      },
      { transaction },
    );
    return quoteOf(await findQuote(desk, id, transaction));
  });
}

async function findQuote(desk: Desk, id: string, transaction?: Transaction): Promise<Quote> {
  const quote = await Quote.findOne({
    where: { deskId: desk.id, id },
    include: withUnderlyingAndMaker,
    transaction,
  });
  if (!quote) throw new AppError('not-found');
  return quote;
}

export const getQuote = async (desk: Desk, id: string): Promise<QuoteOnTheWire> =>
  quoteOf(await findQuote(desk, id));

function matching(search: string | undefined): WhereOptions {
  if (search === undefined || search === '') return {};
  const pattern = { [Op.iLike]: containing(search) };
  return {
    [Op.and]: [
      {
        [Op.or]: [
          { number: pattern },
          { '$underlying.symbol$': pattern },
          { '$underlying.name$': pattern },
        ],
      },
    ],
  };
}

export async function listQuotes(
  desk: Desk,
  query: { cursor?: string; limit: number; search?: string; verdict?: Verdict },
) {
  const rows = await Quote.findAll({
    where: {
      deskId: desk.id,
      ...(query.verdict === undefined ? {} : { verdict: query.verdict }),
      ...matching(query.search),
      ...after('createdAt', query.cursor),
    },
    include: withUnderlyingAndMaker,
    order: [
      ['createdAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: query.limit + 1,
    subQuery: false,
  });
  return pageOf(rows, query.limit, summaryOf, ({ createdAt, id }) => ({ at: createdAt, id }));
}
