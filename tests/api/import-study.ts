/** A study to import into, with the queue played by hand, for tests of imports through their service. */
import { randomUUID } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import type { Actor } from '../../api/audit/actor.ts';
import { inTransaction } from '../../api/audit/transaction.ts';
import type { ImportMapping, ImportView } from '../../api/contracts/imports.ts';
import { setupFileSchema } from '../../api/contracts/setup.ts';
import { importOf, importView } from '../../api/features/imports/rows.ts';
import {
  applyImport,
  checkImport,
  type ImportContext,
  uploadImport,
} from '../../api/features/imports/service.ts';
import { importJobs } from '../../api/features/imports/work.ts';
import { createStudyFromSetup } from '../../api/features/setup/service.ts';
import { enrolSubject } from '../../api/features/subjects/service.ts';
import { actInStudy, type StudyAct } from '../../api/features/subjects/study-act.ts';
import { membershipOf } from '../../api/http/membership.ts';
import { createImportThreads } from '../../api/import-threads/threads.ts';
import type { JobOrder } from '../../api/jobs/jobs.ts';
import { ObjectMissing, type ObjectStore } from '../../api/storage/object-store.ts';
import type { TestDatabase } from '../support/test-database.ts';

export const BASELINE = '2026-09-01';

const setup = {
  format: 'tetherline-setup/1',
  study: { name: 'Import study', shortName: 'import', masked: true },
  sites: [
    { code: 'quay', name: 'Quay', timeZone: 'UTC' },
    { code: 'pier', name: 'Pier', timeZone: 'UTC' },
  ],
  arms: ['Kestrel drill', 'Plover drill'],
  measures: [
    {
      shortName: 'weight',
      label: 'Body weight',
      unit: 'kg',
      decimals: 1,
      nature: 'positive',
      plausibleLow: 40,
      plausibleHigh: 120,
      impossibleLow: 20,
      impossibleHigh: 300,
    },
    { shortName: 'lapses', label: 'Lapses', nature: 'count' },
    { shortName: 'age', label: 'Age', unit: 'years', nature: 'positive', per: 'subject' },
  ],
  visits: [
    { name: 'Start', targetDay: 0 },
    { name: 'Week 2', targetDay: 14, windowBefore: 4, windowAfter: 4 },
    // Overlaps Week 2 on days 16 to 18; day 17 is as far from either target, so it is the later's.
    { name: 'Week 3', targetDay: 20, windowBefore: 4, windowAfter: 3 },
  ],
};

/** Objects in memory: what S3 does is proved elsewhere. */
export class StoreInMemory implements ObjectStore {
  readonly objects = new Map<string, Buffer>();

  async put(key: string, body: Readable | Buffer): Promise<void> {
    const pieces: Buffer[] = [];
    if (Buffer.isBuffer(body)) pieces.push(body);
    else for await (const piece of body) pieces.push(Buffer.from(piece));
    this.objects.set(key, Buffer.concat(pieces));
  }
  async get(key: string): Promise<Readable> {
    const body = this.objects.get(key);
    if (!body) throw new ObjectMissing(key);
    return Readable.from([body]);
  }
  async delete(key: string): Promise<void> {
    this.objects.delete(key);
  }
  async list(prefix: string) {
    return [...this.objects]
      .filter(([key]) => key.startsWith(prefix))
      .map(([key, body]) => ({ key, size: body.length }));
  }
  async check(): Promise<void> {
    return Promise.resolve();
  }
  close(): void {
    this.objects.clear();
  }
}

export const MAPPING: ImportMapping = {
  subject: 'subject',
  value: 'weight',
  when: { kind: 'days', column: 'day' },
  replicate: null,
  site: null,
  decimal: '.',
  newSubjects: null,
};

export interface ImportStudy {
  database: TestDatabase;
  store: StoreInMemory;
  clock: { now: Date };
  context: ImportContext;
  studyUid: string;
  measure: Record<string, string>;
  act<T>(work: (act: StudyAct) => Promise<T>): Promise<T>;
  upload(text: string | Buffer, measure?: string, name?: string): Promise<ImportView>;
  check(view: ImportView, mapping?: ImportMapping): Promise<ImportView>;
  apply(view: ImportView, keep?: { explanation: string } | null): Promise<ImportView>;
  /** Upload, dry run and apply. */
  import(text: string, mapping?: ImportMapping, measure?: string): Promise<ImportView>;
  read(view: ImportView): Promise<ImportView>;
  /** Does what was ordered and not done yet. */
  work(): Promise<void>;
  close(): Promise<void>;
}

