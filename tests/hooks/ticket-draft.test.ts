import fc from 'fast-check';
import {
  closeTextBeside,
  emptyTicket,
  hasNewerClose,
  openTicket,
  stepText,
  strikeNear,
  ticketDraftSchema,
  ticketReducer,
  ticketTextFields,
} from '@/hooks/ticket-draft';
import { parseDecimal } from '@/shared/format/parse';
import { share, wheat, withoutClose } from './ticket-examples';

const opened = openTicket(emptyTicket, [withoutClose, wheat, share]);

describe('a ticket that is opened', () => {
  it('begins with the first underlying that has a close, and with that close', () => {
    expect(opened.underlyingId).toBe(wheat.id);
    expect(opened.texts).toMatchObject({
      spot: '212.40',
      strike: '210.00',
      volatility: '24.5',
      rate: '3.00',
      contractSize: '500',
    });
    expect(opened.source).toMatchObject({ kind: 'close', date: '2026-11-30' });
  });

  it('keeps what was typed', () => {
    const typed = ticketReducer(opened, { type: 'type', field: 'strike', text: '205' });
    expect(openTicket(typed, [wheat])).toBe(typed);
  });

  it('takes a later close only where the market was left alone', () => {
    const later = { ...wheat, close: wheat.close && { ...wheat.close, date: '2026-12-01' } };
    expect(openTicket(opened, [later]).source).toMatchObject({ date: '2026-12-01' });
    const moved = ticketReducer(opened, { type: 'type', field: 'volatility', text: '30' });
    expect(openTicket(moved, [later])).toBe(moved);
    expect(hasNewerClose(moved, later)).toBe(true);
  });

  it('is read back from its own text', () => {
    expect(ticketDraftSchema.parse(JSON.parse(JSON.stringify(opened)))).toEqual(opened);
  });
});

describe('a strike near the money', () => {
  // Common practice, no source: strikes are quoted in steps of 1, 2 or 5.
  it.each([
    [212.4, 2, '210.00'],
    [1.0842, 4, '1.0800'],
    [3950, 0, '3950'],
    [48.12, 2, '48.00'],
  ])('of %p is %s', (spot, decimals, strike) => {
    expect(strikeNear(spot, decimals)).toBe(strike);
  });

  it('lies within a fiftieth of the spot', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e9, noNaN: true }), (spot) => {
        expect(Math.abs(Number(strikeNear(spot, 2)) / spot - 1)).toBeLessThanOrEqual(0.02);
      }),
    );
  });
});

describe('what the close says beside a changed number', () => {
  it('is shown once the number is another one, not when it is only written otherwise', () => {
    const changed = ticketReducer(opened, { type: 'type', field: 'spot', text: '213' });
    expect(closeTextBeside(changed, 'spot')).toBe('212.40');
    const same = ticketReducer(opened, { type: 'type', field: 'spot', text: '212.4' });
    expect(closeTextBeside(same, 'spot')).toBeNull();
  });
});

describe('arrow keys', () => {
  it.each([
    ['strike', '210.00', 1, '211.00'],
    ['strike', '210.00', -10, '200.00'],
    ['spot', '1.0842', 1, '1.0892'],
    ['volatility', '24.5', 1, '24.6'],
    ['rate', '0.05', -1, '0.00'],
    ['rate', '0.00', -1, '-0.05'],
    ['quantity', '1', -1, '1'],
    ['expiry', '3m', 1, '4m'],
    ['expiry', '1w', -1, '1w'],
    ['expiry', '2027-06-01', 1, '2027-06-01'],
    ['strike', 'abc', 1, 'abc'],
  ] as const)('%s %s by %p is %s', (field, text, steps, result) => {
    expect(stepText(field, text, steps)).toBe(result);
  });

  it('never make a text unreadable, nor a positive number less', () => {
    const numeric = ticketTextFields.filter((field) => field !== 'expiry');
    fc.assert(
      fc.property(
        fc.constantFrom(...numeric),
        fc.double({ min: 1e-6, max: 1e9, noNaN: true }),
        fc.integer({ min: -10, max: 10 }),
        (field, value, steps) => {
          const stepped = parseDecimal(stepText(field, String(value), steps));
          expect(stepped.ok).toBe(true);
          if (stepped.ok && field !== 'rate' && field !== 'yield')
            expect(Number(stepped.value)).toBeGreaterThan(0);
        },
      ),
    );
  });
});
