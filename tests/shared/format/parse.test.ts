import fc from 'fast-check';
import {
  moveDecimalPoint,
  numberText,
  parseDecimal,
  parseNumber,
  parsePercent,
  percentText,
} from '@/shared/format/parse';

const finite = fc.double({ noNaN: true, noDefaultInfinity: true });

describe('numbers that people type', () => {
  it.each([
    ['210', '210'],
    [' 210.50 ', '210.5'],
    ['.5', '0.5'],
    ['5.', '5'],
    ['-3', '-3'],
    ['\u22123', '-3'],
    ['66 171', '66171'],
    ['66\u202f171.5', '66171.5'],
    ['66\u00a0171.5', '66171.5'],
    ['24,5', '24.5'],
    ['0,245', '0.245'],
    ['1234,567', '1234.567'],
    ['12,3456', '12.3456'],
    ['1.5k', '1500'],
    ['2m', '2000000'],
    ['1,5k', '1500'],
    ['1e3', '1000'],
    ['2.5e-3', '0.0025'],
  ])('%p is %s', (typed, value) => {
    expect(parseDecimal(typed)).toEqual({ ok: true, value });
  });

  it('asks where a comma can be read in two ways, and says what to type', () => {
    expect(parseDecimal('1,234')).toEqual({
      ok: false,
      message: '“1,234” can be read in two ways: type 1.234 or 1234.',
    });
    expect(parseDecimal('1,234.5')).toEqual({
      ok: false,
      message: 'Leave out the commas between thousands: type 1234.5.',
    });
    expect(parseDecimal('1,234,567').ok).toBe(false);
  });

  it.each(['', 'abc', '1.2.3', '--1', '1e', 'k', 'NaN', 'Infinity', '0x10', '3w'])(
    'refuses %p',
    (typed) => {
      expect(parseDecimal(typed).ok).toBe(false);
    },
  );

  it('reads percent as the double nearest to the decimal fraction', () => {
    expect(parsePercent('24.3 %')).toEqual({ ok: true, value: 0.243 });
    expect(parsePercent('24,5')).toEqual({ ok: true, value: 0.245 });
    expect(parsePercent('-0.5%')).toEqual({ ok: true, value: -0.005 });
  });

  it('gives every double back from its own text', () => {
    fc.assert(
      fc.property(finite, (value) => {
        expect(parseNumber(numberText(value))).toEqual({ ok: true, value: value + 0 });
      }),
    );
  });

  it('gives every fraction back from its percent text', () => {
    fc.assert(
      fc.property(finite, (fraction) => {
        expect(parsePercent(percentText(fraction, 2))).toEqual({ ok: true, value: fraction + 0 });
      }),
    );
  });

  it('moves the point without rounding', () => {
    fc.assert(
      fc.property(
        fc.bigInt({ min: 1n, max: 10n ** 40n }),
        fc.integer({ min: 0, max: 60 }),
        (n, places) => {
          const back = moveDecimalPoint(moveDecimalPoint(String(n), -places), places);
          expect(back).toBe(String(n));
        },
      ),
    );
  });

  it('keeps the decimals that a price is shown with', () => {
    expect(numberText(210, 2)).toBe('210.00');
    expect(numberText(210.125, 2)).toBe('210.125');
    expect(percentText(0.03, 2)).toBe('3.00');
  });
});
