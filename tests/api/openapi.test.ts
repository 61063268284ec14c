import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { problemTable } from '../../api/http/problems.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.close());

type Operation = {
  summary: string;
  'x-roles': string[];
  security: unknown[];
  parameters?: { name: string; in: string }[];
  responses: Record<string, unknown>;
};

async function operations(): Promise<[string, Operation][]> {
  const { body } = await app.visitor().get('/api/openapi.json').expect(200);
  expect(body.openapi).toBe('3.1.0');
  return Object.entries(body.paths as Record<string, Record<string, Operation>>).flatMap(
    ([path, methods]) =>
      Object.entries(methods).map(([method, operation]): [string, Operation] => [
        `${method.toUpperCase()} ${path}`,
        operation,
      ]),
  );
}

describe('the API description', () => {
  it('says for every route what it does, who may, and how it refuses', async () => {
    const all = await operations();
    expect(all.length).toBeGreaterThan(20);
    for (const [route, operation] of all) {
      expect([route, operation.summary.length > 5]).toEqual([route, true]);
      expect([route, operation['x-roles'].length > 0]).toEqual([route, true]);
      expect(operation.responses).toHaveProperty('default');
      const named = [...route.matchAll(/\{(\w+)\}/g)].map((match) => match[1]);
      const described = (operation.parameters ?? []).filter((one) => one.in === 'path');
      expect([route, described.map((one) => one.name).sort()]).toEqual([route, named.sort()]);
    }
  });

  it('opens only the short list to those who are not signed in', async () => {
    const open = (await operations()).filter(([, operation]) =>
      operation['x-roles'].includes('public'),
    );
    expect(open.map(([route]) => route).sort()).toEqual([
      'GET /api/docs',
      'GET /api/openapi.json',
      'GET /healthz',
      'GET /metrics',
      'GET /readyz',
      'POST /api/refresh',
      'POST /api/sign-in',
    ]);
  });

  it('gives no administrator a route of a study, and no member one of the administrator', async () => {
    for (const [route, operation] of await operations()) {
      const roles = operation['x-roles'];
      if (route.includes('/api/studies')) expect(roles).not.toContain('administrator');
      if (roles.includes('administrator')) expect(roles).toEqual(['administrator']);
    }
  });

  it('can be read as a page without a script, with every code of a refusal', async () => {
    const page = await app.visitor().get('/api/docs').expect(200);
    expect(page.headers['content-type']).toContain('text/html');
    expect(page.text).not.toContain('<script');
    expect(page.text).toContain('/api/studies/{study}/members');
    for (const code of Object.keys(problemTable)) {
      expect(page.text).toContain(`id="problem-${code}"`);
    }
  });
});

describe('every problem', () => {
  it('has a status of refusal, a title, and a sentence', () => {
    for (const [code, { status, title, detail }] of Object.entries(problemTable)) {
      expect([code, status >= 400 && status < 600]).toEqual([code, true]);
      expect([code, title.length > 0 && !/[.!]$/.test(title)]).toEqual([code, true]);
      expect([code, /[.:}]$/.test(detail)]).toEqual([code, true]);
    }
  });
});
