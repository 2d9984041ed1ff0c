import { listUnderlyings } from '@/shared/contracts/underlyings';
import { route } from '../middleware/route';
import * as underlyings from '../services/underlyings';

export const underlyingRoutes = [
  route(listUnderlyings, async ({ actor }) => ({
    underlyings: await underlyings.listUnderlyings(actor.desk),
  })),
];
