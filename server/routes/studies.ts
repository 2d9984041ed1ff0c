import {
  cancelStudy,
  createStudy,
  getStudy,
  getStudyFile,
  listStudies,
  sendBackStudy,
  signOffStudy,
} from '@/shared/contracts/studies';
import { route } from '../middleware/route';
import * as studies from '../services/studies';
import * as studyFile from '../services/study-file';

export const studyRoutes = [
  route(createStudy, ({ actor, body, writeOnce }) => studies.createStudy(actor, body, writeOnce)),
  route(listStudies, ({ actor, query }) => studies.listStudies(actor.desk, query)),
  route(getStudy, ({ actor, params }) => studies.getStudy(actor.desk, params.studyId)),
  route(getStudyFile, ({ actor, params }) => studyFile.getStudyFile(actor.desk, params.studyId)),
  route(cancelStudy, ({ actor, params }) => studies.cancelStudy(actor, params.studyId)),
  route(signOffStudy, ({ actor, params, body }) =>
    studies.signOffStudy(actor, params.studyId, body),
  ),
  route(sendBackStudy, ({ actor, params, body }) =>
    studies.sendBackStudy(actor, params.studyId, body),
  ),
];
