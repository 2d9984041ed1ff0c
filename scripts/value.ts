/**
 * Values a file of requests: reads `[{ "id", "request" }, ...]` and writes `[{ "id", "result" }, ...]`
 * in the same order to standard output. A request that cannot be priced is a result with `ok: false`;
 * a file that holds no such list is refused on standard error, with exit code 1.
 */
import fs from 'node:fs';
import path from 'node:path';
import { price } from '@/pricing/index';

type Case = { id: unknown; request: unknown };

const usage = 'Usage: npm run --silent value -- cases.json, a list of { "id", "request" }.';

function readCases(file: string): Case[] {
  // npm changes to the checkout; a relative path means the folder in which the command was typed.
  const from = process.env.INIT_CWD ?? process.cwd();
  const content: unknown = JSON.parse(fs.readFileSync(path.resolve(from, file), 'utf8'));
  if (!Array.isArray(content)) throw new Error(`${file} holds no list. ${usage}`);
  return content.map((entry: unknown) => {
    if (typeof entry !== 'object' || entry === null) return { id: null, request: entry };
    const { id = null, request } = entry as Partial<Case>;
    return { id, request };
  });
}

function valueFile(file: string | undefined): void {
  if (file === undefined) throw new Error(usage);
  const lines = readCases(file).map(({ id, request }) =>
    JSON.stringify({ id, result: price(request) }),
  );
  process.stdout.write(lines.length === 0 ? '[]\n' : `[\n${lines.join(',\n')}\n]\n`);
}

try {
  valueFile(process.argv[2]);
} catch (error) {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
}
