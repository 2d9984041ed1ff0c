/** The rows of a study as CSV, one line a row, every figure unrounded. */
import type { Study, StudyRoute, StudyRowOnTheWire } from '@/shared/contracts/studies';
import type { Cell } from '../exports/columns';
import { csvLine } from '../exports/csv';
import type { Desk } from '../models/desk';
import { getStudy } from './studies';

type Column = { name: string; cell: (row: StudyRowOnTheWire, route: StudyRoute) => Cell };

const columns: readonly Column[] = [
  { name: 'method', cell: (_row, { name }) => name },
  { name: 'series', cell: ({ series }) => series },
  { name: 'space steps', cell: ({ settings }) => settings.spaceSteps ?? null },
  { name: 'time steps', cell: ({ settings }) => settings.timeSteps ?? null },
  { name: 'steps', cell: ({ settings }) => settings.steps ?? null },
  { name: 'value', cell: ({ value }) => value },
  { name: 'error', cell: ({ error }) => error },
  { name: 'ratio', cell: ({ ratio }) => ratio },
  { name: 'order', cell: ({ order }) => order },
  { name: 'extrapolated', cell: ({ richardson }) => richardson },
  { name: 'settled digits', cell: ({ settledDigits }) => settledDigits },
  { name: 'k/h2', cell: ({ stability }) => stability },
  { name: 'amplification', cell: ({ amplification }) => amplification },
  { name: 'past the limit', cell: ({ pastLimit }) => pastLimit },
  { name: 'milliseconds', cell: ({ milliseconds }) => milliseconds },
  { name: 'no value because', cell: ({ failure }) => failure },
];

const linesOf = ({ routes }: Study): string[] =>
  routes.flatMap((route) =>
    route.rows.map((row) => csvLine(columns.map(({ cell }) => cell(row, route)))),
  );

export async function getStudyFile(desk: Desk, id: string) {
  const study = await getStudy(desk, id);
  const head = csvLine(columns.map(({ name }) => name));
  return {
    fileName: `driftless-study-${study.number}.csv`,
    csv: [head, ...linesOf(study)].join(''),
  };
}
