/** The work of a study: one row a job, so that a stop, a crash or a cancellation costs one row at most. */
import type { LadderStep, MethodName } from '@/pricing/contract';
import { sequelize } from '../database';
import { Study } from '../models/study';
import { StudyRow } from '../models/study-row';
import { addJob } from '../queue/add-job';
import { runRow } from './study-threads';
import { routeOf } from './study-views';
import type { TimedRow } from '../threads/study';

type Rung = { route: MethodName; step: LadderStep };

const isComputing = ({ status }: Study) => status === 'queued' || status === 'running';

function firstMissing(study: Study, rows: readonly StudyRow[]): Rung | null {
  const key = (route: string, ordinal: number) => `${route} ${ordinal}`;
  const present = new Set(rows.map(({ route, ordinal }) => key(route, ordinal)));
  for (const { name, steps } of study.ladders) {
    const step = steps.find(({ ordinal }) => !present.has(key(name, ordinal)));
    if (step) return { route: name, step };
  }
  return null;
}

/**
 * Keeps a row and queues the next one, or ends the study, all in one transaction. A row that is
 * there already was kept by the same job before a crash, which also queued what follows.
 */
const keepRow = (id: string, { route, step }: Rung, { result, milliseconds }: TimedRow) =>
  sequelize.transaction(async (transaction) => {
    const study = await Study.findByPk(id, { transaction, lock: true, rejectOnEmpty: true });
    const key = { studyId: id, route, ordinal: step.ordinal };
    if (!isComputing(study)) return;
    if (await StudyRow.findOne({ where: key, transaction })) return;
    await StudyRow.create({ ...key, result, milliseconds }, { transaction });
    const rows = await StudyRow.findAll({ where: { studyId: id }, transaction });
    const done = rows.length;
    if (done < study.total) {
      await study.update({ status: 'running', done }, { transaction });
      await addJob(transaction, 'run-study', { studyId: id });
      return;
    }
    const orders = study.ladders.map((ladder) => {
      const { name, theoreticalOrder, fits } = routeOf(study, ladder, rows);
      return { name, theoreticalOrder, fits };
    });
    const finishedAt = new Date();
    await study.update(
      { status: 'finished', done, orders, finishedAt, version: study.version + 1 },
      { transaction },
    );
  });

export async function runNextRow(id: string): Promise<void> {
  const study = await Study.findByPk(id, { rejectOnEmpty: true });
  if (!isComputing(study)) return;
  const rows = await StudyRow.findAll({
    attributes: ['route', 'ordinal'],
    where: { studyId: id },
  });
  const next = firstMissing(study, rows);
  if (next === null) return;
  const { contract, market } = study.request;
  await keepRow(id, next, await runRow({ contract, market, step: next.step }));
}
