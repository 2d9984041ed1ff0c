/** The OpenAPI 3.1 document of the endpoints, made from the schemas that check every request. */
import { z } from 'zod';
import { apiBase, type Endpoint } from './endpoint';
import { endpoints } from './contracts';
import { errorCodes, errorRow, problemSchema, type ErrorCode } from './errors';

type JsonSchema = Record<string, unknown>;

const schemaOf = (schema: z.ZodType, io: 'input' | 'output'): JsonSchema => {
  const { $schema, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'throw' });
  return rest;
};

const objectSchema = z.object({
  properties: z.record(z.string(), z.record(z.string(), z.unknown())).default({}),
  required: z.array(z.string()).default([]),
});

function parametersOf(schema: z.ZodType, place: 'path' | 'query') {
  const { properties, required } = objectSchema.parse(schemaOf(schema, 'input'));
  return Object.entries(properties).map(([name, { description, ...property }]) => ({
    name,
    in: place,
    description,
    required: place === 'path' || required.includes(name),
    schema: property,
  }));
}

const idempotencyKey = {
  name: 'Idempotency-Key',
  in: 'header',
  description: 'A UUID of this act: the same request sent twice acts once.',
  required: true,
  schema: { type: 'string', format: 'uuid' },
};

const json = (schema: JsonSchema, example?: unknown) => ({
  'application/json': { schema, ...(example === undefined ? {} : { example }) },
});

const hasFields = (schema: z.ZodType) =>
  Object.keys(objectSchema.parse(schemaOf(schema, 'input')).properties).length > 0;

const accessSentence = ({ access, stepUp }: Endpoint) => {
  if (access === 'public') return 'Anyone may call it.';
  const confirmed = stepUp ? ' The password must have been given in the last minutes.' : '';
  if (access === 'session') return `Anyone signed in may call it.${confirmed}`;
  return `Needs the permission \`${access}\` on the desk.${confirmed}`;
};

function operationOf(name: string, endpoint: Endpoint) {
  const { summary, params, query, body, bodyExample, response, successStatus } = endpoint;
  return {
    operationId: name,
    summary,
    description: accessSentence(endpoint),
    tags: [endpoint.path.replace('/desks/:deskId', '').split('/')[1]],
    security: endpoint.access === 'public' ? [] : [{ accessToken: [] }],
    parameters: [
      ...parametersOf(params, 'path'),
      ...parametersOf(query, 'query'),
      ...(endpoint.idempotent ? [idempotencyKey] : []),
    ],
    ...(hasFields(body)
      ? { requestBody: { required: true, content: json(schemaOf(body, 'input'), bodyExample) } }
      : {}),
    responses: {
      [successStatus]: { description: 'Done', content: json(schemaOf(response, 'output')) },
      default: { $ref: '#/components/responses/problem' },
    },
  };
}

const errorLine = (code: ErrorCode) =>
  `- \`${code}\` (${errorRow(code).status}): ${errorRow(code).sentence}`;

const openApiPathOf = ({ path }: Endpoint) => `${apiBase}${path.replace(/:(\w+)/g, '{$1}')}`;

export function openApiDocument() {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const [name, endpoint] of Object.entries(endpoints)) {
    const item = (paths[openApiPathOf(endpoint)] ??= {});
    item[endpoint.method.toLowerCase()] = operationOf(name, endpoint);
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Driftless',
      version: '1',
      description: `Every failure is a problem document (RFC 9457) with one of these codes:\n${errorCodes.map(errorLine).join('\n')}`,
    },
    servers: [{ url: '/' }],
    paths,
    components: {
      securitySchemes: {
        accessToken: { type: 'http', scheme: 'bearer', bearerFormat: 'JWT' },
      },
      schemas: { Problem: schemaOf(problemSchema, 'output') },
      responses: {
        problem: {
          description: 'A problem document',
          content: {
            'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } },
          },
        },
      },
    },
  };
}
