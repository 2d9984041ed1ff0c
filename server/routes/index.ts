/** Every route there is, mounted below the API's address with the pipeline before its handler. */
import { Router } from 'express';
import { pipeline } from '../middleware/pipeline';
import { unknownPath, wrongMethod } from '../middleware/problem';
import type { Route } from '../middleware/route';
import { chainRoutes } from './chains';
import { exportRoutes } from './exports';
import { bookRoutes } from './books';
import { healthRoutes } from './health';
import { historyRoutes } from './history';
import { marketDataRoutes } from './market-data';
import { peopleRoutes } from './people';
import { policyRoutes } from './policies';
import { quoteRoutes } from './quotes';
import { runRoutes } from './runs';
import { sessionRoutes } from './sessions';
import { studyRoutes } from './studies';
import { tradeRoutes } from './trades';
import { underlyingRoutes } from './underlyings';

export const routes: readonly Route[] = [
  ...healthRoutes,
  ...sessionRoutes,
  ...peopleRoutes,
  ...underlyingRoutes,
  ...quoteRoutes,
  ...marketDataRoutes,
  ...policyRoutes,
  ...bookRoutes,
  ...tradeRoutes,
  ...runRoutes,
  ...studyRoutes,
  ...chainRoutes,
  ...historyRoutes,
  ...exportRoutes,
];

const register = {
  GET: 'get',
  POST: 'post',
  PUT: 'put',
  DELETE: 'delete',
} as const;

export function apiRouter(): Router {
  const router = Router({ caseSensitive: true, strict: true });
  for (const each of routes)
    router[register[each.endpoint.method]](each.endpoint.path, pipeline(each));
  for (const path of new Set(routes.map(({ endpoint }) => endpoint.path))) {
    const allowed = routes
      .filter(({ endpoint }) => endpoint.path === path)
      .map(({ endpoint }) => endpoint.method);
    router.all(path, wrongMethod(allowed));
  }
  router.use(unknownPath);
  return router;
}
