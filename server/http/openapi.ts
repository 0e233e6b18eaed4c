import { z } from 'zod';
import { problem } from '../../shared/contracts/problem';
import type { MountedRoute } from './ladders';

type JsonObject = Readonly<Record<string, unknown>>;

/** OpenAPI 3.1 speaks JSON Schema 2020-12, which zod writes itself. What cannot be said there is left open. */
function schemaOf(schema: z.ZodType): JsonObject {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, {
    io: 'input',
    unrepresentable: 'any',
  });
  return rest;
}

function parametersOf(schema: z.ZodType | undefined, where: 'path' | 'query'): JsonObject[] {
  if (schema === undefined) return [];
  const { properties = {}, required = [] } = schemaOf(schema) as {
    properties?: Record<string, JsonObject>;
    required?: readonly string[];
  };
  return Object.entries(properties).map(([name, property]) => ({
    name,
    in: where,
    required: where === 'path' || required.includes(name),
    schema: property,
  }));
}

function securityOf({ right, reach, path }: MountedRoute): JsonObject {
  if (right !== undefined) return { security: [{ clinic: [] }], 'x-right': right };
  if (reach !== undefined) return { security: [{ family: [] }], 'x-reach': reach };
  return { security: [], 'x-side': path.startsWith('/api/family') ? 'family' : 'clinic' };
}

function operationOf(route: MountedRoute): JsonObject {
  const { shape } = route;
  const parameters = [
    ...parametersOf(shape?.params, 'path'),
    ...parametersOf(shape?.query, 'query'),
  ];
  return {
    ...(parameters.length > 0 ? { parameters } : {}),
    ...(shape?.body
      ? {
          requestBody: {
            required: true,
            content: { 'application/json': { schema: schemaOf(shape.body) } },
          },
        }
      : {}),
    ...securityOf(route),
    responses: {
      '2XX': { description: 'Done.' },
      default: {
        description: 'A problem document; its code is stable.',
        content: {
          'application/problem+json': { schema: { $ref: '#/components/schemas/problem' } },
        },
      },
    },
  };
}

/** The interface as the server checks it: made from the mounted routes and their schemas, never by hand. */
export function describeApi(routes: readonly MountedRoute[]): JsonObject {
  const paths: Record<string, Record<string, JsonObject>> = {};
  for (const route of routes) {
    const path = route.path.replace(/:([A-Za-z]+)/g, '{$1}');
    paths[path] = { ...paths[path], [route.method]: operationOf(route) };
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Threedawn', version: '0.1.0' },
    paths,
    components: {
      schemas: { problem: schemaOf(problem) },
      securitySchemes: {
        clinic: { type: 'apiKey', in: 'cookie', name: 'threedawn_clinic' },
        family: { type: 'apiKey', in: 'cookie', name: 'threedawn_family' },
      },
    },
  };
}
