/**
 * Writes a file of the history beside the event loop. Pages come through a port, each answered by
 * how many rows are written so far; null ends the file.
 */
import { once } from 'node:events';
import type { MessagePort } from 'node:worker_threads';
import { valuationBodySchema } from '@/shared/contracts/chain-bodies';
import type { ExportFormat } from '@/shared/contracts/exports';
import { exportColumns, type Cell, type ExportRow } from '../exports/columns';
import { csvLine } from '../exports/csv';
import { openWorkbook } from '../exports/xlsx';

export type ExportFileTask = {
  port: MessagePort;
  format: ExportFormat;
  /** Lines that say what the file is, where its format has a place for them. */
  notes: readonly (readonly [string, string])[];
};

/** Bodies are still text: parsing them is work that the event loop need not do. */
export type ExportPage = readonly (Omit<ExportRow, 'body' | 'check'> & {
  body: string;
  check: string | null;
})[];

export type WrittenFile = {
  bytes: Uint8Array;
  firstPosition: number | null;
  lastPosition: number | null;
  engines: string[];
};

type Writer = { addRow: (cells: readonly Cell[]) => void; end: () => Promise<Uint8Array> };

function openCsv(): Writer {
  const lines = [csvLine(exportColumns.map(({ name }) => name))];
  return {
    addRow: (cells) => lines.push(csvLine(cells)),
    end: async () => Buffer.from(lines.join(''), 'utf8'),
  };
}

const bodyOf = (text: string) => valuationBodySchema.parse(JSON.parse(text));

export async function writeExportFile(task: ExportFileTask): Promise<WrittenFile> {
  const { port, format, notes } = task;
  const writer = format === 'csv' ? openCsv() : openWorkbook(exportColumns, notes);
  const engines = new Set<string>();
  const positions: number[] = [];
  for (;;) {
    const [page]: [ExportPage | null] = await once(port, 'message').then(([message]) => [message]);
    if (page === null) break;
    for (const { body, check, ...rest } of page) {
      const row = { ...rest, body: bodyOf(body), check: check === null ? null : bodyOf(check) };
      writer.addRow(exportColumns.map(({ cell }) => cell(row)));
      engines.add(row.body.engine);
      positions.push(row.position);
    }
    port.postMessage(positions.length);
  }
  port.close();
  positions.sort((a, b) => a - b);
  return {
    bytes: await writer.end(),
    firstPosition: positions[0] ?? null,
    lastPosition: positions.at(-1) ?? null,
    engines: [...engines].sort(),
  };
}
