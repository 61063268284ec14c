import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mayReadMetrics } from '../../api/features/metrics/policy.ts';
import { startTestApp, type TestApp } from '../support/test-app.ts';

const TOKEN = 'a-token-for-the-collector';

type Asked = Parameters<typeof mayReadMetrics>[1];

function asked(remoteAddress: string, headers: Record<string, string> = {}): Asked {
  return { headers, socket: { remoteAddress } } as unknown as Asked;
}

describe('figures about the process', () => {
  let running: TestApp;
  beforeAll(async () => {
    running = await startTestApp({ work: true, env: { METRICS_TOKEN: TOKEN } });
  });
  afterAll(() => running.close());

  it('count requests by pattern and status, and show memory, event loop, pools and jobs', async () => {
    const visitor = running.visitor();
    await visitor.get('/healthz').expect(200);
    await visitor.get('/api/me?email=somebody@example.org').expect(401);
    await visitor.get('/api/jobs/0193c0de-0000-7000-8000-000000000001').expect(401);
    await running.database.query(
      "INSERT INTO job (kind, state, created_at) VALUES ('import', 'failed', now())",
    );
    const { text, headers } = await visitor.get('/metrics').expect(200);
    expect(headers['content-type']).toMatch(/^text\/plain/);
    expect(headers['cache-control']).toBe('no-store');
    for (const line of [
      /^process_resident_memory_bytes \d+$/m,
      /^nodejs_eventloop_lag_p99_seconds /m,
      /^http_request_seconds_count\{method="GET",route="\/healthz",status="200"\} 1$/m,
      /^http_request_seconds_count\{method="GET",route="none",status="401"\} 2$/m,
      /^database_connections\{pool="masked",state="idle"\} \d+$/m,
      /^database_connections\{pool="open",state="waiting"\} 0$/m,
      /^jobs\{state="failed"\} 1$/m,
      /^jobs\{state="done"\} 0$/m,
    ]) {
      expect(text).toMatch(line);
    }
  });

  it('hold no address, account or id of anybody', async () => {
    const { text } = await running.visitor().get('/metrics').expect(200);
    expect(text).not.toMatch(/somebody|0193c0de|127\.0\.0\.1/);
  });

  it('are refused to a wrong token, also on this machine, in words that name the right one', async () => {
    const refused = await running
      .visitor()
      .get('/metrics')
      .set('Authorization', 'Bearer guessed')
      .expect(401);
    expect(refused.body.code).toBe('metrics_token_needed');
    expect(refused.body.detail).toContain('METRICS_TOKEN');
    await running.visitor().get('/metrics').set('Authorization', `Bearer ${TOKEN}`).expect(200);
  });
});

describe('who may read the figures', () => {
  const local = { publicUrl: 'http://127.0.0.1:5170', metricsToken: undefined };
  const served = { publicUrl: 'https://tetherline.example.org', metricsToken: TOKEN };

  it('is this machine where nobody else is served', () => {
    expect(mayReadMetrics(local, asked('127.0.0.1'))).toBe(true);
    expect(mayReadMetrics(local, asked('::ffff:127.0.0.1'))).toBe(true);
    expect(mayReadMetrics(local, asked('192.0.2.7'))).toBe(false);
  });

  it('is nobody who comes through a proxy on this machine without the token', () => {
    expect(mayReadMetrics(served, asked('127.0.0.1'))).toBe(false);
    expect(mayReadMetrics(local, asked('127.0.0.1', { 'x-forwarded-for': '192.0.2.7' }))).toBe(
      false,
    );
  });

  it('is whoever holds the token, from anywhere', () => {
    const bearer = (token: string) => ({ authorization: `Bearer ${token}` });
    expect(mayReadMetrics(served, asked('192.0.2.7', bearer(TOKEN)))).toBe(true);
    expect(mayReadMetrics(served, asked('192.0.2.7', bearer(`${TOKEN}x`)))).toBe(false);
    expect(
      mayReadMetrics({ ...served, metricsToken: undefined }, asked('192.0.2.7', bearer(TOKEN))),
    ).toBe(false);
  });
});
