/** The API description (OpenAPI 3.1), made from the same declarations that serve the routes. */
import {
  OpenAPIRegistry,
  OpenApiGeneratorV31,
  type RouteConfig,
} from '@asteasolutions/zod-to-openapi';
import { z } from 'zod';
import { uidSchema } from '../contracts/common.ts';
import { problemSchema } from '../contracts/problem.ts';
import { apiWords } from '../words/api-description.ts';
import type { Access, RouteDefinition } from './route.ts';

export type OpenApiDocument = ReturnType<OpenApiGeneratorV31['generateDocument']>;

/** Who may, as it stands under `x-roles`. */
export function rolesOf(access: Access): readonly string[] {
  return typeof access === 'object' ? access.study : [access];
}

/** `/api/studies/:study` as `/api/studies/{study}`. */
export function templatePath(path: string): string {
  return path.replace(/:(\w+)/g, '{$1}');
}

export function describeApi(routes: readonly RouteDefinition[]): OpenApiDocument {
  const registry = new OpenAPIRegistry();
  registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: 'tether_access',
    description: apiWords.cookie,
  });
  for (const route of routes) registry.registerPath(describeRoute(route));
  return new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: { title: apiWords.title, version: '1', description: apiWords.description },
    servers: [{ url: '/' }],
  });
}

function describeRoute(route: RouteDefinition): RouteConfig {
  return {
    method: route.method,
    path: templatePath(route.path),
    summary: route.summary,
    tags: [tagOf(route.path)],
    security: route.access === 'public' ? [] : [{ session: [] }],
    'x-roles': rolesOf(route.access),
    request: {
      params: paramsOf(route.path),
      ...(route.query ? { query: asObject(route.query) } : {}),
      ...(route.idempotent ? { headers: idempotencyHeader } : {}),
      ...bodyOf(route),
    },
    responses: {
      [route.status]: {
        description: route.answer || route.produces ? apiWords.answered : apiWords.nothingAnswered,
        ...contentOf(route),
      },
      default: {
        description: apiWords.refused,
        content: { 'application/problem+json': { schema: problemSchema } },
      },
    },
  };
}

const idempotencyHeader = z.object({
  'Idempotency-Key': z
    .string()
    .regex(/^[A-Za-z0-9_-]{8,128}$/)
    .optional()
    .meta({ description: apiWords.idempotency }),
});

/** The noun that a route belongs to: what comes after the study, or after `/api`. */
function tagOf(path: string): string {
  const [, first = '', second, , third] = path.split('/');
  if (first !== 'api') return first;
  const noun = second === 'studies' && third ? third : (second ?? first);
  return noun.replace(/\..*$/, '');
}

function paramsOf(path: string): z.ZodObject | undefined {
  const names = [...path.matchAll(/:(\w+)/g)].map((match) => match[1] ?? '');
  if (names.length === 0) return undefined;
  return z.object(Object.fromEntries(names.map((name) => [name, uidSchema])));
}

function bodyOf(route: RouteDefinition): Pick<NonNullable<RouteConfig['request']>, 'body'> {
  if (route.body) return { body: { content: { 'application/json': { schema: route.body } } } };
  if (!route.form) return {};
  const file = z.object({ file: z.string().meta({ format: 'binary' }) });
  return {
    body: {
      content: { 'multipart/form-data': { schema: asObject(route.form).extend(file.shape) } },
    },
  };
}

function contentOf(route: RouteDefinition) {
  if (route.produces) return { content: { [route.produces]: { schema: z.string() } } };
  return route.answer ? { content: { 'application/json': { schema: route.answer } } } : {};
}

/** Queries and forms are objects; a refinement around one is looked through. */
function asObject(schema: z.ZodType): z.ZodObject {
  if (schema instanceof z.ZodObject) return schema;
  throw new TypeError('the query and the form of a route are objects');
}
