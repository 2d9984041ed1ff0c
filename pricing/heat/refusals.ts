import type { PricingFailure } from '@/pricing/contract';

const fewest = { spaceSteps: 32, timeSteps: 8 };
const largestDeviation = 25;

type Sizes = { spaceSteps: number; timeSteps: number };

/** What no grid in heat coordinates can do: too few steps for its quarter, too wide a distribution. */
export function refuseGrid(sizes: Sizes, deviation: number): PricingFailure | null {
  return tooFew('spaceSteps', sizes) ?? tooFew('timeSteps', sizes) ?? tooWide(deviation);
}

function tooFew(size: keyof Sizes, sizes: Sizes): PricingFailure | null {
  if (sizes[size] >= fewest[size]) return null;
  const noun = size === 'spaceSteps' ? 'space steps' : 'time steps';
  return {
    ok: false,
    code: 'too-few-steps',
    path: `method.${size}`,
    message: `The grid needs at least ${fewest[size]} ${noun}: a quarter of them must still be a grid.`,
  };
}

function tooWide(deviation: number): PricingFailure | null {
  if (deviation <= largestDeviation) return null;
  return {
    ok: false,
    code: 'numerical-failure',
    path: 'market.volatility',
    message: `Volatility times the root of the expiry is ${deviation.toFixed(1)}, and the grid resolves up to ${largestDeviation}: lower the volatility or the expiry, or use another method.`,
  };
}
