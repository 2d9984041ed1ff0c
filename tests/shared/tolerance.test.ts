import { toleranceFor } from '@/shared/tolerance';

const size = { quantity: '12', contractSize: '50' };

test.each([
  // Worked by hand: 600 units.
  [{ tolerance: 0.01, moneyTolerance: null }, 0.01],
  [{ tolerance: 0.01, moneyTolerance: '6.00' }, 0.01],
  [{ tolerance: 0.01, moneyTolerance: '3.00' }, 0.005],
  [{ tolerance: 0.01, moneyTolerance: '600' }, 0.01],
])('%j for 600 units is %d', (rule, expected) => {
  expect(toleranceFor(rule, size)).toBe(expected);
});

test('a short position is judged as a long one, and no position by the unit alone', () => {
  const rule = { tolerance: 0.01, moneyTolerance: '3.00' };
  expect(toleranceFor(rule, { ...size, quantity: '-12' })).toBe(0.005);
  expect(toleranceFor(rule, { ...size, quantity: '0' })).toBe(0.01);
});
