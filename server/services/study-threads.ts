/** The threads that studies are computed in. */
import os from 'node:os';
import type { PricingFailure, StudyReference } from '@/pricing/contract';
import { threadPool } from '../thread-pool';
import type { RowTask, StudyTask, TimedRow } from '../threads/study';

const pool = threadPool('study', 'runRow', Math.max(1, os.availableParallelism() - 1));

export const runRow = (task: RowTask): Promise<TimedRow> => pool.run(task);

export const findReference = (task: StudyTask): Promise<StudyReference | PricingFailure> =>
  pool.run(task, { name: 'findReference' });

export const closeStudyThreads = () => pool.destroy();
