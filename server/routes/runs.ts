import {
  answerByOverride,
  answerByStudy,
  cancelRun,
  createRun,
  getRun,
  getRunException,
  listRunExceptions,
  listRuns,
  listRunValuations,
  rerunRun,
  signOffRun,
} from '@/shared/contracts/runs';
import { route } from '../middleware/route';
import * as answers from '../services/run-answers';
import * as lists from '../services/run-lists';
import * as signOff from '../services/run-sign-off';
import * as valuations from '../services/run-valuations';
import * as runs from '../services/runs';

export const runRoutes = [
  route(createRun, ({ actor, body, writeOnce }) => runs.createRun(actor, body, writeOnce)),
  route(listRuns, ({ actor, query }) => runs.listRuns(actor.desk, query)),
  route(getRun, ({ actor, params }) => runs.getRun(actor.desk, params.runId)),
  route(cancelRun, ({ actor, params }) => runs.cancelRun(actor, params.runId)),
  route(rerunRun, ({ actor, params, writeOnce }) => runs.rerunRun(actor, params.runId, writeOnce)),
  route(listRunValuations, ({ actor, params, query }) =>
    lists.listRunValuations(actor.desk, params.runId, query),
  ),
  route(listRunExceptions, ({ actor, params, query }) =>
    lists.listRunExceptions(actor.desk, params.runId, query),
  ),
  route(getRunException, ({ actor, params }) =>
    valuations.getRunException(actor.desk, params.runId, params.exceptionId),
  ),
  route(answerByOverride, ({ actor, params, body }) =>
    answers.answerByOverride(actor, params, body),
  ),
  route(answerByStudy, ({ actor, params, body }) => answers.answerByStudy(actor, params, body)),
  route(signOffRun, ({ actor, params, body }) => signOff.signOffRun(actor, params.runId, body)),
];
