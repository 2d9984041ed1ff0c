/**
 * Calendar arithmetic of the desk: what day it is there, when an option of a given day expires,
 * and what a tenor such as `3m` means. Instants are milliseconds since 1970 (UTC).
 */

type DateParts = { year: number; month: number; day: number };

const pad = (value: number, width: number) => String(value).padStart(width, '0');

const isoDate = ({ year, month, day }: DateParts) =>
  `${pad(year, 4)}-${pad(month, 2)}-${pad(day, 2)}`;

function partsOf(date: string): DateParts {
  const [year, month, day] = date.split('-').map(Number);
  return { year, month, day };
}

/** What the wall clock of a zone shows at an instant, as if it were UTC milliseconds. */
function wallClockMs(atMs: number, timeZone: string): number {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
  }).formatToParts(atMs);
  const read = (type: Intl.DateTimeFormatPartTypes) =>
    Number(parts.find((part) => part.type === type)?.value);
  return Date.UTC(
    read('year'),
    read('month') - 1,
    read('day'),
    read('hour'),
    read('minute'),
    read('second'),
  );
}

/** The calendar day of an instant in a zone. */
export const dateInZone = (atMs: number, timeZone: string): string =>
  new Date(wallClockMs(atMs, timeZone)).toISOString().slice(0, 10);

/**
 * The instant at which a local time of day is reached on a calendar day. In the hour that a
 * change to summer time leaves out, the time after the gap; in the repeated hour, the first one.
 */
export function instantInZone(date: string, timeOfDay: string, timeZone: string): number {
  const wanted = Date.parse(`${date}T${timeOfDay}:00Z`);
  const early = wanted - (wallClockMs(wanted - 86_400_000, timeZone) - (wanted - 86_400_000));
  const late = wanted - (wallClockMs(wanted + 86_400_000, timeZone) - (wanted + 86_400_000));
  const fits = [early, late].filter((at) => wallClockMs(at, timeZone) === wanted);
  return fits.length > 0 ? Math.min(...fits) : Math.max(early, late);
}

const daysInMonth = (year: number, month: number) =>
  new Date(Date.UTC(year, month, 0)).getUTCDate();

function addMonths(date: string, months: number): string {
  const { year, month, day } = partsOf(date);
  const count = year * 12 + (month - 1) + months;
  const target = { year: Math.floor(count / 12), month: (count % 12) + 1 };
  return isoDate({ ...target, day: Math.min(day, daysInMonth(target.year, target.month)) });
}

export function addDays(date: string, days: number): string {
  const { year, month, day } = partsOf(date);
  return new Date(Date.UTC(year, month - 1, day + days)).toISOString().slice(0, 10);
}

const tenorPattern = /^(\d{1,3})\s*([dwmy])$/i;

/** `10d`, `2w`, `3m`, `1y` counted from a day; a month's end stays in its month. Null if no tenor. */
export function dateOfTenor(text: string, from: string): string | null {
  const match = tenorPattern.exec(text.trim());
  if (!match) return null;
  const count = Number(match[1]);
  switch (match[2].toLowerCase()) {
    case 'd':
      return addDays(from, count);
    case 'w':
      return addDays(from, 7 * count);
    case 'm':
      return addMonths(from, count);
    default:
      return addMonths(from, 12 * count);
  }
}

/** Whether the text is a day that exists, as YYYY-MM-DD. */
export function isCalendarDate(text: string): boolean {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return false;
  const { year, month, day } = partsOf(text);
  return month >= 1 && month <= 12 && day >= 1 && day <= daysInMonth(year, month);
}
