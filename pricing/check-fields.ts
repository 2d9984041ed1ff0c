/**
 * The checks of single fields that `check-request.ts` is made of. Each reports what is wrong with its
 * field into the list of issues, with a sentence that says what to do, and never throws.
 */
import type { PricingIssue, PricingIssueCode } from './contract';
import { numberLimits, sizeLimits } from './conventions';

export type Fields = Record<string, unknown>;
export type Size = keyof typeof sizeLimits;
type Limited = keyof typeof numberLimits;

const labels: Record<Limited | Size, string> = {
  strike: 'strike',
  cash: 'cash amount',
  spot: 'spot price',
  expiry: 'time to expiry',
  rate: 'rate',
  yield: 'yield',
  volatility: 'volatility',
  tolerance: 'tolerance',
  spaceSteps: 'number of space steps',
  timeSteps: 'number of time steps',
  steps: 'number of steps',
  nodes: 'number of nodes',
};

/** What a number outside its limits most often got wrong. */
const advice: Record<Limited, string> = {
  strike: 'in units of the quote currency',
  cash: 'in units of the quote currency',
  spot: 'in units of the quote currency',
  expiry: 'in years',
  rate: 'as a decimal (0.05 is 5 %)',
  yield: 'as a decimal (0.05 is 5 %)',
  volatility: 'as a decimal (0.2 is 20 %)',
  tolerance: 'in units of the quote currency',
};

const signed: readonly Limited[] = ['rate', 'yield'];

export type Issues = PricingIssue[];

export function report(
  issues: Issues,
  code: PricingIssueCode,
  path: string,
  message: string,
): void {
  issues.push({ code, path, message });
}

export function asFields(value: unknown): Fields | undefined {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return undefined;
  return { ...value };
}

/** 1e12, not thirteen digits that nobody can count. */
const written = (limit: number) =>
  limit > 1e6 ? limit.toExponential().replace('+', '') : String(limit);

export const listed = (names: readonly string[]) => names.map((name) => `“${name}”`).join(', ');

export function refuseOthers(
  issues: Issues,
  path: string,
  fields: Fields,
  known: readonly string[],
  toCome: readonly string[],
): void {
  for (const name of Object.keys(fields)) {
    if (known.includes(name)) continue;
    const at = path === '' ? name : `${path}.${name}`;
    if (toCome.includes(name)) {
      report(issues, 'not-priced', at, `“${name}” is not priced yet: remove it.`);
    } else {
      report(issues, 'unknown-field', at, `There is no field “${name}” here: remove it.`);
    }
  }
}

function checkNumber(issues: Issues, path: string, name: Limited | Size, value: unknown) {
  const label = labels[name];
  if (value === undefined || value === null) {
    report(issues, 'missing', path, `Enter the ${label}.`);
  } else if (typeof value !== 'number') {
    report(issues, 'not-a-number', path, `The ${label} must be a number.`);
  } else if (!Number.isFinite(value)) {
    report(issues, 'not-finite', path, `The ${label} must be a finite number.`);
  } else {
    return value;
  }
  return undefined;
}

export function checkLimited(issues: Issues, path: string, name: Limited, given: unknown): number {
  const value = checkNumber(issues, path, name, given);
  if (value === undefined) return NaN;
  const { min, max } = numberLimits[name];
  if (value <= 0 && !signed.includes(name)) {
    report(issues, 'not-positive', path, `The ${labels[name]} must be greater than zero.`);
  } else if (value < min || value > max) {
    const range = `between ${written(min)} and ${written(max)}, ${advice[name]}`;
    report(issues, 'out-of-range', path, `The ${labels[name]} must lie ${range}.`);
  }
  return value;
}

export function checkSize(issues: Issues, path: string, name: Size, given: unknown): void {
  const value = checkNumber(issues, path, name, given);
  if (value === undefined) return;
  const { min, max } = sizeLimits[name];
  if (value > max) {
    report(issues, 'too-many-steps', path, `The ${labels[name]} may be ${max} at most.`);
  } else if (value < min) {
    report(issues, 'too-few-steps', path, `The ${labels[name]} must be ${min} at least.`);
  } else if (!Number.isInteger(value)) {
    report(issues, 'out-of-range', path, `The ${labels[name]} must be a whole number.`);
  }
}

export function checkFlag(issues: Issues, path: string, given: unknown): void {
  if (typeof given === 'boolean') return;
  report(issues, 'unknown-name', path, 'This setting is true or false.');
}

/** One of `names`, or undefined with an issue. */
export function checkName<Name extends string>(
  issues: Issues,
  path: string,
  label: string,
  names: readonly Name[],
  value: unknown,
): Name | undefined {
  const found = names.find((name) => name === value);
  if (found !== undefined) return found;
  if (value === undefined || value === null) {
    report(issues, 'missing', path, `Choose the ${label}: ${listed(names)}.`);
  } else {
    report(issues, 'unknown-name', path, `The ${label} must be one of ${listed(names)}.`);
  }
  return undefined;
}

/** A name that is known and also priced. */
export function checkPriced<Name extends string, Priced extends Name>(
  issues: Issues,
  path: string,
  label: string,
  names: readonly Name[],
  priced: readonly Priced[],
  value: unknown,
): Priced | undefined {
  const name = checkName(issues, path, label, names, value);
  const found = priced.find((each) => each === name);
  if (name !== undefined && found === undefined) {
    const choice = `Choose ${listed(priced)} instead.`;
    report(issues, 'not-priced', path, `The ${label} “${name}” is not priced yet. ${choice}`);
  }
  return found;
}
