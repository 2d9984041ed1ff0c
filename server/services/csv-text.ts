/** From the bytes of a file to its text, or what kind of file it is instead. */
import { isUtf8 } from 'node:buffer';

export type FileText =
  | { ok: true; text: string }
  | { ok: false; row: number; code: 'empty' | 'workbook' | 'encoding' | 'binary'; message: string };

const refuse = (
  code: 'empty' | 'workbook' | 'encoding' | 'binary',
  message: string,
  row = 0,
): FileText => ({
  ok: false,
  row,
  code,
  message,
});

const startsWith = (bytes: Buffer, ...start: number[]) =>
  start.every((byte, index) => bytes[index] === byte);

/** The first line that is not UTF-8, counted from 1. A line's end is the same byte in both. */
function firstWrongLine(bytes: Buffer): number {
  let row = 1;
  for (let start = 0; start < bytes.length; row += 1) {
    const end = bytes.indexOf(0x0a, start);
    const next = end < 0 ? bytes.length : end + 1;
    if (!isUtf8(bytes.subarray(start, next))) return row;
    start = next;
  }
  return row;
}

export function textOfFile(bytes: Buffer): FileText {
  if (bytes.length === 0) return refuse('empty', 'The file is empty.');
  if (startsWith(bytes, 0x50, 0x4b, 0x03, 0x04))
    return refuse('workbook', 'This is a workbook; save its sheet as CSV in UTF-8.');
  if (startsWith(bytes, 0xff, 0xfe) || startsWith(bytes, 0xfe, 0xff))
    return refuse('encoding', 'This file is in UTF-16; save it as CSV in UTF-8.');
  if (bytes.includes(0))
    return refuse('binary', 'This is no text file; save the sheet as CSV in UTF-8.');
  if (!isUtf8(bytes)) {
    const row = firstWrongLine(bytes);
    const message = 'This row has characters that are not UTF-8; save the file as CSV in UTF-8.';
    return refuse('encoding', message, row);
  }
  // The decoder leaves out a byte-order mark.
  const text = new TextDecoder('utf-8').decode(bytes);
  return text.trim() === '' ? refuse('empty', 'The file is empty.') : { ok: true, text };
}
