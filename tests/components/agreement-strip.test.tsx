import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { findingOf, type Agreement } from '@/components/charts/agreement-finding';
import { layOutStrip } from '@/components/charts/agreement-scale';
import { AgreementStrip } from '@/components/charts/agreement-strip';
import { playDialogs, playWindow } from './browser';

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

const route = (name: string, label: string, value: number, errorEstimate: number | null) => ({
  name,
  label,
  value,
  errorEstimate,
});
const heat = route('heat-crank-nicolson', 'Heat grid', 13.2344, 0.0003);
const walk = route('lattice-crr', 'Walk', 13.2341, 0.0006);

const agreeing: Agreement = {
  routes: [heat, walk],
  tolerance: 0.001,
  verdict: 'agree',
  refuted: false,
  decimals: 4,
  currency: 'EUR',
};

beforeEach(() => {
  playWindow({ wide: true });
  playDialogs();
});

describe('the finding in words', () => {
  test('agreement names distance and tolerance', () => {
    expect(findingOf(agreeing)).toBe(
      'Routes agree: they lie 0.0003 apart, within the tolerance 0.0010.',
    );
  });

  test('disagreement says by how much', () => {
    const far = { ...walk, value: 13.2375 };
    expect(findingOf({ ...agreeing, routes: [heat, far], verdict: 'disagree' })).toBe(
      'Routes differ by 0.0031, more than the tolerance 0.0010 and than their error estimates allow.',
    );
  });

  test('the distance is that of the two routes farthest apart, not of each from the first', () => {
    const below = { ...walk, value: 13.233 };
    const above = route('closed-form', 'Closed form', 13.236, 1e-9);
    expect(findingOf({ ...agreeing, routes: [heat, below, above], verdict: 'disagree' })).toMatch(
      'differ by 0.0030',
    );
  });

  test('wide agreement says which of the two reasons it has', () => {
    const vague = { ...walk, errorEstimate: 0.9 };
    expect(findingOf({ ...agreeing, routes: [heat, vague], verdict: 'wide' })).toMatch(
      'known only to 0.9, more than the tolerance 0.0010',
    );
    const apart = { ...walk, value: 13.2375, errorEstimate: 0.9 };
    expect(findingOf({ ...agreeing, routes: [heat, apart], verdict: 'wide' })).toMatch(
      '0.0031 apart, more than the tolerance 0.0010, but no more than their error estimates allow',
    );
  });

  test('one route alone and an unknown error are told apart', () => {
    const alone = { ...agreeing, routes: [heat], verdict: 'one-route' as const };
    expect(findingOf(alone)).toBe('One route only: there is nothing to compare it with.');
    const unknown = { ...alone, routes: [heat, { ...walk, errorEstimate: null }] };
    expect(findingOf(unknown)).toMatch('gave no error estimate');
  });

  test('a refuted estimate is said even where the routes agree', () => {
    expect(findingOf({ ...agreeing, refuted: true })).toMatch(/Routes agree.*estimate is refuted/);
  });

  test('a small distance is never shown as nought', () => {
    const near = { ...walk, value: 13.23440001 };
    expect(findingOf({ ...agreeing, routes: [heat, near] })).toMatch(/lie 1e−8|lie 2e−8/);
  });
});

describe('the axis', () => {
  const width = 120;
  const margin = 5;

  test('the band is the tolerance to both sides of the first route', () => {
    const { band, routes } = layOutStrip(agreeing, width, margin);
    expect((band.from + band.to) / 2).toBeCloseTo(60, 10);
    expect(routes[0].x).toBeCloseTo(60, 10);
    const perTolerance = (band.to - band.from) / 2;
    expect(routes[1].x).toBeCloseTo(60 - 0.3 * perTolerance, 6);
  });

  test('a route outside the band is drawn outside it', () => {
    const far = { ...walk, value: 13.2375 };
    const { band, routes } = layOutStrip({ ...agreeing, routes: [heat, far] }, width, margin);
    expect(routes[1].x).toBeGreaterThan(band.to);
    expect(routes[1].beyond).toBeNull();
  });

  test('a route far away stands at the edge, with its side', () => {
    const above = { ...walk, value: 14 };
    const below = { ...walk, name: 'closed-form', value: 12 };
    const { band, routes } = layOutStrip(
      { ...agreeing, routes: [heat, above, below] },
      width,
      margin,
    );
    expect(routes[1]).toMatchObject({ beyond: 'right', x: width - margin, whisker: null });
    expect(routes[2]).toMatchObject({ beyond: 'left', x: margin });
    expect(band.to - band.from).toBeGreaterThan(10);
  });

  test('a whisker longer than the axis is open at its ends', () => {
    const vague = { ...walk, errorEstimate: 0.9 };
    const { routes } = layOutStrip({ ...agreeing, routes: [heat, vague] }, width, margin);
    expect(routes[1].whisker).toEqual({
      from: margin,
      to: width - margin,
      openFrom: true,
      openTo: true,
    });
    expect(routes[0].whisker).toMatchObject({ openFrom: false, openTo: false });
  });
});

describe.each(['row', 'card'] as const)('the strip in a %s', (size) => {
  test('is a button that tells the finding and opens to the figures', async () => {
    const user = userEvent.setup();
    render(<AgreementStrip {...agreeing} size={size} />);
    const strip = screen.getByRole('button', { name: /^Routes agree: they lie 0.0003 apart/ });
    strip.focus();
    await user.keyboard('{Enter}');
    const dialog = screen.getByRole('dialog', { name: 'How far the routes agree' });
    const rows = within(dialog).getAllByRole('row');
    expect(rows.map((row) => row.textContent)).toEqual([
      'routevalue, EUR±apart',
      'Heat grid13.23440.0003reference',
      'Walk13.23410.0006−0.0003',
    ]);
    await user.click(within(dialog).getByRole('button', { name: 'Close' }));
    expect(screen.queryByRole('dialog')).toBeNull();
    expect(document.activeElement).toBe(strip);
  });

  test('draws each route in a shape of its own, so that no colour has to be read', () => {
    const closed = route('closed-form', 'Closed form', 13.23427, 2e-7);
    const { container } = render(
      <AgreementStrip {...agreeing} routes={[heat, walk, closed]} size={size} />,
    );
    const drawings = Array.from(container.querySelectorAll('svg'));
    const drawing = drawings.find((svg) => svg.querySelector('rect'));
    const shapes = Array.from(drawing?.querySelectorAll('circle, path') ?? []).map(
      (shape) => shape.tagName + (shape.getAttribute('d') ?? '').replace(/[-\d. ]/g, ''),
    );
    expect(new Set(shapes).size).toBe(3);
  });
});

test('in a row the verdict stands beside it in a word', () => {
  render(<AgreementStrip {...agreeing} verdict="wide" size="row" />);
  expect(screen.getByText('wide')).toBeTruthy();
});
