import fc from 'fast-check';
import { addDays, dateInZone, dateOfTenor, instantInZone, isCalendarDate } from '@/shared/dates';

const iso = (atMs: number) => new Date(atMs).toISOString();

describe('instantInZone', () => {
  // Rules of the IANA time zone database: Europe/Berlin is UTC+1 in winter and UTC+2 in summer.
  test.each([
    ['2026-12-01', '17:30', 'Europe/Berlin', '2026-12-01T16:30:00.000Z'],
    ['2026-07-01', '17:30', 'Europe/Berlin', '2026-07-01T15:30:00.000Z'],
    ['2026-12-01', '15:00', 'America/New_York', '2026-12-01T20:00:00.000Z'],
    ['2026-12-01', '10:00', 'Asia/Tokyo', '2026-12-01T01:00:00.000Z'],
    ['2026-12-01', '10:00', 'Asia/Kolkata', '2026-12-01T04:30:00.000Z'],
  ])('%s %s in %s', (date, time, zone, expected) => {
    expect(iso(instantInZone(date, time, zone))).toBe(expected);
  });

  test('on the days on which the clocks change, before and after the change', () => {
    expect(iso(instantInZone('2026-03-29', '01:30', 'Europe/Berlin'))).toBe(
      '2026-03-29T00:30:00.000Z',
    );
    expect(iso(instantInZone('2026-03-29', '03:30', 'Europe/Berlin'))).toBe(
      '2026-03-29T01:30:00.000Z',
    );
    expect(iso(instantInZone('2026-10-25', '17:30', 'Europe/Berlin'))).toBe(
      '2026-10-25T16:30:00.000Z',
    );
  });

  test('the hour that does not exist ends after the gap, the repeated hour is the first one', () => {
    expect(iso(instantInZone('2026-03-29', '02:30', 'Europe/Berlin'))).toBe(
      '2026-03-29T01:30:00.000Z',
    );
    expect(iso(instantInZone('2026-10-25', '02:30', 'Europe/Berlin'))).toBe(
      '2026-10-25T00:30:00.000Z',
    );
  });

  test('is the inverse of the day in the zone', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 40_000 }),
        fc.constantFrom('Europe/Berlin', 'America/New_York', 'Asia/Tokyo', 'Pacific/Auckland'),
        (days, zone) => {
          const date = addDays('1990-01-01', days);
          expect(dateInZone(instantInZone(date, '17:30', zone), zone)).toBe(date);
        },
      ),
    );
  });
});

describe('dateOfTenor', () => {
  test.each([
    ['3m', '2026-12-01', '2027-03-01'],
    ['1m', '2027-01-31', '2027-02-28'],
    ['1y', '2028-02-29', '2029-02-28'],
    ['2w', '2026-12-25', '2027-01-08'],
    ['10d', '2026-12-25', '2027-01-04'],
    ['18M', '2026-12-01', '2028-06-01'],
  ])('%s from %s', (tenor, from, expected) => {
    expect(dateOfTenor(tenor, from)).toBe(expected);
  });

  test.each(['', 'm', '3', '3 months', '-3m', '1.5y', '2027-01-01'])('refuses %j', (text) => {
    expect(dateOfTenor(text, '2026-12-01')).toBeNull();
  });
});

test('isCalendarDate knows the days that exist', () => {
  expect(isCalendarDate('2028-02-29')).toBe(true);
  expect(isCalendarDate('2027-02-29')).toBe(false);
  expect(isCalendarDate('2027-13-01')).toBe(false);
  expect(isCalendarDate('2027-1-1')).toBe(false);
});
