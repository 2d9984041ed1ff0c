/** What is typed into the form of a policy, and how it is read: the shared schema after the typing. */
import { policyFormText } from '@/constants/texts/policies';
import {
  policyDraftSchema,
  type Policy,
  type PolicyDraft,
  type PolicySizes,
} from '@/shared/contracts/policies';
import type { Underlying } from '@/shared/contracts/underlyings';
import {
  numberText,
  parseDecimal,
  parseNumber,
  parsePercent,
  percentText,
} from '@/shared/format/parse';

/** Every field is a text; tolerances stand under the name of what they are for. */
export type PolicyValues = Record<string, string>;

export const unitName = (underlyingId: string) => `unit_${underlyingId}`;
export const moneyName = (currency: string) => `money_${currency}`;

const sizeFields = [
  { name: 'gridSpaceSteps', method: 'heat-crank-nicolson', size: 'spaceSteps' },
  { name: 'gridTimeSteps', method: 'heat-crank-nicolson', size: 'timeSteps' },
  { name: 'symmetricSteps', method: 'lattice-symmetric', size: 'steps' },
  { name: 'crrSteps', method: 'lattice-crr', size: 'steps' },
] as const;
export const sizeNames = sizeFields.map(({ name }) => name);

const usualShare = '20';

export const currenciesOf = (underlyings: readonly Underlying[]): string[] =>
  [...new Set(underlyings.map(({ currency }) => currency))].sort();

type Sizes = Record<string, Record<string, number | undefined> | undefined>;

/** A form begins with the draft that waits, or with the policy in force. */
export function policyDefaults(
  from: Policy | null,
  underlyings: readonly Underlying[],
): PolicyValues {
  const refinement = from?.refinement;
  const sizes: Sizes = refinement?.by === 'sizes' ? refinement.sizes : {};
  const sizeText = (method: string, size: string) => sizes[method]?.[size]?.toString() ?? '';
  return {
    primaryEuropean: from?.primaryEuropean ?? 'closed-form',
    checkEuropean: from?.checkEuropean ?? 'heat-crank-nicolson',
    primaryAmerican: from?.primaryAmerican ?? 'heat-crank-nicolson',
    checkAmerican: from?.checkAmerican ?? 'lattice-symmetric',
    by: refinement?.by ?? 'tolerance',
    share: refinement?.by === 'tolerance' ? percentText(refinement.share) : usualShare,
    ...Object.fromEntries(
      sizeFields.map(({ name, method, size }) => [name, sizeText(method, size)]),
    ),
    ...Object.fromEntries(
      underlyings.map(({ id }) => {
        const tolerance = from?.unitTolerance[id];
        return [unitName(id), tolerance === undefined ? '' : numberText(tolerance)];
      }),
    ),
    ...Object.fromEntries(
      currenciesOf(underlyings).map((currency) => [
        moneyName(currency),
        from?.moneyTolerance[currency] ?? '',
      ]),
    ),
    reason: from?.status === 'draft' ? from.reason : '',
  };
}

type Errors = Record<string, string>;

function readSizes(values: PolicyValues, errors: Errors): PolicySizes {
  const sizes: Record<string, Record<string, number>> = {};
  for (const { name, method, size } of sizeFields) {
    const text = values[name].trim();
    if (text === '') continue;
    const parsed = parseNumber(text);
    if (!parsed.ok) errors[name] = policyFormText.notWhole;
    else sizes[method] = { ...sizes[method], [size]: parsed.value };
  }
  return sizes;
}

function readTolerances(
  values: PolicyValues,
  underlyings: readonly Underlying[],
  errors: Errors,
): Pick<PolicyDraft, 'unitTolerance' | 'moneyTolerance'> {
  const unitTolerance: PolicyDraft['unitTolerance'] = {};
  const moneyTolerance: PolicyDraft['moneyTolerance'] = {};
  for (const { id } of underlyings) {
    const text = values[unitName(id)].trim();
    if (text === '') continue;
    const parsed = parseNumber(text);
    if (parsed.ok) unitTolerance[id] = parsed.value;
    else errors[unitName(id)] = parsed.message;
  }
  for (const currency of currenciesOf(underlyings)) {
    const text = values[moneyName(currency)].trim();
    if (text === '') continue;
    const parsed = parseDecimal(text);
    if (parsed.ok) moneyTolerance[currency] = parsed.value;
    else errors[moneyName(currency)] = parsed.message;
  }
  return { unitTolerance, moneyTolerance };
}

/** The field that a path of the schema is typed into; null where none is. */
export function fieldOfPath(path: string): string | null {
  const [first, second, third, fourth] = path.split('.');
  if (first === 'unitTolerance') return unitName(second);
  if (first === 'moneyTolerance') return moneyName(second);
  if (first !== 'refinement') return first === '' ? null : first;
  if (second === 'share') return 'share';
  const field = sizeFields.find(({ method, size }) => method === third && size === fourth);
  return field?.name ?? 'by';
}

export type ReadPolicy = { ok: true; draft: PolicyDraft } | { ok: false; errors: Errors };

export function readPolicy(values: PolicyValues, underlyings: readonly Underlying[]): ReadPolicy {
  const errors: Errors = {};
  const readShare = () => {
    const parsed = parsePercent(values.share);
    if (parsed.ok) return parsed.value;
    errors.share = parsed.message;
    return NaN;
  };
  const draft = {
    primaryEuropean: values.primaryEuropean,
    checkEuropean: values.checkEuropean,
    primaryAmerican: values.primaryAmerican,
    checkAmerican: values.checkAmerican,
    refinement:
      values.by === 'sizes'
        ? { by: 'sizes', sizes: readSizes(values, errors) }
        : { by: 'tolerance', share: readShare() },
    ...readTolerances(values, underlyings, errors),
    reason: values.reason,
  };
  const checked = policyDraftSchema.safeParse(draft);
  for (const { path, message } of checked.error?.issues ?? []) {
    const field = fieldOfPath(path.join('.'));
    if (field !== null) errors[field] ??= message;
  }
  return checked.success && Object.keys(errors).length === 0
    ? { ok: true, draft: checked.data }
    : { ok: false, errors };
}
