/** Rules over all endpoints and schemas, whichever there are. */
import { removeFolder } from './support/environment';
import { z } from 'zod';
import { routes } from '@/server/routes';
import { endpoints } from '@/shared/contracts';
import type { Endpoint } from '@/shared/endpoint';
import { errorCodes, errorRow } from '@/shared/errors';
import { openApiDocument } from '@/shared/openapi';

afterAll(removeFolder);

type Node = Record<string, unknown>;

const all: [string, Endpoint][] = Object.entries(endpoints);

const isNode = (value: unknown): value is Node =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** Every property and item below a JSON schema, with the path that leads there. */
function* fieldsOf(schema: Node, path: string): Generator<[string, Node]> {
  for (const [name, field] of Object.entries(isNode(schema.properties) ? schema.properties : {}))
    if (isNode(field)) {
      yield [`${path}.${name}`, field];
      yield* fieldsOf(field, `${path}.${name}`);
    }
  for (const [name, field] of Object.entries({
    '[]': schema.items,
    '{}': schema.additionalProperties,
  }))
    if (isNode(field)) yield* fieldsOf(field, `${path}${name}`);
  for (const group of [schema.anyOf, schema.oneOf, schema.allOf])
    if (Array.isArray(group)) for (const each of group) yield* fieldsOf(each, path);
}

const schemasOf = ([name, { params, query, body, response }]: [string, Endpoint]) =>
  Object.entries({ params, query, body, response }).map(([part, schema]) => {
    const io = part === 'response' ? 'output' : 'input';
    return [`${name}.${part}`, z.toJSONSchema(schema, { io }) as Node] as const;
  });

const fields = all.flatMap(schemasOf).flatMap(([path, schema]) => [...fieldsOf(schema, path)]);

/** A nullable number is a union whose branch carries unit and description. */
const branches = (field: Node): Node[] =>
  Array.isArray(field.anyOf) ? field.anyOf.flatMap(branches) : [field];

const isNumber = ({ type }: Node) => type === 'number' || type === 'integer';
const textOf = (field: Node, key: 'unit' | 'description') =>
  [field, ...branches(field)].map((each) => each[key]).find((text) => typeof text === 'string');

test('every field says what it is', () => {
  const silent = fields.filter(
    ([, field]) => !textOf(field, 'description') && field.const === undefined,
  );
  expect(silent.map(([path]) => path)).toEqual([]);
});

test('every number says its unit', () => {
  const numbers = fields.filter(([, field]) => branches(field).some(isNumber));
  expect(numbers.length).toBeGreaterThan(20);
  const silent = numbers.filter(([, field]) => !textOf(field, 'unit'));
  expect(silent.map(([path]) => path)).toEqual([]);
});

test('every endpoint has exactly one handler, and every handler an endpoint', () => {
  const handled = routes.map(({ endpoint }) => `${endpoint.method} ${endpoint.path}`).sort();
  const listed = all.map(([, { method, path }]) => `${method} ${path}`).sort();
  expect(handled).toEqual(listed);
  expect(new Set(handled).size).toBe(handled.length);
  for (const { endpoint } of routes) expect(all.some(([, each]) => each === endpoint)).toBe(true);
});

test.each(all)(
  '%s: its schema takes the example, and its access fits its path',
  (_name, endpoint) => {
    const { body, bodyExample, access, path, idempotent, method, stepUp, summary } = endpoint;
    expect(body.safeParse(bodyExample).error).toBeUndefined();
    expect(path.startsWith('/desks/:deskId/')).toBe(access !== 'public' && access !== 'session');
    if (idempotent) expect(method).toBe('POST');
    if (stepUp) expect(access).not.toBe('public');
    expect(summary).toMatch(/^[A-Z].*[^.]$/);
  },
);

test.each(errorCodes)('the error %s has a status and a sentence', (code) => {
  const { status, sentence } = errorRow(code);
  expect(status).toBeGreaterThanOrEqual(400);
  expect(sentence).toMatch(/^[A-Z].*\.$/);
});

describe('the OpenAPI document', () => {
  const document = openApiDocument();
  const operations = Object.entries(document.paths).flatMap(([path, item]) =>
    Object.entries(item).map(([method, operation]) => ({
      path,
      method,
      operation: operation as { operationId: string; parameters: { name: string; in: string }[] },
    })),
  );

  test('lists every endpoint under its name', () => {
    const listed = operations.map(({ operation }) => operation.operationId).sort();
    expect(listed).toEqual(Object.keys(endpoints).sort());
  });

  test('is plain JSON, and each reference leads somewhere', () => {
    const text = JSON.stringify(document);
    expect(JSON.parse(text)).toEqual(document);
    const references = [...text.matchAll(/"\$ref":"#\/([^"]+)"/g)].map(([, place]) => place);
    expect(references.length).toBeGreaterThan(0);
    for (const place of references) {
      const found = place
        .split('/')
        .reduce<unknown>((node, key) => (isNode(node) ? node[key] : undefined), document);
      expect(found).toBeDefined();
    }
  });

  test.each(operations)('$method $path names each part of its path once', ({ path, operation }) => {
    const inPath = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name).sort();
    const given = operation.parameters.filter((each) => each.in === 'path');
    expect(given.map(({ name }) => name).sort()).toEqual(inPath);
  });
});
