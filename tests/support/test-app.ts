import { cpSync, mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Express } from 'express';
import { pino } from 'pino';
import request from 'supertest';
import type TestAgent from 'supertest/lib/agent.js';
import { inject } from 'vitest';
import { createApp } from '../../api/app.ts';
import { openServices } from '../../api/cli/services.ts';
import { loadConfig } from '../../api/config.ts';
import type { AppDeps } from '../../api/http/deps.ts';
import { type SunkLetter, startSink } from '../../api/mail/sink.ts';
import { deriveSecrets } from '../../api/secrets.ts';
import { freePort } from '../../database/server/cluster.ts';
import { TEST_MASTER_SECRET } from './test-cluster.ts';
import { createTestDatabase, type TestDatabase } from './test-database.ts';

/** A clock that stands still until a test moves it. */
export interface TestClock {
  now: Date;
  advance(milliseconds: number): void;
}

export interface TestApp {
  app: Express;
  /** Where it listens, with `listen: true`; else only the origin that requests must name. */
  address: string;
  deps: AppDeps;
  database: TestDatabase;
  clock: TestClock;
  /** Letters sent so far, newest first. */
  letters(): Promise<SunkLetter[]>;
  /** A visitor without cookies whose requests come from our own pages. */
  visitor(): TestAgent;
  /** A visitor who has signed in; fails where that is refused. */
  signedIn(email: string, password: string): Promise<TestAgent>;
  close(): Promise<void>;
}

export interface TestAppOptions {
  /** Where the clock stands; 1 December 2026, noon UTC, when not said. */
  now?: Date;
  /** Takes long work from the queue in this process too. */
  work?: boolean;
  /** Listens on a free port of loopback, for a browser. */
  listen?: boolean;
  /** The clock runs: pages compare it with the browser's own. */
  realClock?: boolean;
  webRoot?: string;
  /** With the demo's people and studies; only in tests/browser. */
  demo?: boolean;
  /** More of the environment, as a person would set it. */
  env?: Record<string, string>;
}

/** The whole application over a database of its own, put together by the same hand as the server. */
export async function startTestApp(options: TestAppOptions = {}): Promise<TestApp> {
  const closers: (() => Promise<void> | void)[] = [];
  const close = async () => {
    for (const closeOne of closers.splice(0).reverse()) await closeOne();
  };
  try {
    const demo = options.demo ? inject('demo') : undefined;
    const database = await createTestDatabase(demo?.template);
    closers.push(database.drop);
    const dataFolder = mkdtempSync(join(tmpdir(), 'tetherline-app-'));
    closers.push(() => rmSync(dataFolder, { recursive: true, force: true }));
    if (demo) cpSync(demo.folder, dataFolder, { recursive: true });
    const clock = testClock(options.now ?? new Date('2026-12-01T12:00:00Z'));
    const now = options.realClock ? () => new Date() : () => clock.now;
    const sink = await startSink(join(dataFolder, 'letters'), now);
    closers.push(sink.close);
    const port = await freePort();
    const config = loadConfig({ DEMO: 'off', PORT: String(port), ...options.env });
    const services = await openServices(
      {
        config,
        secrets: deriveSecrets(TEST_MASTER_SECRET, 'test'),
        dataFolder,
        urls: database.urls,
      },
      { logger: pino({ level: 'silent' }), clock: now, smtpUrl: sink.smtpUrl, poolSize: 5 },
    );
    closers.push(services.close);
    const app = createApp({ ...services.deps, webRoot: options.webRoot });
    if (options.listen) closers.push(await listen(app, port));
    if (options.work) await services.work();
    const visitor = () => request.agent(app).set('Origin', config.publicUrl);
    return {
      app,
      address: config.publicUrl,
      deps: services.deps,
      database,
      clock,
      letters: sink.letters,
      visitor,
      signedIn: async (email, password) => {
        const agent = visitor();
        await agent.post('/api/sign-in').send({ email, password }).expect(200);
        return agent;
      },
      close,
    };
  } catch (error) {
    await close();
    throw error;
  }
}

function testClock(now: Date): TestClock {
  return {
    now,
    advance(milliseconds) {
      this.now = new Date(this.now.getTime() + milliseconds);
    },
  };
}

async function listen(app: Express, port: number): Promise<() => Promise<void>> {
  const server = createServer(app);
  await new Promise<void>((ready, refuse) => {
    server.once('error', refuse);
    server.listen(port, '127.0.0.1', ready);
  });
  return () =>
    new Promise((closed) => {
      server.close(() => closed());
      server.closeAllConnections();
    });
}
