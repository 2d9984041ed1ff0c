/** Requests for tests: read from a reference file, or made at random. */
import fc from 'fast-check';
import { checkRequest, type Contract, type Market } from '@/pricing/contract';

/** The contract and market of a reference request; a request that does not pass is the test's error. */
export function contractAndMarket(request: unknown): { contract: Contract; market: Market } {
  const checked = checkRequest(request);
  if (!checked.ok) throw new Error(checked.issues.map(({ message }) => message).join(' '));
  return checked.request;
}

const numberBetween = (min: number, max: number) => fc.double({ min, max, noNaN: true });

const contracts: fc.Arbitrary<Contract> = fc.record({
  payoff: fc.constant('vanilla'),
  exercise: fc.constant('european'),
  kind: fc.constantFrom('call', 'put'),
  strike: numberBetween(1, 1000),
  expiry: numberBetween(0.001, 30),
});

const common = {
  spot: numberBetween(1, 1000),
  rate: numberBetween(-0.1, 0.3),
  volatility: numberBetween(0.001, 2),
};

const markets: fc.Arbitrary<Market> = fc.oneof(
  fc.record({ ...common, yield: numberBetween(-0.1, 0.3) }),
  fc.record({ ...common, carry: fc.constant('future' as const) }),
);

/** Any European vanilla option in any market that a desk could meet. */
export const europeanTerms = fc.record({ contract: contracts, market: markets });
