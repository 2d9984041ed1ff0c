import fc from 'fast-check';
import { emptyTicket, openTicket, ticketReducer, type TicketTextField } from '@/hooks/ticket-draft';
import { firstErrorField, placeIssues, readTicket, requestFor } from '@/hooks/ticket-terms';
import { ticketText } from '@/constants/texts/ticket';
import { quoteTermsSchema } from '@/shared/contracts/quotes';
import { desk, share, wheat } from './ticket-examples';

const nowMs = Date.parse('2026-12-01T10:00:00Z');
const ofWheat = openTicket(emptyTicket, [wheat]);
const ofShare = openTicket(emptyTicket, [share]);

const typed = (field: TicketTextField, text: string) =>
  ticketReducer(ofWheat, { type: 'type', field, text });

const errorAt = (field: TicketTextField, text: string) =>
  readTicket(typed(field, text), wheat, desk, nowMs).errors[field];

describe('a ticket in order', () => {
  it('gives terms that the server’s schema takes, and the request for them', () => {
    const { priced, errors } = readTicket(ofWheat, wheat, desk, nowMs);
    expect(errors).toEqual({});
    expect(quoteTermsSchema.parse(priced?.terms)).toEqual(priced?.terms);
    expect(priced?.request.market).toEqual(wheat.close?.market);
    expect(priced?.request.contract).toMatchObject({ strike: 210, kind: 'put' });
  });

  it('reads the yield of a share, and none of a future', () => {
    expect(readTicket(ofShare, share, desk, nowMs).priced?.terms.market).toEqual(
      share.close?.market,
    );
  });

  it.each([
    ['3m', '2027-03-01'],
    ['2w', '2026-12-15'],
    ['10d', '2026-12-11'],
    ['1y', '2027-12-01'],
    ['2027-06-01', '2027-06-01'],
  ])('resolves the expiry %s to %s', (text, date) => {
    expect(readTicket(typed('expiry', text), wheat, desk, nowMs).expiryDate).toBe(date);
  });

  it('counts tenors from the day it is at the desk', () => {
    // 23:30 UTC on 30 November is 00:30 on 1 December in Berlin.
    const lateMs = Date.parse('2026-11-30T23:30:00Z');
    expect(readTicket(typed('expiry', '1d'), wheat, desk, lateMs).expiryDate).toBe('2026-12-02');
  });

  it('takes the day itself until the cut-off, and not after it', () => {
    expect(errorAt('expiry', '2026-12-01')).toBeUndefined();
    const afterCutoffMs = Date.parse('2026-12-01T16:30:00Z');
    const { errors } = readTicket(typed('expiry', '2026-12-01'), wheat, desk, afterCutoffMs);
    expect(errors.expiry).toBe(ticketText.expiryPassed('2026-12-01', '17:30'));
  });
});

describe('a ticket that cannot be priced', () => {
  it.each([
    ['strike', '', ticketText.missing.strike],
    ['strike', '0', ticketText.notPositive.strike],
    ['strike', '-5', ticketText.notPositive.strike],
    ['strike', '1e300', ticketText.tooLong.strike],
    ['strike', 'abc', '“abc” is not a number; type digits, such as 210.5.'],
    ['strike', '1,234', '“1,234” can be read in two ways: type 1.234 or 1234.'],
    ['spot', '1e300', ticketText.tooLarge('1\u00a0000\u00a0000\u00a0000\u00a0000')],
    ['spot', '-1', ticketText.notPositive.spot],
    ['volatility', '0', ticketText.notPositive.volatility],
    ['volatility', '5000', ticketText.tooLarge('1\u00a0000\u00a0%')],
    ['rate', '300', ticketText.outside('\u2212100\u00a0%', '100\u00a0%')],
    ['quantity', '-2', ticketText.notPositive.quantity],
    ['expiry', '2020-01-01', ticketText.expiryPassed('2020-01-01', '17:30')],
    ['expiry', '2027-02-30', ticketText.noSuchDay('2027-02-30')],
    ['expiry', 'soon', ticketText.notAnExpiry('soon')],
    ['expiry', '9000-01-01', ticketText.tooFar(100)],
  ] as const)('says at %s %p what to do', (field, text, message) => {
    const reading = readTicket(typed(field, text), wheat, desk, nowMs);
    expect(reading.priced).toBeNull();
    expect(reading.errors).toEqual({ [field]: message });
  });

  it('names every wrong field at once', () => {
    const wrong = ticketReducer(typed('strike', ''), { type: 'type', field: 'spot', text: '-1' });
    const { errors } = readTicket(wrong, wheat, desk, nowMs);
    expect(Object.keys(errors).sort()).toEqual(['spot', 'strike']);
    expect(firstErrorField(errors)).toBe('spot');
  });

  it('is never priced by a text that is not understood', () => {
    const fields = ['strike', 'spot', 'volatility', 'rate', 'quantity', 'contractSize'] as const;
    fc.assert(
      fc.property(fc.constantFrom(...fields), fc.string({ maxLength: 12 }), (field, text) => {
        const { priced, errors } = readTicket(typed(field, text), wheat, desk, nowMs);
        expect(priced === null).toBe(errors[field] !== undefined);
      }),
    );
  });
});

describe('a question asked the other way round', () => {
  it('does not need the field that it asks for', () => {
    const reading = readTicket(typed('volatility', ''), wheat, desk, nowMs);
    expect(requestFor('volatility', reading).ok).toBe(true);
  });

  it('names the field that stops it, but not one that the price does not depend on', () => {
    const stopped = readTicket(typed('strike', ''), wheat, desk, nowMs);
    expect(requestFor('volatility', stopped)).toEqual({ ok: false, stoppedBy: 'strike' });
    const noLots = readTicket(typed('quantity', ''), wheat, desk, nowMs);
    expect(requestFor('volatility', noLots).ok).toBe(true);
  });
});

describe('complaints of the server', () => {
  it('go to their fields; the others stay sentences', () => {
    const placed = placeIssues([
      { path: 'market.volatility', message: 'Too small.' },
      { path: 'expiryDate', message: 'Past.' },
      { path: 'pricedAt', message: 'Too old.' },
    ]);
    expect(placed).toEqual({
      errors: { volatility: 'Too small.', expiry: 'Past.' },
      elsewhere: ['Too old.'],
    });
  });
});
