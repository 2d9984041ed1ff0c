/**
 * What a request must satisfy before any method sees it. Every issue is listed, with the path of its
 * field and a sentence that says what to do. Nothing is repaired: text is not read as a number, an
 * unknown field is refused by name, and a payoff or exercise that is known but not priced is
 * refused as such. Which method prices what is the registry's business, not this one's.
 */
import type {
  CheckedRequest,
  Contract,
  Market,
  MethodChoice,
  MethodName,
  PricingIssue,
  PricingIssueCode,
  PricingRequest,
} from './contract';
import { numberLimits, sizeLimits } from './conventions';
import { exercises, methodNames, optionKinds, payoffs, pricedExercises, smoothings } from './names';

type Fields = Record<string, unknown>;
type Size = keyof typeof sizeLimits;
type Limited = keyof typeof numberLimits;

/** The settings that each method reads besides its name. */
const settingsOf: Record<MethodName, readonly (Size | 'smoothing' | 'beyondStability')[]> = {
  'closed-form': [],
  'heat-crank-nicolson': ['spaceSteps', 'timeSteps', 'smoothing'],
  'lattice-crr': ['steps', 'smoothing'],
  'lattice-symmetric': ['steps', 'smoothing'],
  'heat-explicit': ['spaceSteps', 'timeSteps', 'smoothing', 'beyondStability'],
  'heat-implicit': ['spaceSteps', 'timeSteps', 'smoothing'],
  'spectral-boundary': ['nodes'],
  'lattice-jarrow-rudd': ['steps', 'smoothing'],
  'lattice-tian': ['steps', 'smoothing'],
  'lattice-trinomial': ['steps', 'smoothing'],
  'lattice-leisen-reimer': ['steps', 'smoothing'],
};

/** Fields of the request shape that no priced payoff or market uses yet. */
const contractFieldsToCome = ['exerciseTimes', 'cash', 'payAt', 'barrier', 'average'];
const marketFieldsToCome = ['dividends', 'rateNodes', 'yieldNodes', 'volatilityNodes'];

const labels: Record<Limited | Size, string> = {
  strike: 'strike',
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
  spot: 'in units of the quote currency',
  expiry: 'in years',
  rate: 'as a decimal (0.05 is 5 %)',
  yield: 'as a decimal (0.05 is 5 %)',
  volatility: 'as a decimal (0.2 is 20 %)',
  tolerance: 'in units of the quote currency',
};

const signed: readonly Limited[] = ['rate', 'yield'];

type Issues = PricingIssue[];

function report(issues: Issues, code: PricingIssueCode, path: string, message: string): void {
  issues.push({ code, path, message });
}

function asFields(value: unknown): Fields | undefined {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return undefined;
  return { ...value };
}

/** 1e12, not thirteen digits that nobody can count. */
const written = (limit: number) =>
  limit > 1e6 ? limit.toExponential().replace('+', '') : String(limit);

const listed = (names: readonly string[]) => names.map((name) => `“${name}”`).join(', ');

