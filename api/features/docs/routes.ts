/** The API description, for programs and for people. */
import { describeApi, type OpenApiDocument } from '../../http/openapi.ts';
import { defineFileRoute, type RouteDefinition } from '../../http/route.ts';
import { docsPage, type Paths } from './page.ts';

/** @param all asked for at the first request only: the description holds these two routes as well */
export function docsRoutes(all: () => readonly RouteDefinition[]): RouteDefinition[] {
  let described: OpenApiDocument | undefined;
  const description = (): OpenApiDocument => {
    described ??= describeApi(all());
    return described;
  };
  return [
    defineFileRoute({
      method: 'get',
      path: '/api/openapi.json',
      summary: 'This description as an OpenAPI 3.1 document',
      access: 'public',
      produces: 'application/json',
      handler: async ({ res }) => {
        res.type('application/json').send(JSON.stringify(description()));
      },
    }),
    defineFileRoute({
      method: 'get',
      path: '/api/docs',
      summary: 'This description as a page',
      access: 'public',
      produces: 'text/html',
      handler: async ({ res }) => {
        res.type('text/html').send(docsPage(description().paths as Paths));
      },
    }),
  ];
}
