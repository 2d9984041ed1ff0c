/** Files of the filtered history with a signed manifest, made in the background. */
import { Op, type Includeable } from 'sequelize';
import {
  mostExportRows,
  type ExportFormat,
  type HistoryExport as ExportOnTheWire,
  type Manifest,
} from '@/shared/contracts/exports';
import type { HistoryFilter } from '@/shared/contracts/history';
import { AppError } from '@/shared/errors';
import { sequelize } from '../database';
import { anchorHead } from '../chain/anchors';
import { chainOf } from '../chain/append';
import { signingKey } from '../chain/signing-key';
import { sha256Of, signManifest } from '../exports/manifest';
import { ChainEntry } from '../models/chain-entry';
import { ChainHead } from '../models/chain-head';
import { Desk } from '../models/desk';
import { HistoryExport } from '../models/history-export';
import { User } from '../models/user';
import { addJob } from '../queue/add-job';
import type { WrittenFile } from '../threads/export-file';
import type { DeskActor } from './access';
import { makeExportFile } from './export-file';
import { matching } from './history-filter';
import { after, pageOf } from './page';
import { paced } from './paced';
import type { WriteOnce } from './write-once';

const progressEveryMs = 250;

const caution =
  'Model values are indicative and no investment advice. One volatility per strike and expiry, ' +
  'lognormal moves and no jumps are assumptions. “Agree” says that the sums are right, not that ' +
  'the model is.';

const mediaTypes: Record<ExportFormat, string> = {
  csv: 'text/csv; charset=utf-8',
  xlsx: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
};

const withMaker: Includeable = { model: User, as: 'createdBy', attributes: ['id', 'name'] };

const fileNameOf = ({ id, format, createdAt }: HistoryExport) =>
  `driftless-history-${createdAt.toISOString().slice(0, 10)}-${id.slice(0, 8)}.${format}`;

function exportOf(row: HistoryExport): ExportOnTheWire {
  const { id, format, filter, status, total, done, createdBy, createdAt, manifest } = row;
  if (!createdBy) throw new Error('An export was read without who asked for it.');
  return {
    id,
    format,
    filter,
    status,
    total,
    done,
    createdBy: { id: createdBy.id, name: createdBy.name },
    createdAt: createdAt.toISOString(),
    manifest,
  };
}

function refuseTooMany(total: number) {
  if (total <= mostExportRows) return;
  const message = `This is ${total} values; a file takes ${mostExportRows}. Choose a shorter period.`;
  throw new AppError('validation-failed', [{ path: 'filter', code: 'too-many-rows', message }]);
}

/** What the file will hold is fixed now: entries that come later are not part of it. */
export async function createExport(
  { desk, userId, name }: DeskActor,
  request: { format: ExportFormat; filter: HistoryFilter },
  inTransaction: WriteOnce,
): Promise<ExportOnTheWire> {
  const head = await ChainHead.findByPk(chainOf('valuations', desk.id), { rejectOnEmpty: true });
  const total = await ChainEntry.count({
    where: {
      [Op.and]: [...matching(desk, request.filter), { position: { [Op.lte]: head.position } }],
    },
  });
  refuseTooMany(total);
  return inTransaction(async (transaction) => {
    const row = await HistoryExport.create(
      {
        ...request,
        deskId: desk.id,
        upToPosition: head.position,
        total,
        createdById: userId,
      },
      { transaction },
    );
    await addJob(transaction, 'write-export', { exportId: row.id });
    return exportOf(Object.assign(row, { createdBy: { id: userId, name } }));
  });
}

const withoutContent = { exclude: ['content'] };

export async function listExports(desk: Desk, query: { cursor?: string; limit: number }) {
  const rows = await HistoryExport.findAll({
    attributes: withoutContent,
    where: { deskId: desk.id, ...after('createdAt', query.cursor) },
    include: withMaker,
    order: [
      ['createdAt', 'DESC'],
      ['id', 'DESC'],
    ],
    limit: query.limit + 1,
  });
  return pageOf(rows, query.limit, exportOf, ({ createdAt, id }) => ({ at: createdAt, id }));
}

export async function readExport(desk: Desk, id: string): Promise<ExportOnTheWire> {
  const row = await HistoryExport.findOne({
    attributes: withoutContent,
    where: { deskId: desk.id, id },
    include: withMaker,
  });
  if (!row) throw new AppError('not-found');
  return exportOf(row);
}

export async function readExportFile(desk: Desk, id: string) {
  const row = await HistoryExport.findOne({ where: { deskId: desk.id, id } });
  if (!row?.content) throw new AppError('not-found');
  return {
    fileName: fileNameOf(row),
    mediaType: mediaTypes[row.format],
    base64: row.content.toString('base64'),
  };
}

const notesOf = ({ filter, total }: HistoryExport, desk: Desk): [string, string][] => [
  ['desk', desk.name],
  ['filter', JSON.stringify(filter)],
  ['rows', String(total)],
  ['caution', caution],
];

/** Signs the heads and the manifest, and keeps the bytes: together or not at all. */
const finish = (row: HistoryExport, written: WrittenFile): Promise<unknown> =>
  sequelize.transaction(async (transaction) => {
    const valuations = chainOf('valuations', row.deskId);
    const anchor = await anchorHead(transaction, valuations, 'export');
    await anchorHead(transaction, chainOf('records', row.deskId), 'export');
    const content = Buffer.from(written.bytes);
    const readyAt = new Date();
    const { privateKey, keyId } = signingKey();
    const unsigned = {
      version: 1 as const,
      exportId: row.id,
      deskId: row.deskId,
      fileName: fileNameOf(row),
      format: row.format,
      filter: row.filter,
      rows: row.total,
      bytes: content.length,
      sha256: sha256Of(content),
      chain: {
        name: valuations,
        firstPosition: written.firstPosition,
        lastPosition: written.lastPosition,
        headPosition: anchor === null ? null : Number(anchor.position),
        headHash: anchor?.hash ?? null,
      },
      engines: written.engines,
      caution,
      madeBy: row.createdById,
      madeAt: readyAt.toISOString(),
    };
    const manifest: Manifest = signManifest(unsigned, privateKey, keyId);
    await row.update(
      {
        status: 'ready',
        done: row.total,
        content,
        sha256: manifest.sha256,
        manifest,
        readyAt,
      },
      { transaction },
    );
  });

/** The work itself, in a worker. Done again after a crash it starts with an empty file. */
export async function writeExport(id: string): Promise<void> {
  const row = await HistoryExport.findByPk(id, { rejectOnEmpty: true, attributes: withoutContent });
  if (row.status === 'ready') return;
  const desk = await Desk.findByPk(row.deskId, { rejectOnEmpty: true });
  const report = paced(progressEveryMs, (done: number) => row.update({ status: 'running', done }));
  await finish(row, await makeExportFile(desk, row, notesOf(row, desk), report));
}
