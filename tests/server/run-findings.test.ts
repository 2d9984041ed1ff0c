/** Which finding needs an answer, and how much of it is at stake. */
import type { PricingResult, Verdict } from '@/pricing/contract';
import { countsOf, exceptionOf } from '@/server/services/run-findings';
import type { RunTrade } from '@/server/services/run-trades';
import type { TaskFinding, ValuedRoute } from '@/server/threads/value';

const failure: PricingResult = {
  ok: false,
  code: 'numerical-failure',
  path: '',
  message: 'It did not converge.',
};
const success: PricingResult = {
  ok: true,
  value: 12,
  errorEstimate: 1e-9,
  greeks: { delta: 0, gamma: 0, vega: 0, theta: 0, rho: 0, yieldRho: null },
  method: { name: 'closed-form' },
  diagnostics: {},
  warnings: [],
};

const route = (result: PricingResult): ValuedRoute => ({
  request: {
    contract: { payoff: 'vanilla', exercise: 'european', kind: 'put', strike: 210, expiry: 1 },
    market: { spot: 210, rate: 0.02, carry: 'future', volatility: 0.2 },
    method: { name: 'closed-form' },
  },
  result,
});

const finding = (verdict: Verdict, fields: Partial<TaskFinding> = {}): TaskFinding => ({
  primary: route(success),
  check: route(success),
  verdict,
  refuted: false,
  distance: verdict === 'one-route' ? null : 0.02,
  ...fields,
});

const trade = {
  direction: 'sell',
  quantity: '10.5',
  contractSize: '50',
} as RunTrade;

const failed = finding('one-route', { check: route(failure) });

test.each([
  ['agree', finding('agree'), null],
  ['agree, but an estimate was refuted', finding('agree', { refuted: true }), 'refuted'],
  ['wide', finding('wide'), 'wide'],
  ['disagree, which refutes an estimate too', finding('disagree', { refuted: true }), 'disagree'],
  ['one route, both with a value', finding('one-route'), 'unchecked'],
  ['one route, as the other failed', failed, 'failure'],
])('%s', (_case, found, kind) => {
  expect(exceptionOf(trade, found)?.kind ?? null).toBe(kind);
});

test('what is at stake is the distance times all units, whichever way the trade goes', () => {
  // 0.02 × 10.5 × 50, exact in decimals.
  expect(exceptionOf(trade, finding('disagree'))?.materiality).toBe('10.5');
  expect(exceptionOf(trade, failed)?.materiality).toBeNull();
});

test('each trade is counted once, and the refuted ones besides', () => {
  const findings = [
    finding('agree', { refuted: true }),
    finding('wide'),
    finding('disagree'),
    failed,
  ];
  expect(countsOf(findings)).toEqual({
    agree: 1,
    wide: 1,
    disagree: 1,
    oneRoute: 0,
    failed: 1,
    refuted: 1,
  });
});
