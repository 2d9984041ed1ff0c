import { exp } from '@/pricing/numerics/elementary';
import type { WalkStep } from '@/pricing/lattice/walk';

/**
 * Backward induction on a recombining walk, the inner loop of every lattice.
 *
 * The walk starts `lead` steps before now, so that now holds lead + 1 nodes around the spot, at
 * x = shift + (2j − lead)·h from ln(spot), j = 0 … lead; the node in the middle (even lead, no
 * shift) carries exactly the value of the tree that starts at the spot. From them come delta and
 * gamma at the present instant, and the value at the spot for a walk whose nodes are shifted.
 *
 * Nodes that the walk from around the spot meets with a probability below 1e-11 are not rolled
 * (`deviations` of its spread on both sides of its mean): work n^1.5 instead of n². Null rolls every
 * node.
 */
export type RollBackTerms = {
  spot: number;
  strike: number;
  kind: 'call' | 'put';
  american: boolean;
};

/** e^(kh) for k = 0 … count: one table serves every shift and every bumped rate of one size. */
export function makePowers(step: number, count: number): Float64Array {
  const powers = new Float64Array(count + 1);
  for (let k = 0; k <= count; k++) powers[k] = exp(k * step);
  return powers;
}

/** Values at the lead + 1 nodes of the present instant. `powers` reach steps + lead. */
export function rollBack(
  terms: RollBackTerms,
  walk: WalkStep,
  powers: Float64Array,
  steps: number,
  lead: number,
  shift: number,
  deviations: number | null,
): Float64Array {
  const last = steps + lead;
  const ladders = payoffLadders(terms, powers, last, shift);
  const values = new Float64Array(last + 1);
  for (let j = 0; j <= last; j++) values[j] = ladders.same[j] > 0 ? ladders.same[j] : 0;

  const { up, down, upProbability: p } = walk;
  for (let level = last - 1; level >= lead; level--) {
    const age = level - lead;
    const spread = deviations === null ? level : deviations * Math.sqrt(age * p * (1 - p)) + 1;
    const low = Math.max(0, Math.floor(age * p - spread));
    const high = Math.min(level, Math.ceil(age * p + spread) + lead);
    let here = values[low];
    if (terms.american) {
      const gone = last - level;
      const ladder = (gone & 1) === 0 ? ladders.same : ladders.between;
      const offset = gone >> 1;
      for (let j = low; j <= high; j++) {
        const next = values[j + 1];
        const held = down * here + up * next;
        const taken = ladder[offset + j];
        values[j] = held > taken ? held : taken;
        here = next;
      }
    } else {
      for (let j = low; j <= high; j++) {
        const next = values[j + 1];
        values[j] = down * here + up * next;
        here = next;
      }
    }
  }
  return values.slice(0, lead + 1);
}

/** The payoff on the two interleaved sets of nodes: those of the last level, and those between. */
function payoffLadders(
  { spot, strike, kind }: RollBackTerms,
  powers: Float64Array,
  last: number,
  shift: number,
): { same: Float64Array; between: Float64Array } {
  const same = new Float64Array(last + 1);
  const between = new Float64Array(last);
  const start = shift === 0 ? spot : spot * exp(shift);
  const sign = kind === 'call' ? 1 : -1;
  for (let l = 0; l <= 2 * last; l++) {
    const k = l - last;
    const price = k < 0 ? start / powers[-k] : start * powers[k];
    const payoff = sign * (price - strike);
    if ((l & 1) === 0) same[l >> 1] = payoff;
    else between[l >> 1] = payoff;
  }
  return { same, between };
}