function refuseOthers(
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

function checkLimited(issues: Issues, path: string, name: Limited, given: unknown): number {
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

function checkSize(issues: Issues, path: string, name: Size, given: unknown): void {
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

function checkFlag(issues: Issues, path: string, given: unknown): void {
  if (typeof given === 'boolean') return;
  report(issues, 'unknown-name', path, 'This setting is true or false.');
}

/** One of `names`, or undefined with an issue. */
function checkName<Name extends string>(
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
function checkPriced<Name extends string, Priced extends Name>(
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

function checkContract(issues: Issues, value: unknown): Contract | undefined {
  const fields = asFields(value);
  if (fields === undefined) {
    report(
      issues,
      'missing',
      'contract',
      'Give the contract: its payoff, exercise, kind and terms.',
    );
    return undefined;
  }
  const payoff = checkPriced(
    issues,
    'contract.payoff',
    'payoff',
    payoffs,
    ['vanilla'],
    fields.payoff,
  );
  const exercise = checkPriced(
    issues,
    'contract.exercise',
    'exercise',
    exercises,
    pricedExercises,
    fields.exercise,
  );
  const kind = checkName(issues, 'contract.kind', 'kind', optionKinds, fields.kind);
  const strike = checkLimited(issues, 'contract.strike', 'strike', fields.strike);
  const expiry = checkLimited(issues, 'contract.expiry', 'expiry', fields.expiry);
  const known = ['payoff', 'exercise', 'kind', 'strike', 'expiry'];
  refuseOthers(issues, 'contract', fields, known, contractFieldsToCome);
  if (!payoff || !exercise || !kind) return undefined;
  return { payoff, exercise, kind, strike, expiry };
}

function checkMarket(issues: Issues, value: unknown): Market | undefined {
  const fields = asFields(value);
  if (fields === undefined) {
    report(issues, 'missing', 'market', 'Give the market: spot, rate, yield and volatility.');
    return undefined;
  }
  const common = {
    spot: checkLimited(issues, 'market.spot', 'spot', fields.spot),
    rate: checkLimited(issues, 'market.rate', 'rate', fields.rate),
    volatility: checkLimited(issues, 'market.volatility', 'volatility', fields.volatility),
  };
  const known = ['spot', 'rate', 'yield', 'carry', 'volatility'];
  refuseOthers(issues, 'market', fields, known, marketFieldsToCome);
  if (fields.carry === undefined) {
    return { ...common, yield: checkLimited(issues, 'market.yield', 'yield', fields.yield) };
  }
  const carry = checkName(issues, 'market.carry', 'carry', ['future'] as const, fields.carry);
  if (fields.yield !== undefined) {
    const message = 'A future has no yield of its own: remove the yield, or the carry.';
    report(issues, 'unknown-field', 'market.yield', message);
  }
  return carry && { ...common, carry };
}

function checkMethod(issues: Issues, value: unknown): MethodChoice | undefined {
  if (value === undefined) return undefined;
  const fields = asFields(value);
  if (fields === undefined || (fields.name === undefined && fields.tolerance === undefined)) {
    report(
      issues,
      'missing',
      'method',
      'Give the name of a method or a tolerance, or leave it out.',
    );
    return undefined;
  }
  if (fields.name === undefined) {
    refuseOthers(issues, 'method', fields, ['tolerance'], []);
    const tolerance = checkLimited(issues, 'method.tolerance', 'tolerance', fields.tolerance);
    return { tolerance };
  }
  const name = checkName(issues, 'method.name', 'method', methodNames, fields.name);
  if (name === undefined) return undefined;
  const settings = settingsOf[name];
  refuseOthers(issues, 'method', fields, ['name', ...settings], []);
  const choice: Fields = { name };
  for (const setting of settings) {
    const given = fields[setting];
    if (given === undefined) continue;
    const path = `method.${setting}`;
    if (setting === 'smoothing') checkName(issues, path, setting, smoothings, given);
    else if (setting === 'beyondStability') checkFlag(issues, path, given);
    else checkSize(issues, path, setting, given);
    choice[setting] = given;
  }
  return choice as MethodChoice;
}

/** The request itself, in a copy that holds nothing else, or everything that is wrong with it. */
export function checkRequest(input: unknown): CheckedRequest {
  const issues: Issues = [];
  const fields = asFields(input);
  if (fields === undefined) {
    report(issues, 'missing', '', 'A request holds a contract and a market.');
    return { ok: false, issues };
  }
  const contract = checkContract(issues, fields.contract);
  const market = checkMarket(issues, fields.market);
  const method = checkMethod(issues, fields.method);
  refuseOthers(issues, '', fields, ['contract', 'market', 'method'], []);
  if (issues.length > 0 || !contract || !market) return { ok: false, issues };
  const request: PricingRequest = { contract, market };
  return { ok: true, request: method === undefined ? request : { ...request, method } };
}
