/** A policy in the words and figures of the screen. */
import { policiesText } from '@/constants/texts/policies';
import { routeLabel } from '@/constants/texts/price';
import type { Policy } from '@/shared/contracts/policies';
import type { Underlying } from '@/shared/contracts/underlyings';
import { formatMoney } from '@/shared/format/money';
import { formatPercent, formatQuantity } from '@/shared/format/numbers';
import { numberText } from '@/shared/format/parse';
import { routeSizes } from '@/shared/format/terms';

type Refinement = Policy['refinement'];

function sizesText(sizes: Extract<Refinement, { by: 'sizes' }>['sizes']): string {
  const routes = (['heat-crank-nicolson', 'lattice-symmetric', 'lattice-crr'] as const).flatMap(
    (name) => {
      const text = routeSizes({ name, ...sizes[name] });
      return text === '' ? [] : [policiesText.sizes(routeLabel(name), text)];
    },
  );
  return routes.length === 0 ? policiesText.ownSizes : policiesText.bySizes(routes.join(', '));
}

const refinementText = (refinement: Refinement): string =>
  refinement.by === 'sizes'
    ? sizesText(refinement.sizes)
    : policiesText.byTolerance(formatPercent(refinement.share, 0));

/** Names and values, in the order in which they are read. */
export const policyFacts = (policy: Policy): { name: string; value: string }[] => [
  {
    name: policiesText.facts.european,
    value: policiesText.routes(
      routeLabel(policy.primaryEuropean),
      routeLabel(policy.checkEuropean),
    ),
  },
  {
    name: policiesText.facts.american,
    value: policiesText.routes(
      routeLabel(policy.primaryAmerican),
      routeLabel(policy.checkAmerican),
    ),
  },
  { name: policiesText.facts.refinement, value: refinementText(policy.refinement) },
  { name: policiesText.facts.reason, value: policy.reason },
];

export function unitText(policy: Policy, { id, currency, unit }: Underlying): string {
  const tolerance = policy.unitTolerance[id];
  if (tolerance === undefined) return policiesText.ownOnly;
  return policiesText.perUnit(formatQuantity(numberText(tolerance), 0, 12), currency, unit);
}

export function moneyText(policy: Policy, { currency }: Underlying): string {
  const amount = policy.moneyTolerance[currency];
  return amount === undefined ? policiesText.noMoney : formatMoney(amount, currency);
}

/** With what stood there before, where that was something else. */
export const beside = (text: string, before: string | null): string =>
  before === null || before === text ? text : `${text} (${policiesText.before(before)})`;