export async function makeImportStudy(database: TestDatabase): Promise<ImportStudy> {
  const databases = await database.databases();
  const db = databases.masked;
  const clock = { now: new Date('2026-12-01T12:00:00.000Z') };
  const study = await inTransaction(db, null, (tx) =>
    createStudyFromSetup(tx, clock.now, setupFileSchema.parse(setup)),
  );
  const [account] = await database.query<{ id: string; uid: string }>(
    `INSERT INTO account (email, name, password_hash, created_at, time_zone)
     VALUES ('coordinator@import.example', 'Robin coordinator', 'none', '2026-01-01', 'UTC') RETURNING id, uid`,
  );
  if (!account) throw new Error('no account was written');
  await database.query(
    `WITH m AS (INSERT INTO membership (study_id, account_id, role, created_at)
                VALUES ($1, $2, 'coordinator', '2026-01-01') RETURNING id)
     INSERT INTO membership_site (membership_id, site_id)
     SELECT m.id, s.id FROM m, site s WHERE s.study_id = $1 AND s.code = 'quay'`,
    [study.id, account.id],
  );
  const actor: Actor = {
    accountId: account.id,
    accountUid: account.uid,
    name: 'Robin coordinator',
    role: 'coordinator',
    sessionUid: null,
    requestId: null,
  };
  const membership = await membershipOf(db, account.id, study.uid);
  if (!membership) throw new Error('no membership was read');
  const act = <T>(work: (act: StudyAct) => Promise<T>) =>
    actInStudy({ db, actor, clock: () => clock.now, studyUid: study.uid, siteIds: null }, work);
  await act(async (inStudy) => {
    for (const [code, siteCode] of [
      ['Q01', 'quay'],
      ['Q02', 'quay'],
      ['P01', 'pier'],
    ] as const) {
      await enrolSubject(inStudy, {
        siteCode,
        code,
        state: 'enrolled',
        consentVersion: '1',
        consentDate: '2026-08-30',
        enrolmentDate: BASELINE,
        baselineDate: BASELINE,
      });
    }
  });

  const store = new StoreInMemory();
  const importThreads = createImportThreads(1, (error) => {
    throw error;
  });
  const orders: (JobOrder & { uid: string })[] = [];
  const deps = {
    store,
    importThreads,
    clock: () => clock.now,
    jobs: {
      changes: { watch: () => () => undefined },
      start: async (_manager: unknown, order: JobOrder) => {
        const uid = randomUUID();
        orders.push({ ...order, uid });
        return uid;
      },
    },
  };
  const work = new Map(
    importJobs({ databases, store, clock: () => clock.now, importThreads }).map((job) => [
      job.kind,
      job,
    ]),
  );
  const runOrders = async () => {
    for (const order of orders.splice(0)) {
      await work.get(order.kind)?.handler({
        jobUid: order.uid,
        subjectUid: order.subjectUid,
        studyId: order.studyId,
        accountId: order.accountId,
        progress: () => Promise.resolve(),
        cancelled: () => Promise.resolve(false),
      });
    }
  };
  const context: ImportContext = { db, deps, actor, membership };
  const measures = await database.query<{ uid: string; short_name: string }>(
    'SELECT uid, short_name FROM measure WHERE study_id = $1',
    [study.id],
  );
  const measure = Object.fromEntries(measures.map(({ uid, short_name }) => [short_name, uid]));
  const scope = { studyId: study.id, accountId: account.id };
  const read = async (view: ImportView) => importView(await importOf(db.manager, scope, view.id));

  const self: ImportStudy = {
    close: () => importThreads.close(),
    database,
    store,
    clock,
    context,
    studyUid: study.uid,
    measure,
    act,
    read,
    work: runOrders,
    async upload(text, short = 'weight', name = 'lab.csv') {
      const folder = mkdtempSync(join(tmpdir(), 'tetherline-test-'));
      try {
        const path = join(folder, 'file');
        writeFileSync(path, text);
        const size = Buffer.byteLength(text);
        return await uploadImport(context, {
          path,
          name,
          size,
          fields: { measure: measure[short] ?? '' },
        });
      } finally {
        rmSync(folder, { recursive: true });
      }
    },
    async check(view, mapping = MAPPING) {
      await checkImport(context, view.id, { mapping, version: view.version });
      await runOrders();
      return read(view);
    },
    async apply(view, keep = null) {
      await applyImport(context, view.id, {
        keepImplausible: keep !== null,
        explanation: keep?.explanation ?? null,
        version: view.version,
      });
      await runOrders();
      return read(view);
    },
    async import(text, mapping = MAPPING, short = 'weight') {
      const checked = await self.check(await self.upload(text, short), mapping);
      return checked.state === 'checked' ? self.apply(checked) : checked;
    },
  };
  return self;
}

/** Counts of everything an import may write. */
export async function heldBy(database: TestDatabase) {
  const [row] = await database.query<Record<string, number>>(
    `SELECT (SELECT count(*)::int FROM subject) AS subjects, (SELECT count(*)::int FROM visit) AS visits,
            (SELECT count(*)::int FROM reading) AS readings, (SELECT count(*)::int FROM applied_row) AS rows,
            (SELECT count(*)::int FROM import) AS imports, (SELECT count(*)::int FROM audit.entry) AS entries`,
  );
  return row ?? {};
}
