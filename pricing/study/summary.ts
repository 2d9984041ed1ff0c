import type {
  OrderFit,
  RowFindings,
  StudyReference,
  StudyRow,
  StudySummary,
} from '@/pricing/contract';
import { ladderSeries } from '@/pricing/names';
import { log, pow } from '@/pricing/numerics/elementary';
import { fitOrder } from '@/pricing/study/fit-order';
import { settledDigits } from '@/pricing/study/settled-digits';

type Point = StudyRow & { value: number; error: number; belowReference: boolean };

/** An error this many times what the reference itself may be wrong by says something about the row. */
const aboveReference = 3;
const fewestPoints = 3;
/** What a measured order may differ by on smooth settings without a doubt about the scheme. */
const expectedWithin = 0.15;
/** An interval wider than this is no measurement. */
const widestHalf = 0.5;

/**
 * What the rows of one method say, as many of them as there are: each row against the reference and
 * against the row before it in its series, and one order per series with the verdict on it.
 *
 *   as-expected     the fitted order is within 0.15 of the theoretical one, or its 95 % interval
 *                   holds it
 *   lower, higher   neither
 *   not-determined  fewer than three rows above the reference's own error, or an interval wider
 *                   than ±0.5
 */
export function summariseStudy(
  rows: readonly StudyRow[],
  theoreticalOrder: number,
  reference: StudyReference,
): StudySummary {
  const findings: RowFindings[] = [];
  const fits: OrderFit[] = [];
  for (const series of ladderSeries) {
    const own = rows.filter((row) => row.series === series);
    if (own.length === 0) continue;
    const points = pointsOf(own, reference);
    fits.push({ series, ...judge(points, theoreticalOrder) });
    for (const row of own) findings.push(findingsOf(row, points, theoreticalOrder, reference));
  }
  findings.sort((a, b) => a.ordinal - b.ordinal);
  return { rows: findings, fits };
}

/** The rows of the ladder that have a value: the order is about these. */
function pointsOf(rows: readonly StudyRow[], reference: StudyReference): Point[] {
  return rows.flatMap((row) => {
    if (!row.result.ok || row.pastLimit) return [];
    const { value } = row.result;
    const error = Math.abs(value - reference.value);
    return [{ ...row, value, error, belowReference: isBelow(error, reference) }];
  });
}

const isBelow = (error: number, reference: StudyReference) =>
  error <= aboveReference * reference.errorEstimate;

function findingsOf(
  row: StudyRow,
  points: readonly Point[],
  theoreticalOrder: number,
  reference: StudyReference,
): RowFindings {
  const index = points.findIndex(({ ordinal }) => ordinal === row.ordinal);
  if (index < 0) {
    const error = row.result.ok ? Math.abs(row.result.value - reference.value) : null;
    const nothing = { ratio: null, order: null, richardson: null, settledDigits: 0 };
    return { ordinal: row.ordinal, error, ...nothing, belowReference: false };
  }
  const here = points[index];
  const before = index > 0 ? points[index - 1] : null;
  const richardson = before && extrapolated(before, here, theoreticalOrder);
  const later = points.slice(index + 1).map(({ value }) => value);
  const judges = later.length > 0 || richardson === null ? later : [richardson];
  const comparable = before !== null && before.error > 0 && here.error > 0;
  const grown = before === null ? 1 : here.size / before.size;
  return {
    ordinal: row.ordinal,
    error: here.error,
    ratio: comparable ? before.error / here.error : null,
    order: comparable ? log(before.error / here.error) / log(grown) : null,
    richardson,
    settledDigits: settledDigits(here.value, judges),
    belowReference: here.belowReference,
  };
}

function extrapolated(coarse: Point, fine: Point, order: number): number {
  const gain = pow(fine.size / coarse.size, order) - 1;
  return fine.value + (fine.value - coarse.value) / gain;
}

function judge(points: readonly Point[], theoreticalOrder: number): Omit<OrderFit, 'series'> {
  const used = points.filter(({ error, belowReference }) => error > 0 && !belowReference);
  if (used.length < fewestPoints) {
    const nothing = { order: null, standardError: null, halfWidth: null };
    return { points: used.length, ...nothing, verdict: 'not-determined' };
  }
  const fit = fitOrder(
    used.map(({ size }) => size),
    used.map(({ error }) => error),
  );
  const gap = fit.order - theoreticalOrder;
  const near = Math.abs(gap) <= Math.max(expectedWithin, fit.halfWidth);
  const found = near ? 'as-expected' : gap < 0 ? 'lower' : 'higher';
  const verdict = fit.halfWidth > widestHalf ? 'not-determined' : found;
  return { points: used.length, ...fit, verdict };
}
