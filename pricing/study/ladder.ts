import type { Contract, LadderStep, Market, MethodName, MethodSettings } from '@/pricing/contract';
import { sizeLimits } from '@/pricing/conventions';
import type { Method, MethodSizes } from '@/pricing/method';
import { methodNamed } from '@/pricing/registry';

/** Where a ladder starts (space steps or steps; the method's coarsest where left out), and its length. */
export type LadderBase = { firstSize?: number; rows: number };

/** The row whose grid is shown past the stability limit: fine enough to blow up, still readable. */
const shownPastLimit = 1;

/**
 * The settings of a study of one method, coarsest first, each size at least twice the one before,
 * as many as the caps allow. The plain scheme is studied (`smoothing: 'none'`), because that is
 * what the theoretical order speaks of. Walks get a ladder of odd and one of even lengths, side by
 * side, where they exist for both; a scheme with a stability limit gets one more row past it. A method without sizes (the
 * closed form) has nothing to refine: no rows.
 */
export function planLadder(
  name: MethodName,
  contract: Contract,
  market: Market,
  base: LadderBase,
): LadderStep[] {
  const method = methodNamed(name);
  if (method.theoreticalOrder === null) return [];
  if (method.coarsestSettings.steps !== undefined) return walkLadder(method, base);
  return gridLadder(method, contract, market, base);
}

function walkLadder(method: Method, { firstSize, rows }: LadderBase): LadderStep[] {
  const first = firstSize ?? method.coarsestSettings.steps ?? sizeLimits.steps.min;
  const steps: LadderStep[] = [];
  const add = (series: 'even' | 'odd', size: number) => {
    if (size > sizeLimits.steps.max || (method.oddSteps && series === 'even')) return;
    const settings = settingsOf(method, { steps: size });
    steps.push({ ordinal: steps.length, series, size, settings, pastLimit: false });
  };
  // 64, 128, 256 … beside 65, 131, 263 …: 2n + 1 is the first odd length that at least doubles n.
  let even = first + (first & 1);
  let odd = even + 1;
  for (let row = 0; row < rows; row++) {
    add('even', even);
    add('odd', odd);
    even *= 2;
    odd = 2 * odd + 1;
  }
  return steps;
}

function gridLadder(
  method: Method,
  contract: Contract,
  market: Market,
  { firstSize, rows }: LadderBase,
): LadderStep[] {
  const steps: LadderStep[] = [];
  let sizes: MethodSizes | null = firstGrid(method, firstSize);
  while (sizes !== null && steps.length < rows) {
    steps.push(gridStep(method, sizes, steps.length, false));
    sizes = refined(method, sizes);
  }
  const shown = steps[Math.min(shownPastLimit, steps.length - 1)];
  if (method.stability && shown) {
    const past = method.stability.pastLimit(contract, market, shown.settings);
    steps.push(gridStep(method, past, steps.length, true));
  }
  return steps;
}

function firstGrid(method: Method, firstSize: number | undefined): MethodSizes {
  const { spaceSteps = 0, timeSteps = 0 } = method.coarsestSettings;
  if (firstSize === undefined) return { spaceSteps, timeSteps };
  const share = firstSize / spaceSteps;
  const quadratic = (method.stability?.timeGrowth ?? 2) === 4;
  const scaled = Math.ceil(timeSteps * (quadratic ? share * share : share));
  return { spaceSteps: firstSize, timeSteps: Math.max(sizeLimits.timeSteps.min, scaled) };
}

function refined(method: Method, { spaceSteps = 0, timeSteps = 0 }: MethodSizes) {
  const next = {
    spaceSteps: 2 * spaceSteps,
    timeSteps: (method.stability?.timeGrowth ?? 2) * timeSteps,
  };
  const allowed =
    next.spaceSteps <= sizeLimits.spaceSteps.max && next.timeSteps <= sizeLimits.timeSteps.max;
  return allowed ? next : null;
}

function gridStep(
  method: Method,
  sizes: MethodSizes,
  ordinal: number,
  pastLimit: boolean,
): LadderStep {
  const size = sizes.spaceSteps ?? 0;
  return { ordinal, series: 'all', size, settings: settingsOf(method, sizes), pastLimit };
}

function settingsOf(method: Method, sizes: MethodSizes): MethodSettings {
  return { ...sizes, name: method.name, smoothing: 'none' };
}
