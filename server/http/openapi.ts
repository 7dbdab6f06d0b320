/** OpenAPI 3.1 from the route tables and their zod contracts (JSON Schema 2020-12 is OpenAPI 3.1's own). */
import { z } from 'zod';
import { problem } from '../../shared/contracts/common.ts';
import { errorCodes } from '../../shared/contracts/errors.ts';
import type { AnyRoute } from './route.ts';

type Json = Record<string, unknown>;

const schemaOf = (schema: z.ZodType, io: 'input' | 'output'): Json => {
  const { $schema: _, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any' }) as Json;
  return rest;
};

function parametersOf(schema: z.ZodType | undefined, where: 'path' | 'query'): Json[] {
  if (!schema) return [];
  const { properties = {}, required = [] } = schemaOf(schema, 'input') as {
    properties?: Record<string, Json>;
    required?: string[];
  };
  return Object.entries(properties).map(([name, property]) => ({
    name,
    in: where,
    required: where === 'path' || required.includes(name),
    schema: property,
  }));
}

/** Bytes have no schema in OpenAPI 3.1: the media type says it all. */
const contentOf = (mediaTypes: readonly string[]): Json =>
  Object.fromEntries(mediaTypes.map((mediaType) => [mediaType, {}]));

function operationOf(spec: AnyRoute): Json {
  const slice = spec.path.split('/')[2] ?? 'api';
  const success = String(spec.answer || spec.sends ? (spec.status ?? 200) : 204);
  return {
    operationId: `${spec.verb}${spec.path.replace(/^\/api/, '').replace(/[^A-Za-z0-9]+(.)?/g, (_, next: string | undefined) => next?.toUpperCase() ?? '')}`,
    summary: spec.does,
    tags: [slice],
    security: spec.access === 'session' ? [{ session: [] }] : [],
    parameters: [...parametersOf(spec.params, 'path'), ...parametersOf(spec.query, 'query')],
    ...(spec.body && {
      requestBody: {
        required: true,
        content: { 'application/json': { schema: schemaOf(spec.body, 'input') } },
      },
    }),
    ...(spec.bytes && { requestBody: { required: true, content: contentOf(spec.bytes.mediaTypes) } }),
    responses: {
      [success]: {
        description: spec.answer || spec.sends ? 'Done.' : 'Done; no body.',
        ...(spec.sends && { content: contentOf(spec.sends) }),
        ...(spec.answer && { content: { 'application/json': { schema: schemaOf(spec.answer, 'output') } } }),
      },
      default: {
        description: 'Refused; the code says why.',
        content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
      },
    },
  };
}

export function describeApi(routes: readonly AnyRoute[]): Json {
  const paths: Record<string, Json> = {};
  for (const spec of routes) {
    const path = spec.path.replace(/:([A-Za-z]+)/g, '{$1}');
    paths[path] = { ...paths[path], [spec.verb]: operationOf(spec) };
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Saltmark',
      version: '1',
      description:
        'Keeps conductivity probes trustworthy across many sites. Every number field names its unit; times are RFC 3339 UTC.',
    },
    servers: [{ url: '/' }],
    paths,
    components: {
      schemas: {
        Problem: {
          ...schemaOf(problem, 'output'),
          description: `RFC 9457 problem details. Codes: ${Object.keys(errorCodes).join(', ')}.`,
        },
      },
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'saltmark.sid' } },
    },
  };
}
