/** Every rule of the verdict and its edges. Common practice, no source: the rules are the product's own. */
import { judgeRoutes, type ComparedRoute } from '@/pricing/verdict';

const route = (
  name: ComparedRoute['name'],
  value: number,
  errorEstimate: number | null,
  machinery: string[] = [name],
): ComparedRoute => ({ name, value, errorEstimate, machinery });

const heat = (value: number, e: number | null) => route('heat-crank-nicolson', value, e);
const tree = (value: number, e: number | null) => route('lattice-crr', value, e);
const walk = (value: number, e: number | null) => route('lattice-symmetric', value, e);

describe('a pair', () => {
  it('agrees when the distance and both estimates are within the tolerance', () => {
    expect(judgeRoutes([heat(10, 0.25), tree(10.5, 0.5)], 0.5)).toEqual({
      verdict: 'agree',
      refuted: false,
      worst: { first: 'heat-crank-nicolson', second: 'lattice-crr', distance: 0.5 },
    });
  });

  it('is wide when one estimate passes the tolerance but the estimates bridge the distance', () => {
    expect(judgeRoutes([heat(10, 0.25), tree(10.5, 0.75)], 0.5).verdict).toBe('wide');
  });

  it('is wide when the distance passes the tolerance and just equals both estimates', () => {
    expect(judgeRoutes([heat(10, 0.5), tree(11, 0.5)], 0.75)).toMatchObject({
      verdict: 'wide',
      refuted: false,
    });
  });

  it('disagrees when the distance passes the tolerance and both estimates', () => {
    expect(judgeRoutes([heat(10, 0.25), tree(11, 0.25)], 0.5)).toMatchObject({
      verdict: 'disagree',
      refuted: true,
    });
  });

  it('may agree within the tolerance and still refute an estimate', () => {
    expect(judgeRoutes([heat(10, 0.0625), tree(10.5, 0.125)], 0.5)).toMatchObject({
      verdict: 'agree',
      refuted: true,
    });
  });

  it('is not refuted by rounding alone', () => {
    expect(judgeRoutes([heat(1, 0), tree(1 + 4 * Number.EPSILON, 0)], 1e-9)).toMatchObject({
      verdict: 'agree',
      refuted: false,
    });
  });

  it('of exact routes agrees at a tolerance of zero only when the values are the same', () => {
    expect(judgeRoutes([heat(1, 0), tree(1, 0)], 0).verdict).toBe('agree');
    expect(judgeRoutes([heat(1, 0), tree(1.5, 0)], 0).verdict).toBe('disagree');
  });
});

describe('one route', () => {
  it.each([
    ['no route at all', []],
    ['a single route', [heat(10, 0.1)]],
    ['an unknown estimate on one side', [heat(10, 0.1), tree(10, null)]],
    [
      'two routes that share all their machinery',
      [
        route('heat-crank-nicolson', 10, 0.1, ['grid', 'heat']),
        route('lattice-crr', 99, 0.1, ['heat', 'grid']),
      ],
    ],
  ])('%s is nothing to compare', (_, routes) => {
    expect(judgeRoutes(routes, 1)).toEqual({ verdict: 'one-route', refuted: false, worst: null });
  });

  it('routes that share only some machinery do check each other', () => {
    const routes = [
      route('heat-crank-nicolson', 10, 0.1, ['grid', 'heat']),
      route('lattice-crr', 10, 0.1, ['grid']),
    ];
    expect(judgeRoutes(routes, 1).verdict).toBe('agree');
  });

  it('a route with an unknown estimate leaves the others to be compared', () => {
    expect(judgeRoutes([heat(10, 0.1), tree(10, 0.1), walk(50, null)], 1)).toMatchObject({
      verdict: 'agree',
      worst: { first: 'heat-crank-nicolson', second: 'lattice-crr' },
    });
  });
});

describe('the worst pair', () => {
  it('decides, and is named with its distance', () => {
    expect(judgeRoutes([heat(10, 0.25), tree(10.25, 0.25), walk(13, 0.25)], 0.5)).toEqual({
      verdict: 'disagree',
      refuted: true,
      worst: { first: 'heat-crank-nicolson', second: 'lattice-symmetric', distance: 3 },
    });
  });

  it('goes by the verdict before the distance', () => {
    const routes = [heat(10, 2), tree(12, 2), walk(12, 0.125)];
    // heat–tree and heat–walk are 2 apart and wide; tree–walk agree at 0.
    expect(judgeRoutes(routes, 1)).toMatchObject({ verdict: 'wide', worst: { distance: 2 } });
    // A disagreement at 1 outranks what is wide at 3.
    const mixed = [heat(10, 4), tree(13, 0.125), walk(12, 0.125)];
    expect(judgeRoutes(mixed, 0.5)).toMatchObject({
      verdict: 'disagree',
      worst: { first: 'lattice-crr', second: 'lattice-symmetric', distance: 1 },
    });
  });

  it('is the same in whatever order the routes come', () => {
    const routes = [heat(10, 4), tree(13, 0.125), walk(12, 0.125)];
    const forward = judgeRoutes(routes, 0.5);
    const backward = judgeRoutes([...routes].reverse(), 0.5);
    expect(backward.verdict).toBe(forward.verdict);
    expect(backward.worst?.distance).toBe(forward.worst?.distance);
  });
});

it('a tolerance that is negative or not a number is a mistake of the caller', () => {
  expect(() => judgeRoutes([heat(1, 0), tree(1, 0)], -1)).toThrow(RangeError);
  expect(() => judgeRoutes([heat(1, 0), tree(1, 0)], NaN)).toThrow(RangeError);
});
