/** From a stored study to what the wire shows of it. What follows from the rows is worked out here. */
import type { Includeable } from 'sequelize';
import type { LadderStep, PricingResult, RowFindings } from '@/pricing/contract';
import { summariseStudy } from '@/pricing/study';
import type {
  Study as StudyOnTheWire,
  StudyRoute,
  StudyRowOnTheWire,
  StudySummary,
} from '@/shared/contracts/studies';
import { Quote } from '../models/quote';
import type { PlannedLadder, Study } from '../models/study';
import type { StudyRow } from '../models/study-row';
import { Trade } from '../models/trade';
import { Underlying } from '../models/underlying';
import { User } from '../models/user';

export const withNames: Includeable[] = [
  { model: Underlying, as: 'underlying', required: true },
  { model: Quote, as: 'quote', attributes: ['id', 'number'] },
  { model: Trade, as: 'trade', attributes: ['id', 'number'] },
  { model: User, as: 'startedBy', attributes: ['id', 'name'], required: true },
  { model: User, as: 'decidedBy', attributes: ['id', 'name'] },
];

function headOf(study: Study) {
  const { underlying, startedBy, quote, trade, terms } = study;
  if (!underlying || !startedBy) throw new Error('A study was read without what it points to.');
  return {
    id: study.id,
    number: study.number,
    source: study.source,
    quote: quote ? { id: quote.id, number: quote.number } : null,
    trade: trade ? { id: trade.id, number: trade.number } : null,
    underlying: {
      id: underlying.id,
      symbol: underlying.symbol,
      name: underlying.name,
      currency: underlying.currency,
      unit: underlying.unit,
      priceDecimals: underlying.priceDecimals,
    },
    kind: terms.kind,
    exercise: terms.exercise,
    strike: terms.strike,
    expiryDate: terms.expiryDate,
    status: study.status,
    total: study.total,
    done: study.done,
    startedBy: { id: startedBy.id, name: startedBy.name },
    createdAt: study.createdAt.toISOString(),
  };
}

export const summaryOf = (study: Study): StudySummary => ({
  ...headOf(study),
  orders: study.orders ?? [],
});

function outcomeOf(result: PricingResult) {
  if (!result.ok)
    return {
      value: null,
      failure: result.message,
      warning: null,
      stability: null,
      amplification: null,
    };
  const { stabilityNumber = null, amplification = null } = result.diagnostics;
  return {
    value: result.value,
    failure: null,
    warning: result.warnings.at(0)?.message ?? null,
    stability: stabilityNumber,
    amplification,
  };
}

type Computed = LadderStep & { result: PricingResult; milliseconds: number };

const rowOf = ({ result, ...row }: Computed, findings: RowFindings): StudyRowOnTheWire => ({
  ...row,
  ...outcomeOf(result),
  ...findings,
});

export function routeOf(
  study: Study,
  ladder: PlannedLadder,
  stored: readonly StudyRow[],
): StudyRoute {
  const computed = ladder.steps.flatMap((step): Computed[] => {
    const row = stored.find(
      ({ route, ordinal }) => route === ladder.name && ordinal === step.ordinal,
    );
    return row ? [{ ...step, result: row.result, milliseconds: row.milliseconds }] : [];
  });
  const { rows, fits } = summariseStudy(computed, ladder.theoreticalOrder, study.reference);
  return {
    name: ladder.name,
    theoreticalOrder: ladder.theoreticalOrder,
    planned: ladder.steps.length,
    rows: computed.map((row, index) => rowOf(row, rows[index])),
    fits,
  };
}

export function studyOf(study: Study, stored: readonly StudyRow[]): StudyOnTheWire {
  const { decidedBy, decidedAt, decisionComment } = study;
  return {
    ...headOf(study),
    market: study.request.market,
    pricedAt: study.terms.pricedAt,
    expiryYears: study.request.contract.expiry,
    engine: study.engine,
    reference: study.reference,
    routes: study.ladders.map((ladder) => routeOf(study, ladder, stored)),
    finishedAt: study.finishedAt?.toISOString() ?? null,
    decision:
      decidedBy && decidedAt && decisionComment !== null
        ? {
            by: { id: decidedBy.id, name: decidedBy.name },
            at: decidedAt.toISOString(),
            comment: decisionComment,
          }
        : null,
    version: study.version,
  };
}
