/** The engine beside the event loop: every route that prices these terms, in one task. */
import type { Contract, Market } from '@/pricing/contract';
import { priceRoutes as price } from '@/pricing/index';

export type PriceTask = { contract: Contract; market: Market };

export const priceRoutes = ({ contract, market }: PriceTask) => price(contract, market);
