import { useEffect, useState } from 'react';
import type { QuestionTask, Solution } from './pricing-messages';
import { PricingThreadError } from './pricing-client';
import { pricingThread } from './pricing-thread';

type SolveTask = Exclude<QuestionTask, { kind: 'reprice' }>;

/** The thread's answer to the newest question; null while it is worked out, or without one. */
export function useSolution(task: SolveTask | null): Solution | null {
  const [answer, setAnswer] = useState<{ key: string; solution: Solution } | null>(null);
  const key = task === null ? null : JSON.stringify(task);
  useEffect(() => {
    if (key === null) return;
    let wanted = true;
    const settle = (solution: Solution) => {
      if (wanted) setAnswer({ key, solution });
    };
    pricingThread()
      .ask(JSON.parse(key) as SolveTask)
      .then(settle, (error: unknown) => {
        if (!(error instanceof PricingThreadError)) throw error;
        settle({ ok: false, message: error.message });
      });
    return () => {
      wanted = false;
    };
  }, [key]);
  return answer !== null && answer.key === key ? answer.solution : null;
}
