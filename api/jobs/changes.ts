/** Hears from PostgreSQL which job changed, whichever machine it runs on, and passes it to who watches it. */
import pg from 'pg';
import type { Logger } from 'pino';
import { JOB_CHANNEL } from './progress.ts';

/** After a lost connection; watchers look by themselves meanwhile. */
const AGAIN_MS = 2_000;

export class JobChanges {
  readonly #url: string;
  readonly #logger: Logger;
  readonly #watchers = new Map<string, Set<() => void>>();
  #client: pg.Client | undefined;
  #connecting: Promise<void> | undefined;
  #again: NodeJS.Timeout | undefined;
  #closed = false;

  constructor(url: string, logger: Logger) {
    this.#url = url;
    this.#logger = logger;
  }

  /** @returns a function that ends the watch */
  watch(jobUid: string, onChange: () => void): () => void {
    const ofJob = this.#watchers.get(jobUid) ?? new Set();
    ofJob.add(onChange);
    this.#watchers.set(jobUid, ofJob);
    this.#connectOnce();
    return () => {
      ofJob.delete(onChange);
      if (ofJob.size === 0) this.#watchers.delete(jobUid);
    };
  }

  async close(): Promise<void> {
    this.#closed = true;
    clearTimeout(this.#again);
    await this.#connecting;
    await this.#client?.end();
  }

  /** The connection is made for the first watcher and kept. */
  #connectOnce(): void {
    if (this.#client || this.#connecting || this.#closed) return;
    this.#connecting = this.#connect().finally(() => {
      this.#connecting = undefined;
    });
  }

  async #connect(): Promise<void> {
    const client = new pg.Client({
      connectionString: this.#url,
      application_name: 'tetherline job changes',
    });
    client.on('notification', (message) => {
      for (const onChange of this.#watchers.get(message.payload ?? '') ?? []) onChange();
    });
    client.on('error', () => this.#lost());
    client.on('end', () => this.#lost());
    try {
      await client.connect();
      await client.query(`LISTEN ${JOB_CHANNEL}`);
      this.#client = client;
    } catch (error) {
      this.#logger.warn({ code: (error as { code?: string }).code }, 'no news of jobs for now');
      this.#lost();
    }
  }

  #lost(): void {
    this.#client = undefined;
    if (this.#closed) return;
    clearTimeout(this.#again);
    this.#again = setTimeout(() => this.#connectOnce(), AGAIN_MS);
    this.#again.unref();
  }
}
