/** A workbook written row by row, so that no more than one row of it is ever an object. */
import { PassThrough } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import ExcelJS from 'exceljs';
import type { Cell, ExportColumn } from './columns';

export type WorkbookWriter = {
  addRow: (cells: readonly Cell[]) => void;
  /** The bytes of the finished file. */
  end: () => Promise<Buffer>;
};

/** A zone is no part of a spreadsheet's dates; the heading says that they are UTC. */
const dateFormat = 'yyyy-mm-dd hh:mm:ss';

const widthOf = ({ name, meaning }: ExportColumn) =>
  Math.max(12, name.length + 2, meaning.length > 40 ? 16 : 12);

/** Texts are written as texts, so that none is taken for a formula whatever it begins with. */
export function openWorkbook(
  columns: readonly ExportColumn[],
  notes: readonly (readonly [string, string])[],
): WorkbookWriter {
  const stream = new PassThrough();
  const bytes = buffer(stream);
  const workbook = new ExcelJS.stream.xlsx.WorkbookWriter({
    stream,
    useStyles: true,
    useSharedStrings: false,
  });
  const frozen = { views: [{ state: 'frozen' as const, ySplit: 1 }] };
  const values = workbook.addWorksheet('Values', frozen);
  values.columns = columns.map((column) => ({
    header: column.unit === '' ? column.name : `${column.name} (${column.unit})`,
    width: widthOf(column),
  }));
  values.getRow(1).font = { bold: true };
  values.getRow(1).commit();
  return {
    addRow(cells) {
      const row = values.addRow(cells);
      cells.forEach((cell, index) => {
        if (cell instanceof Date) row.getCell(index + 1).numFmt = dateFormat;
      });
      row.commit();
    },
    async end() {
      values.commit();
      const about = workbook.addWorksheet('About', frozen);
      about.columns = [
        { header: 'what', width: 24 },
        { header: 'says', width: 90 },
      ];
      about.getRow(1).font = { bold: true };
      for (const note of notes) about.addRow([...note]).commit();
      for (const { name, unit, meaning } of columns)
        about.addRow([name, unit === '' ? meaning : `${meaning} (${unit})`]).commit();
      about.commit();
      await workbook.commit();
      return bytes;
    },
  };
}
