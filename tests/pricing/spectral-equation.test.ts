/** The parts of the collocation: its derivatives against differences, its look-up against polynomials. */
import { solveBoundary } from '@/pricing/spectral/boundary';
import { premiumWithDerivatives } from '@/pricing/spectral/near-boundary';
import { earlyExercisePremium, logBoundaryNow } from '@/pricing/spectral/premium';
import { evaluateResidual, fillGrowth } from '@/pricing/spectral/residual';
import { lookedUp, spectralTable } from '@/pricing/spectral/tables';

const problems = [
  { rate: 0.05, carry: 0, deviation: 0.2 },
  { rate: 0.05, carry: 0.02, deviation: 0.3 },
  { rate: 0.03, carry: 0.06, deviation: 0.25 },
  { rate: 0.04, carry: -0.01, deviation: 0.4 },
];

it('looks up the nodes’ polynomial exactly: z and a seventh power at z·cosθ', () => {
  const table = spectralTable(12);
  for (const power of [1, 2, 7]) {
    const height = table.z.map((z) => z ** power);
    for (const [i, j] of [
      [0, 0],
      [5, 9],
      [11, 15],
    ]) {
      const at = table.z[i] * table.cosine[j];
      expect(lookedUp(12, table.lookUp, i * table.points + j, height)).toBeCloseTo(at ** power, 13);
    }
  }
});

it.each(problems)('the derivatives are the slopes of the residuals: %p', (problem) => {
  const table = spectralTable(10);
  const height = table.z.map((z) => (0.9 * problem.deviation * z) ** 2 * (1 + 0.1 * z));
  fillGrowth(table, problem.carry);
  evaluateResidual(table, problem, height, true);
  const jacobian = table.work.jacobian.slice();
  for (let k = 0; k < 10; k++) {
    const move = 1e-6 * height[k];
    const residuals = [1, -1].map((sign) => {
      const moved = height.slice();
      moved[k] += sign * move;
      evaluateResidual(table, problem, moved, false);
      return table.work.residual.slice();
    });
    for (let i = 0; i < 10; i++) {
      const slope = (residuals[0][i] - residuals[1][i]) / (2 * move);
      expect(Math.abs(slope - jacobian[i * 10 + k]) * height[k]).toBeLessThan(1e-8);
    }
  }
});

describe.each(problems)('the premium of %p', (problem) => {
  const solved = solveBoundary(problem, 32);
  if (solved === null) throw new Error('the boundary was not found');
  const boundary = solved.asked;
  const start = logBoundaryNow(problem, boundary);

  it.each([0.02, 0.2, 1, 2])('has derivatives that are its slopes, %d deviations away', (far) => {
    const x = start + far * problem.deviation;
    const { first, second } = premiumWithDerivatives(problem, boundary, x);
    const move = 2e-3 * problem.deviation;
    const at = (by: number) => earlyExercisePremium(problem, boundary, x + by).value;
    expect(Math.abs((at(move) - at(-move)) / (2 * move) - first)).toBeLessThan(1e-5);
    const bend = (at(move) - 2 * at(0) + at(-move)) / (move * move);
    expect(Math.abs(bend - second)).toBeLessThan(1e-2 * Math.max(1, Math.abs(second)));
  });
});
