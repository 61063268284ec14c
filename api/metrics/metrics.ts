/** Figures about the process for whoever operates it: counts and times, nothing of a person or a study. */
import type { RequestHandler } from 'express';
import type pg from 'pg';
import { collectDefaultMetrics, Gauge, Histogram, Registry } from 'prom-client';
import type { PostgresDriver } from 'typeorm/driver/postgres/PostgresDriver.js';
import type { Databases } from '../../database/data-source.ts';
import { Job, type JobState } from '../../database/entities/index.ts';
import { DATABASE_ROLES } from '../../database/role-names.ts';

export interface Metrics {
  /** Counts and times each request by the pattern of its route, never by its address. */
  readonly observe: RequestHandler;
  /** Prometheus text. */
  text(): Promise<string>;
  readonly contentType: string;
}

/** Seconds: an answer from memory, an ordinary one, one that is felt, one that is waited for. */
const BUCKETS = [0.01, 0.05, 0.25, 1, 5];
const JOB_STATES: readonly JobState[] = ['waiting', 'running', 'done', 'failed', 'cancelled'];

export function createMetrics(databases: Databases): Metrics {
  const register = new Registry();
  collectDefaultMetrics({ register });
  gaugePools(register, databases);
  gaugeJobs(register, databases);
  return {
    observe: observer(register),
    text: () => register.metrics(),
    contentType: register.contentType,
  };
}

function observer(register: Registry): RequestHandler {
  const requests = new Histogram({
    name: 'http_request_seconds',
    help: 'Requests by method, pattern of the route and status, with the time until the answer was sent',
    labelNames: ['method', 'route', 'status'] as const,
    buckets: BUCKETS,
    registers: [register],
  });
  return (req, res, next) => {
    const stop = requests.startTimer({ method: req.method });
    // A caller who leaves in the middle closes without finishing; both end here, once.
    res.once('close', () => {
      // What no route of ours took is one figure: its addresses are whatever a stranger types.
      const route: unknown = req.route?.path;
      stop({ route: typeof route === 'string' ? route : 'none', status: res.statusCode });
    });
    next();
  };
}

function gaugePools(register: Registry, databases: Databases): void {
  new Gauge({
    name: 'database_connections',
    help: 'Connections of each pool by state; waiting are requests for one that is not free yet',
    labelNames: ['pool', 'state'] as const,
    registers: [register],
    collect() {
      for (const role of DATABASE_ROLES) {
        const pool: pg.Pool = (databases[role].driver as PostgresDriver).master;
        this.set({ pool: role, state: 'used' }, pool.totalCount - pool.idleCount);
        this.set({ pool: role, state: 'idle' }, pool.idleCount);
        this.set({ pool: role, state: 'waiting' }, pool.waitingCount);
      }
    },
  });
}

function gaugeJobs(register: Registry, databases: Databases): void {
  new Gauge({
    name: 'jobs',
    help: 'Pieces of long work by state, of all servers and workers together',
    labelNames: ['state'] as const,
    registers: [register],
    async collect() {
      const rows = await databases.masked
        .getRepository(Job)
        .createQueryBuilder('job')
        .select('job.state', 'state')
        .addSelect('count(*)', 'count')
        .groupBy('job.state')
        .getRawMany<{ state: JobState; count: string }>();
      const counts = new Map(rows.map(({ state, count }) => [state, Number(count)]));
      for (const state of JOB_STATES) this.set({ state }, counts.get(state) ?? 0);
    },
  });
}
