import type { MethodSettings, PricingResult } from '@/pricing/contract';
import type { ladderSeries, orderVerdicts } from '@/pricing/names';

/** One rung: the settings to price with, and the one size that the order is measured in. */
export type LadderStep = {
  ordinal: number;
  series: (typeof ladderSeries)[number];
  /** Space steps of a grid, steps of a walk. */
  size: number;
  settings: MethodSettings;
  /** Run past the stability limit on purpose: shown, and left out of the order. */
  pastLimit: boolean;
};

export type StudyRow = LadderStep & { result: PricingResult };

/** What the errors of a study are measured against, and how far it can be trusted itself. */
export type StudyReference = { method: MethodSettings; value: number; errorEstimate: number };

/** What follows from a row and from those before and after it; null where there is nothing to say. */
export type RowFindings = {
  ordinal: number;
  /** |value − reference|. */
  error: number | null;
  /** The error of the row before in its series over this one's. */
  ratio: number | null;
  /** ln(e₁/e₂)/ln(n₂/n₁) with the row before. */
  order: number | null;
  /** Extrapolated from this row and the one before at the theoretical order. */
  richardson: number | null;
  /** How many leading digits of the value all later rows keep. */
  settledDigits: number;
  /** The error is not above what the reference itself may be wrong by: left out of the order. */
  belowReference: boolean;
};

export type OrderFit = {
  series: LadderStep['series'];
  /** Rows that the order was fitted to. */
  points: number;
  order: number | null;
  standardError: number | null;
  /** Half the width of the 95 % interval of the order (Student's t). */
  halfWidth: number | null;
  verdict: (typeof orderVerdicts)[number];
};

export type StudySummary = { rows: RowFindings[]; fits: OrderFit[] };
