import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gunzipSync } from 'node:zlib';
import express from 'express';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { compressed } from '../../api/http/compressed.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';

const SCRIPT = 'console.log("the same again");\n'.repeat(500);

describe('built pages', () => {
  let running: TestApp;
  let webRoot: string;
  beforeAll(async () => {
    webRoot = mkdtempSync(join(tmpdir(), 'tetherline-pages-'));
    mkdirSync(join(webRoot, 'assets'));
    writeFileSync(join(webRoot, 'assets/index-4f2a.js'), SCRIPT);
    writeFileSync(join(webRoot, 'index.html'), '<!doctype html><title>Tetherline</title>');
    running = await startTestApp({ webRoot });
  });
  afterAll(async () => {
    await running.close();
    rmSync(webRoot, { recursive: true, force: true });
  });

  it.each(['br', 'gzip'])('are sent in fewer bytes to a browser that reads %s', async (coding) => {
    const answer = await running
      .visitor()
      .get('/assets/index-4f2a.js')
      .set('Accept-Encoding', coding)
      .expect(200);
    expect(answer.headers['content-encoding']).toBe(coding);
    expect(answer.headers.vary).toMatch(/accept-encoding/i);
  });

  it('are kept for a year where the name holds a hash, and asked for anew where it does not', async () => {
    const part = await running.visitor().get('/assets/index-4f2a.js').expect(200);
    expect(part.headers['cache-control']).toBe('public, max-age=31536000, immutable');
    for (const path of ['/', '/sign-in', '/index.html']) {
      const page = await running.visitor().get(path).set('Accept', 'text/html').expect(200);
      expect([path, page.headers['cache-control']]).toEqual([path, 'no-cache']);
    }
  });

  it('do not make the API’s own answers storable', async () => {
    const answer = await running
      .visitor()
      .get('/api/openapi.json')
      .set('Accept-Encoding', 'gzip')
      .expect(200);
    expect(answer.headers['content-encoding']).toBe('gzip');
    expect(answer.headers['cache-control']).toBe('no-store');
  });
});

describe('what is compressed', () => {
  const long = JSON.stringify({ text: 'again and '.repeat(400) });

  function answering(type: string) {
    const app = express().use(compressed());
    app.get('/', (_req, res) => {
      res.set('Content-Type', type).end(long);
    });
    return request(app)
      .get('/')
      .set('Accept-Encoding', 'gzip')
      .buffer(true)
      .parse((res, done) => {
        const parts: Buffer[] = [];
        res.on('data', (part: Buffer) => parts.push(part));
        res.on('end', () => done(null, Buffer.concat(parts)));
      });
  }

  it.each(['application/json; charset=utf-8', 'application/problem+json', 'text/html'])(
    'is %s, which unpacks to the same',
    async (type) => {
      const { headers, body } = await answering(type);
      expect(headers['content-encoding']).toBe('gzip');
      // supertest unpacks by itself; what a proxy hands on may still be packed.
      const bytes: Buffer = body;
      const text = bytes[0] === 0x1f ? gunzipSync(bytes) : bytes;
      expect(text.toString()).toBe(long);
    },
  );

  it.each(['text/event-stream', 'text/csv; charset=utf-8', 'application/octet-stream'])(
    'is not %s, which goes out as it comes',
    async (type) => {
      const { headers, body } = await answering(type);
      expect(headers['content-encoding']).toBeUndefined();
      expect((body as Buffer).toString()).toBe(long);
    },
  );
});
