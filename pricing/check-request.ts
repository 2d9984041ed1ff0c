/**
 * What a request must satisfy before any method sees it. Every issue is listed, with the path of its
 * field and a sentence that says what to do. Nothing is repaired: text is not read as a number, an
 * unknown field is refused by name, and a payoff or exercise that is known but not priced is
 * refused as such. Which method prices what is the registry's business, not this one's.
 */
import {
  asFields,
  checkFlag,
  checkLimited,
  checkName,
  checkPriced,
  checkSize,
  refuseOthers,
  report,
  type Fields,
  type Issues,
  type Size,
} from './check-fields';
import type {
  CheckedRequest,
  Contract,
  Market,
  MethodChoice,
  MethodName,
  PricingRequest,
} from './contract';
import {
  exercises,
  methodNames,
  optionKinds,
  payoffs,
  pricedExercises,
  pricedPayoffs,
  smoothings,
} from './names';

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
const contractFieldsToCome = ['exerciseTimes', 'payAt', 'barrier', 'average'];
const marketFieldsToCome = ['dividends', 'rateNodes', 'yieldNodes', 'volatilityNodes'];

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
    pricedPayoffs,
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
  const cash = checkCash(issues, payoff, fields.cash);
  const known = ['payoff', 'exercise', 'kind', 'strike', 'expiry', 'cash'];
  refuseOthers(issues, 'contract', fields, known, contractFieldsToCome);
  if (!payoff || !exercise || !kind) return undefined;
  if (payoff !== 'vanilla' && exercise !== 'european') {
    const message = `The payoff “${payoff}” is priced with European exercise only: choose “european”.`;
    report(issues, 'not-priced', 'contract.exercise', message);
  }
  const terms = { exercise, kind, strike, expiry };
  return payoff === 'cash-or-nothing' ? { payoff, ...terms, cash } : { payoff, ...terms };
}

/** What a digital option pays; absent, and refused, wherever the payoff does not use it. */
function checkCash(issues: Issues, payoff: Contract['payoff'] | undefined, given: unknown): number {
  if (payoff === 'cash-or-nothing') return checkLimited(issues, 'contract.cash', 'cash', given);
  if (payoff !== undefined && given !== undefined) {
    const message = 'Only a cash-or-nothing option pays cash: remove the amount.';
    report(issues, 'unknown-field', 'contract.cash', message);
  }
  return NaN;
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
