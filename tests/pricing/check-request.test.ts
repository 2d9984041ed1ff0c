/** What a request must satisfy: each field's own refusals, and whatever else may arrive. */
import fc from 'fast-check';
import { checkRequest, type PricingIssue } from '@/pricing/contract';
import { price } from '@/pricing/index';

const contract = {
  payoff: 'vanilla',
  exercise: 'american',
  kind: 'put',
  strike: 100,
  expiry: 0.5,
};
const market = { spot: 100, rate: 0.05, yield: 0.02, volatility: 0.2 };
const request = { contract, market };

function issuesOf(input: unknown): PricingIssue[] {
  const checked = checkRequest(input);
  return checked.ok ? [] : checked.issues;
}

const codesOf = (input: unknown) => issuesOf(input).map(({ path, code }) => `${path} ${code}`);

it.each([
  request,
  { ...request, method: { name: 'closed-form' } },
  { ...request, method: { name: 'heat-crank-nicolson', spaceSteps: 400, timeSteps: 200 } },
  { ...request, method: { name: 'lattice-crr', steps: 3, smoothing: 'none' } },
  { ...request, method: { tolerance: 1e-4 } },
  { contract, market: { spot: 100, rate: -0.01, carry: 'future', volatility: 0.2 } },
])('accepts request %# unchanged', (input) => {
  expect(checkRequest(input)).toEqual({ ok: true, request: input });
});

it.each([
  ['contract', 'strike'],
  ['contract', 'expiry'],
  ['market', 'spot'],
  ['market', 'rate'],
  ['market', 'yield'],
  ['market', 'volatility'],
] as const)('%s.%s must be there, be a number, be finite, and make sense', (part, field) => {
  const withValue = (value: unknown) => ({
    ...request,
    [part]: { ...request[part], [field]: value },
  });
  const path = `${part}.${field}`;
  expect(codesOf(withValue(undefined))).toEqual([`${path} missing`]);
  expect(codesOf(withValue(null))).toEqual([`${path} missing`]);
  for (const text of ['', '100', '1,5', 'abc', [1], {}, true]) {
    expect(codesOf(withValue(text))).toEqual([`${path} not-a-number`]);
  }
  expect(codesOf(withValue(NaN))).toEqual([`${path} not-finite`]);
  expect(codesOf(withValue(-Infinity))).toEqual([`${path} not-finite`]);
  expect(codesOf(withValue(1e300))).toEqual([`${path} out-of-range`]);
  const zero = field === 'rate' || field === 'yield' ? [] : [`${path} not-positive`];
  expect(codesOf(withValue(0))).toEqual(zero);
  expect(codesOf(withValue(-1e300))).toEqual(zero.length > 0 ? zero : [`${path} out-of-range`]);
});

it('lists every issue, each with a sentence that ends as one', () => {
  const issues = issuesOf({
    contract: { payoff: 'barrier', exercise: 'sometimes', strike: -1, colour: 'red' },
    market: { spot: 'a', rate: 5, volatility: 0.2, dividends: [] },
    method: { name: 'guess' },
    extra: 1,
  });
  expect(issues.map(({ path, code }) => `${path} ${code}`)).toEqual([
    'contract.payoff not-priced',
    'contract.exercise unknown-name',
    'contract.kind missing',
    'contract.strike not-positive',
    'contract.expiry missing',
    'contract.colour unknown-field',
    'market.spot not-a-number',
    'market.rate out-of-range',
    'market.dividends not-priced',
    'market.yield missing',
    'method.name unknown-name',
    'extra unknown-field',
  ]);
  for (const { message } of issues) expect(message).toMatch(/^[A-Z“].*\.$/);
});

it.each([
  [{ name: 'closed-form', steps: 5 }, 'method.steps unknown-field'],
  [{ name: 'lattice-crr', steps: 1e6 }, 'method.steps too-many-steps'],
  [{ name: 'lattice-crr', steps: 0 }, 'method.steps too-few-steps'],
  [{ name: 'lattice-crr', steps: 10.5 }, 'method.steps out-of-range'],
  [{ name: 'lattice-crr', smoothing: 'some' }, 'method.smoothing unknown-name'],
  [{ name: 'lattice-crr', tolerance: 1 }, 'method.tolerance unknown-field'],
  [{ tolerance: 0 }, 'method.tolerance not-positive'],
  [{ tolerance: 1, steps: 5 }, 'method.steps unknown-field'],
  [{}, 'method missing'],
  [null, 'method missing'],
])('refuses the method %j', (method, issue) => {
  expect(codesOf({ ...request, method })).toEqual([issue]);
});

it('refuses a future with a yield, and any other carry', () => {
  expect(codesOf({ contract, market: { ...market, carry: 'future' } })).toEqual([
    'market.yield unknown-field',
  ]);
  expect(codesOf({ contract, market: { ...market, yield: undefined, carry: 'spot' } })).toEqual([
    'market.carry unknown-name',
  ]);
});

describe('whatever arrives', () => {
  /** Nearly right requests, so that every branch is reached, and anything at all besides. */
  const value = fc.oneof(
    { weight: 6, arbitrary: fc.double({ min: 0.01, max: 0.9, noNaN: true }) },
    { weight: 1, arbitrary: fc.double() },
    { weight: 1, arbitrary: fc.anything() },
  );
  const name = (...names: string[]) =>
    fc.oneof({ weight: 9, arbitrary: fc.constantFrom(...names) }, fc.anything());
  const nearlyRight = fc.record({
    contract: fc.record({
      payoff: name('vanilla'),
      exercise: name('european'),
      kind: name('call', 'put'),
      strike: value,
      expiry: value,
    }),
    market: fc.record({ spot: value, rate: value, yield: value, volatility: value }),
  });

  it('the check answers with a list of issues or the same request, and never throws', () => {
    fc.assert(
      fc.property(fc.oneof(fc.anything(), nearlyRight), (input) => {
        const checked = checkRequest(input);
        if (checked.ok) expect(checked.request).toEqual(input);
        else expect(checked.issues.length).toBeGreaterThan(0);
      }),
      { numRuns: 500 },
    );
  });

  it('a price is a finite number or a failure with a code, a path and advice', () => {
    fc.assert(
      fc.property(nearlyRight, (input) => {
        const result = price(input);
        if (result.ok) {
          expect(Number.isFinite(result.value)).toBe(true);
          expect(Number.isFinite(result.errorEstimate)).toBe(true);
        } else {
          expect(result.message).not.toBe('');
        }
      }),
      { numRuns: 500 },
    );
  });
});
