import { formatSensitivities, shownGreeks } from '@/shared/format/greeks';

const greeks = {
  delta: -0.4438,
  gamma: 0.0107,
  vega: 58.81,
  theta: -13.943,
  rho: -25.4,
  yieldRho: null,
};

describe('the Greeks on a screen', () => {
  // Per point is one hundredth, per basis point one ten-thousandth of 1.00; a year has 365 days
  // (ACT/365 Fixed). The expected figures are worked by hand.
  it('are scaled to the units that people quote', () => {
    const shown = Object.fromEntries(
      shownGreeks(greeks).map(({ label, per, value }) => [`${label} ${per}`, value]),
    );
    expect(shown['delta per 1.00']).toBe(-0.4438);
    expect(shown['gamma per 1.00']).toBe(0.0107);
    expect(shown['vega per point']).toBeCloseTo(0.5881, 12);
    expect(shown['theta per day']).toBeCloseTo(-0.0382, 12);
    expect(shown['rho per point']).toBeCloseTo(-0.254, 12);
    expect(shown['rho per basis point']).toBeCloseTo(-0.00254, 12);
  });

  it('leave out what the underlying or the method does not have', () => {
    const labels = shownGreeks(greeks).map(({ label }) => label);
    expect(labels).not.toContain('yield');
    expect(labels).not.toContain('vanna');
  });

  it('show up to four significant digits, aligned on the point', () => {
    expect(formatSensitivities([-0.4438, 123.456, 0.0107, 0])).toEqual([
      { text: '\u22120.4438', padding: '0' },
      { text: '123.5', padding: '0000' },
      { text: '0.01070', padding: '' },
      { text: '0', padding: '.00000' },
    ]);
  });

  it('are written with a power of ten where decimals would hide them', () => {
    expect(formatSensitivities([-8.428e-9])[0].text).toBe('\u22128.4e\u22129');
  });
});
