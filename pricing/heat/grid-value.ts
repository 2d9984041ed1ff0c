import type { PricingSuccess } from '@/pricing/contract';

export type GridSizes = {
  spaceSteps: number;
  timeSteps: number;
  smoothing: 'none' | 'richardson';
};

/** What a grid gives for one contract: a result without the method's own name and settings. */
export type GridValue = Pick<PricingSuccess, 'value' | 'greeks' | 'diagnostics'> & {
  errorEstimate: number;
};
