/** A quote as the server would make it of a draft: the same engine, invented names. */
import { compareRoutes, engineVersion, priceRoutes } from '@/pricing/index';
import type { Quote, QuoteDraft } from '@/shared/contracts/quotes';
import { positionTotal, pricingRequestOf } from '@/shared/quote-terms';
import { desk, wheat } from '../hooks/ticket-examples';

const maker = { id: '22222222-2222-4222-8222-222222222222', name: 'Analyst' };

export function quoteFor(draft: QuoteDraft, count: number): Quote {
  const { contract, market } = pricingRequestOf(draft, desk);
  const routes = priceRoutes(contract, market);
  const primary = routes.find(({ result }) => result.ok);
  if (!primary?.result.ok) throw new Error('The example cannot be priced.');
  const { value, errorEstimate } = primary.result;
  const { verdict, refuted } = compareRoutes(routes, wheat.tolerance);
  return {
    ...draft,
    id: `55555555-5555-4555-8555-55555555555${count}`,
    number: `Q-000${count}`,
    underlying: wheat,
    value,
    errorEstimate,
    total: positionTotal(value, draft),
    tolerance: wheat.tolerance,
    verdict,
    refuted,
    strip: routes.flatMap(({ name, result }) =>
      result.ok ? [{ name, value: result.value, errorEstimate: result.errorEstimate }] : [],
    ),
    createdBy: maker,
    createdAt: '2026-12-01T10:00:05Z',
    expiryAt: '2027-03-01T16:30:00Z',
    expiryYears: contract.expiry,
    snapshotId: null,
    primaryRoute: primary.name,
    routes,
    engine: engineVersion,
  };
}
