import { z } from 'zod';
import type { Endpoint } from '../../shared/contracts/endpoint.ts';
import { problem } from '../../shared/contracts/common.ts';

/** An OpenAPI 3.1 document made from the endpoints' contracts. */
export function openApiDocument(endpoints: readonly Endpoint[]): Record<string, unknown> {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const endpoint of endpoints) {
    const path = endpoint.path.replace(/:([a-zA-Z]+)/g, '{$1}');
    paths[path] = { ...paths[path], [endpoint.method]: operation(endpoint) };
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Limestead', version: '1' },
    paths,
    components: {
      schemas: { Problem: schemaOf(problem, 'output') },
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'limestead.sid' } },
    },
  };
}

function operation(endpoint: Endpoint): Record<string, unknown> {
  return {
    summary: endpoint.summary,
    'x-access': endpoint.access,
    ...(endpoint.access === 'public' ? {} : { security: [{ session: [] }] }),
    parameters: [
      ...parameters('path', endpoint.params),
      ...parameters('query', endpoint.query),
      ...(endpoint.creates ? [header('Idempotency-Key', false)] : []),
      ...(endpoint.edits ? [header('If-Match', true)] : []),
    ],
    ...(endpoint.body
      ? {
          requestBody: {
            required: true,
            content: { [contentType(endpoint)]: { schema: bodySchema(endpoint.body, endpoint) } },
          },
        }
      : {}),
    responses: {
      [endpoint.creates ? '201' : '200']: {
        description: 'Done',
        content: answerContent(endpoint),
      },
      default: {
        description: 'What went wrong and what to do',
        content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
      },
    },
  };
}

function answerContent({ answer, response }: Endpoint): Record<string, unknown> {
  if (answer === 'file') return { '*/*': { schema: { type: 'string', format: 'binary' } } };
  return response ? { 'application/json': { schema: schemaOf(response, 'output') } } : {};
}

/** Uploads carry their file as one more field of the form. */
function bodySchema(body: z.ZodType, { upload }: Endpoint): Record<string, unknown> {
  const schema = schemaOf(body, 'input');
  if (!upload) return schema;
  const file = { type: 'string', format: 'binary' };
  return { ...schema, properties: { ...(schema.properties as object), [upload.field]: file } };
}

function contentType(endpoint: Endpoint): string {
  return endpoint.upload ? 'multipart/form-data' : 'application/json';
}

function parameters(place: 'path' | 'query', schema: z.ZodObject | undefined) {
  return Object.entries(schema?.shape ?? {}).map(([name, field]) => ({
    name,
    in: place,
    required: place === 'path' || !(field as z.ZodType).isOptional(),
    schema: schemaOf(field as z.ZodType, 'input'),
  }));
}

function header(name: string, required: boolean) {
  return { name, in: 'header', required, schema: { type: 'string' } };
}

/** OpenAPI 3.1 names the dialect once for the whole document. */
function schemaOf(schema: z.ZodType, io: 'input' | 'output'): Record<string, unknown> {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any' });
  return rest;
}
