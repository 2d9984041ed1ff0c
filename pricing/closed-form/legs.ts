import type { Contract, Market } from '@/pricing/contract';
import { carryYield } from '@/pricing/conventions';
import { exp, expm1, logRatio } from '@/pricing/numerics/elementary';

/**
 * What a European option exchanges at expiry, discounted to now, without any volatility:
 * A = spot exp(-yield T), B = strike exp(-rate T), and x = ln(A / B).
 */
export type Legs = {
  /** 1 for a call, -1 for a put. */
  sign: number;
  legA: number;
  legB: number;
  /** x is the sum of these two; the first is right to its last bit however near the prices are. */
  logSpotStrike: number;
  drift: number;
  x: number;
  yieldDiscount: number;
  carry: number;
};

export function legsOf(contract: Contract, market: Market): Legs {
  const { strike, expiry } = contract;
  const { spot, rate } = market;
  const carry = carryYield(market);
  const yieldDiscount = exp(-carry * expiry);
  const logSpotStrike = logRatio(spot, strike);
  const drift = (rate - carry) * expiry;
  return {
    sign: contract.kind === 'call' ? 1 : -1,
    legA: spot * yieldDiscount,
    legB: strike * exp(-rate * expiry),
    logSpotStrike,
    drift,
    x: logSpotStrike + drift,
    yieldDiscount,
    carry,
  };
}

/** The discounted gain of the holder at the forward, A - B for a call, as parity has it. */
export function forwardGain({ sign, legA, legB, x }: Legs): number {
  return sign * (Math.abs(x) < 0.5 ? legB * expm1(x) : legA - legB);
}
