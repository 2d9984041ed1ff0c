import type { TaskList } from 'graphile-worker';
import { housekeeping } from './tasks/housekeeping';
import { runChunk } from './tasks/run-chunk';
import { runStudy } from './tasks/run-study';
import { verifyChain } from './tasks/verify-chain';
import { writeExport } from './tasks/write-export';

/** Every kind of job there is, by the name under which it is queued. */
export const taskList: TaskList = {
  housekeeping,
  'run-chunk': runChunk,
  'run-study': runStudy,
  'verify-chain': verifyChain,
  'write-export': writeExport,
};
