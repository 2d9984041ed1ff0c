/** The page's end of the pricing thread: numbers its messages, and drops what is outdated. */
import type {
  PricedRoute,
  PriceTask,
  PricingMessage,
  PricingReply,
  QuestionTask,
} from './pricing-messages';

/** As much of a Worker as the client needs. */
export type PricingThread = {
  postMessage: (message: PricingMessage) => void;
  onReply: (listener: (reply: PricingReply) => void) => void;
  onError: (listener: () => void) => void;
};

type RoutesReply = Extract<PricingReply, { kind: 'routes' }>;
type AnswerTo<T extends QuestionTask> = T extends { kind: 'reprice' }
  ? PricedRoute[]
  : Extract<PricingReply, { kind: 'solution' }>['solution'];

export class PricingThreadError extends Error {
  constructor() {
    super('The pricing thread stopped.');
    this.name = 'PricingThreadError';
  }
}

export type PricingClient = {
  /** Prices these terms in place of any before them; gives up when the returned function is called. */
  price: (
    task: PriceTask,
    onRoutes: (reply: RoutesReply) => void,
    onError: (error: PricingThreadError) => void,
  ) => () => void;
  ask: <T extends QuestionTask>(task: T) => Promise<AnswerTo<T>>;
};

type Waiting = { onReply: (reply: PricingReply) => void; onError: (e: PricingThreadError) => void };

export function createPricingClient(thread: PricingThread): PricingClient {
  let sequence = 0;
  let newestPrice = 0;
  let failed = false;
  const waiting = new Map<number, Waiting>();

  thread.onReply((reply) => waiting.get(reply.sequence)?.onReply(reply));
  thread.onError(() => {
    failed = true;
    const abandoned = [...waiting.values()];
    waiting.clear();
    for (const { onError } of abandoned) onError(new PricingThreadError());
  });

  function send(task: PriceTask | QuestionTask, entry: Waiting): number {
    sequence += 1;
    if (failed) {
      entry.onError(new PricingThreadError());
      return sequence;
    }
    waiting.set(sequence, entry);
    thread.postMessage({ sequence, task });
    return sequence;
  }

  return {
    price(task, onRoutes, onError) {
      waiting.delete(newestPrice);
      const own = send(task, {
        onReply(reply) {
          if (reply.kind !== 'routes') return;
          if (reply.comparison !== null) waiting.delete(reply.sequence);
          onRoutes(reply);
        },
        onError,
      });
      newestPrice = own;
      return () => waiting.delete(own);
    },
    ask: (task) =>
      new Promise((resolve, reject) => {
        send(task, {
          onReply(reply) {
            waiting.delete(reply.sequence);
            const answer = reply.kind === 'routes' ? reply.routes : reply.solution;
            // The kind of reply follows from the kind of task (`pricing.worker.ts`).
            resolve(answer as AnswerTo<typeof task>);
          },
          onError: reject,
        });
      }),
  };
}
