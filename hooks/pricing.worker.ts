/**
 * The browser's pricing thread. It prices route by route and looks for newer terms in between, so
 * that a key stroke waits for one route at most and outdated work is dropped.
 */
import {
  compareRoutes,
  impliedVolatility,
  price,
  routesFor,
  strikeForDelta,
} from '@/pricing/index';
import type { MethodName } from '@/pricing/contract';
import type {
  PricedRoute,
  PriceTask,
  PricingMessage,
  PricingReply,
  QuestionTask,
} from './pricing-messages';

type Job = {
  sequence: number;
  task: PriceTask;
  names: readonly MethodName[];
  routes: PricedRoute[];
};

let job: Job | null = null;
let scheduled = false;

const reply = (message: PricingReply) => postMessage(message);

/** A turn of the event loop lets messages in; errors in it reach the page as errors of the thread. */
function schedule() {
  if (scheduled) return;
  scheduled = true;
  setTimeout(priceNextRoute);
}

function priceNextRoute() {
  scheduled = false;
  if (job === null) return;
  const { sequence, task, names, routes } = job;
  const { contract, market } = task.request;
  const name = names[routes.length];
  routes.push({ name, result: price({ contract, market, method: { name } }) });
  const complete = routes.length === names.length;
  const comparison = complete ? compareRoutes(routes, task.tolerance) : null;
  // The first number at once, then the whole comparison: each answer costs the page a drawing.
  if (complete || routes.length === 1) reply({ sequence, kind: 'routes', routes, comparison });
  if (complete) job = null;
  else schedule();
}

function answer(sequence: number, task: QuestionTask) {
  switch (task.kind) {
    case 'reprice': {
      const { contract, market, methods } = task;
      const routes = methods.map((method) => ({
        name: method.name,
        result: price({ contract, market, method }),
      }));
      return reply({ sequence, kind: 'routes', routes, comparison: null });
    }
    case 'volatility':
      return reply({
        sequence,
        kind: 'solution',
        solution: impliedVolatility(task.request, task.premium),
      });
    case 'strike':
      return reply({
        sequence,
        kind: 'solution',
        solution: strikeForDelta(task.request, task.delta),
      });
  }
}

addEventListener('message', ({ data }: MessageEvent<PricingMessage>) => {
  const { sequence, task } = data;
  if (task.kind !== 'price') return answer(sequence, task);
  const { contract, market } = task.request;
  job = { sequence, task, names: routesFor(contract, market), routes: [] };
  schedule();
});
