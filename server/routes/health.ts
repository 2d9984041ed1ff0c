import { getHealth } from '@/shared/contracts/health';
import { route } from '../middleware/route';
import { readHealth } from '../services/health';

export const healthRoutes = [
  route(getHealth, async ({ res }) => {
    const health = await readHealth();
    if (health.status !== 'ready') res.status(503);
    return health;
  }),
];
