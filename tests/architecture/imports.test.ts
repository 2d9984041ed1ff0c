/**
 * The import graph keeps the table of import rules and has no cycle; and the linter, which shows
 * the same sentences while one writes, really refuses what the table forbids.
 */
import fs from 'node:fs';
import path from 'node:path';
import { ESLint } from 'eslint';
import ts from 'typescript';
import eslintConfig from '@/eslint.config';
import { importRules } from '@/scripts/lib/import-rules';

const root = path.resolve(__dirname, '..', '..');
const sourceFolders = ['app', 'components', 'constants', 'hooks', 'pricing', 'server', 'shared'];
const extensions = ['.ts', '.tsx', '.js', '/index.ts', '/index.tsx', ''];

function sourceFiles(folder: string): string[] {
  return fs
    .readdirSync(path.join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.(ts|tsx)$/.test(name))
    .map((name) => path.join(folder, name));
}

function resolveImport(importer: string, specifier: string): string | null {
  const isOurs = specifier.startsWith('.') || specifier.startsWith('@/');
  if (!isOurs) return null;
  const target = specifier.startsWith('@/')
    ? specifier.slice(2)
    : path.join(path.dirname(importer), specifier);
  const found = extensions.map((extension) => target + extension).find(isFile);
  if (found === undefined) throw new Error(`${importer} imports ${specifier}, which is no file`);
  return found;
}

function isFile(file: string): boolean {
  const full = path.join(root, file);
  return fs.existsSync(full) && fs.statSync(full).isFile();
}

/** `import type` counts for the rules; for cycles only what is there at run time does. */
type Edge = { to: string; typeOnly: boolean };

function isTypeOnly(statement: ts.Statement): boolean {
  if (ts.isExportDeclaration(statement)) return statement.isTypeOnly;
  if (!ts.isImportDeclaration(statement) || !statement.importClause) return false;
  const { isTypeOnly: wholly, name, namedBindings } = statement.importClause;
  const named = namedBindings && ts.isNamedImports(namedBindings) ? namedBindings.elements : null;
  return wholly || (!name && named !== null && named.every((element) => element.isTypeOnly));
}

function importsOf(file: string): Edge[] {
  const text = fs.readFileSync(path.join(root, file), 'utf8');
  const typeOnly = new Set<string>();
  const valued = new Set<string>();
  for (const statement of ts.createSourceFile(file, text, ts.ScriptTarget.Latest).statements) {
    if (!ts.isImportDeclaration(statement) && !ts.isExportDeclaration(statement)) continue;
    const specifier = statement.moduleSpecifier;
    if (!specifier || !ts.isStringLiteral(specifier)) continue;
    (isTypeOnly(statement) ? typeOnly : valued).add(specifier.text);
  }
  // Dynamic imports and require() are not statements; the scanner finds them all.
  const specifiers = ts.preProcessFile(text, true, true).importedFiles.map((each) => each.fileName);
  return specifiers.flatMap((specifier) => {
    const to = resolveImport(file, specifier);
    if (to === null) return [];
    return [{ to, typeOnly: typeOnly.has(specifier) && !valued.has(specifier) }];
  });
}

const isBelow = (file: string, folder: string) => file === folder || file.startsWith(`${folder}/`);
const isBelowAny = (file: string, folders: readonly string[]) =>
  folders.some((folder) => isBelow(file, folder));

const graph = new Map(
  sourceFolders.flatMap(sourceFiles).map((file) => [file, importsOf(file)] as const),
);

type ImportRule = {
  importer: string[];
  banned: string[];
  except?: string[];
  unless?: string[];
  sentence: string;
};
const rules: ImportRule[] = importRules;

describe.each(rules)('$sentence', ({ importer, banned, except = [], unless = [], sentence }) => {
  test('the import graph keeps it', () => {
    const broken = [...graph]
      .filter(([file]) => isBelowAny(file, importer) && !unless.includes(file))
      .flatMap(([file, edges]) =>
        edges
          .filter(({ to }) => isBelowAny(to, banned) && !isBelowAny(to, except))
          .map(({ to }) => `${file} → ${to}`),
      );
    expect(broken).toEqual([]);
  });

  test('the table names folders that belong to the house', () => {
    const houses = [...sourceFolders, 'scripts', 'tests'];
    for (const folder of [...importer, ...banned, ...except, ...unless])
      expect(houses).toContain(folder.split('/')[0]);
    expect(sentence.endsWith('.')).toBe(true);
  });
});

test('no file imports itself by any way round', () => {
  const finished = new Set<string>();
  const cycles: string[] = [];
  function visit(file: string, trail: string[]) {
    if (trail.includes(file)) cycles.push([...trail.slice(trail.indexOf(file)), file].join(' → '));
    if (finished.has(file) || trail.includes(file)) return;
    for (const { to, typeOnly } of graph.get(file) ?? [])
      if (!typeOnly) visit(to, [...trail, file]);
    finished.add(file);
  }
  for (const file of graph.keys()) visit(file, []);
  expect(cycles).toEqual([]);
});

describe('the linter', () => {
  const eslint = new ESLint({ cwd: root, overrideConfigFile: true, baseConfig: eslintConfig });

  async function messagesFor(filePath: string, code: string): Promise<string[]> {
    const [result] = await eslint.lintText(code, { filePath: path.join(root, filePath) });
    return result.messages.map(({ message }) => message);
  }

  test.each([
    ['pricing/probe.ts', "import '@/shared/endpoint';", 'pricing imports nothing of the rest'],
    ['shared/probe.ts', "import '@/scripts/lib/paths';", 'it knows neither of them'],
    ['hooks/probe.ts', "import '@/pricing/conventions';", 'Only hooks/pricing.worker.ts'],
    ['server/services/probe.js', "import '../../pricing/conventions';", 'one door'],
    ['components/ui/probe.tsx', "import '@/shared/endpoint';", 'knows only the tokens'],
    ['app/probe.tsx', "import '@/scripts/lib/paths';", 'never by import'],
    ['server/services/probe.js', "import '@/constants/theme';", 'shares only shared and pricing'],
    ['pricing/probe.ts', 'export const e = Math.exp(1);', 'last bit'],
    ['pricing/probe.ts', 'export const { log } = Math;', 'last bit'],
    ['pricing/probe.ts', 'export const e = (x: number) => x ** 2;', 'last bit'],
    ['pricing/probe.ts', 'export const now = () => Date.now();', 'reads no clock'],
    ['shared/probe.ts', 'export enum Side { Buy }', 'union of strings'],
    ['shared/probe.ts', 'export interface Side { buy: true }', 'Use a `type`'],
    ['shared/probe.ts', 'export default 1;', 'named exports'],
    ['shared/probe.ts', 'export const side = (x: any) => x;', 'any'],
    ['shared/probe.ts', '// eslint-disable-next-line\nexport default 1;', 'named exports'],
    ['tests/shared/probe.test.ts', "test.only('one', () => {});", 'Every test runs'],
    ['tests/shared/probe.test.ts', "describe.skip('one', () => {});", 'Every test runs'],
  ])('refuses in %s: %s', async (filePath, code, sentence) => {
    const messages = await messagesFor(filePath, code);
    expect(messages.filter((message) => message.includes(sentence))).not.toEqual([]);
  });
});
