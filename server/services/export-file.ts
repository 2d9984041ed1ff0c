/** The bytes of an export: entries are read here page by page and written in a thread. */
import { once } from 'node:events';
import { MessageChannel } from 'node:worker_threads';
import { Op } from 'sequelize';
import { ChainEntry } from '../models/chain-entry';
import type { Desk } from '../models/desk';
import type { HistoryExport } from '../models/history-export';
import { Underlying } from '../models/underlying';
import { threadPool } from '../thread-pool';
import type { ExportFileTask, ExportPage, WrittenFile } from '../threads/export-file';
import { findChecks } from './history';
import { beyond, matching, type HistoryKey } from './history-filter';

const pageSize = 500;

const pool = threadPool('export-file', 'writeExportFile', 1);

type Place = HistoryKey | null;

async function readPage(desk: Desk, row: HistoryExport, after: Place) {
  const entries = await ChainEntry.findAll({
    where: {
      [Op.and]: [
        ...matching(desk, row.filter),
        { position: { [Op.lte]: row.upToPosition } },
        ...(after === null ? [] : beyond(after)),
      ],
    },
    order: [
      ['valuedAt', 'DESC'],
      ['position', 'DESC'],
    ],
    limit: pageSize,
  });
  return { entries, checkOf: await findChecks(entries) };
}

async function symbolsOf(desk: Desk) {
  const rows = await Underlying.findAll({ where: { deskId: desk.id } });
  const byId = new Map(rows.map(({ id, symbol, currency }) => [id, { symbol, currency }]));
  return (id: string | null) => {
    const underlying = id === null ? undefined : byId.get(id);
    if (!underlying) throw new Error(`The chain names underlying ${id}, which is not on the desk.`);
    return underlying;
  };
}

function placeOf({ valuedAt, position }: ChainEntry): HistoryKey {
  if (valuedAt === null) throw new Error('A value has no valuation instant.');
  return { valuedAt, position: Number(position) };
}

/** The pages of an export, newest value first, as the thread takes them. */
async function* pagesOf(desk: Desk, row: HistoryExport): AsyncGenerator<ExportPage> {
  const symbolOf = await symbolsOf(desk);
  for (let after: Place = null; ;) {
    const { entries, checkOf } = await readPage(desk, row, after);
    yield entries.map((entry) => ({
      position: Number(entry.position),
      hash: entry.hash,
      underlying: symbolOf(entry.underlyingId),
      body: entry.body,
      check: checkOf(entry)?.body ?? null,
    }));
    const last = entries.at(-1);
    if (!last || entries.length < pageSize) return;
    after = placeOf(last);
  }
}

/** Sends a page and waits until it is written: the thread sets the pace, not the database. */
export async function makeExportFile(
  desk: Desk,
  row: HistoryExport,
  notes: ExportFileTask['notes'],
  onProgress: (done: number) => Promise<void>,
): Promise<WrittenFile> {
  const pool = threadPool('export-file', 'writeExportFile', 1);
  const { port1, port2 } = new MessageChannel();
  try {
    const task: ExportFileTask = { port: port2, format: row.format, notes };
    const written: Promise<WrittenFile> = pool.run(task, {
      transferList: [port2],
    });
    const feed = async () => {
      for await (const page of pagesOf(desk, row)) {
        port1.postMessage(page);
        const [done]: number[] = await once(port1, 'message');
        await onProgress(done);
      }
      port1.postMessage(null);
    };
    const [file] = await Promise.all([written, feed()]);
    return file;
  } finally {
    port1.close();
  }
}

export const closeExportThreads = () => pool.destroy();
