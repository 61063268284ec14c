/** Acts on an import: refused, cancelled, held off by a lock; and a large file through all of them. */
import { setTimeout as wait } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { applyImport, cancelImport, uploadImport } from '../../api/features/imports/service.ts';
import { createTestDatabase, type TestDatabase } from '../support/test-database.ts';
import { heldBy, type ImportStudy, MAPPING, makeImportStudy } from './import-study.ts';

let database: TestDatabase;
let study: ImportStudy;

beforeAll(async () => {
  database = await createTestDatabase();
  study = await makeImportStudy(database);
});
afterAll(async () => {
  await study.close();
  await database.drop();
});

const held = () => heldBy(database);

describe('acts', () => {
  it('refuse a stale version, an import that has ended and columns the file has not', async () => {
    const view = await study.upload('subject,day,weight\nQ01,80,70\n');
    await expect(study.check({ ...view, version: 99 })).rejects.toMatchObject({
      code: 'stale_version',
    });
    await expect(study.check(view, { ...MAPPING, subject: 'code' })).rejects.toMatchObject({
      code: 'import_column_unknown',
    });
    await expect(study.check(view, { ...MAPPING, value: 'day' })).rejects.toMatchObject({
      code: 'import_column_twice',
    });
    await expect(study.check(view, { ...MAPPING, when: null })).rejects.toMatchObject({
      code: 'import_when_missing',
    });
    await expect(study.apply(view)).rejects.toMatchObject({ code: 'import_not_checked' });
    const cancelled = await cancelImport(study.context, view.id);
    expect(cancelled.state).toBe('cancelled');
    await expect(study.check(cancelled)).rejects.toMatchObject({ code: 'import_ended' });
  });

  it('take the file away and leave every record as it was when cancelled', async () => {
    const before = await held();
    const objects = study.store.objects.size;
    const view = await study.check(await study.upload('subject,day,weight\nQ01,81,70\n'));
    await cancelImport(study.context, view.id);
    const after = await held();
    expect(study.store.objects.size).toBe(objects);
    expect({ ...after, imports: 0, entries: 0 }).toEqual({ ...before, imports: 0, entries: 0 });
  });

  it('write nothing when the study changed since the dry run', async () => {
    const view = await study.check(await study.upload('subject,day,weight\nQ01,82,70\n'));
    await study.import('subject,day,weight\nQ01,82,70.5\n');
    const before = await held();
    const refused = await study.apply(view);
    expect(refused.problem?.code).toBe('import_changed');
    expect(refused.state).toBe('uploaded');
    expect(await held()).toEqual(before);
  });

  it('refuse a column of arm names of a masked study before anything is stored', async () => {
    const before = await held();
    const objects = study.store.objects.size;
    for (const rows of [
      'Q01,90,70,kestrel drill\nQ02,90,70, Plover drill\n',
      // Gaps, however they are written, hide nothing.
      'Q01,90,70,NA\nQ02,90,70,Plover drill\nQ02,91,70,.\nQ02,92,70,\n',
    ]) {
      await expect(study.upload(`subject,day,weight,grp\n${rows}`)).rejects.toMatchObject({
        code: 'file_arm_names',
        params: { name: 'grp' },
      });
    }
    await expect(
      study.upload('subject,day,weight,Kestrel drill\nQ01,90,70,1\nQ02,90,70,0\n'),
    ).rejects.toMatchObject({ code: 'file_arm_names', params: { name: 'Kestrel drill' } });
    expect(await held()).toEqual(before);
    expect(study.store.objects.size).toBe(objects);
  });

  it('refuse a file named for an arm, since its name stands beside each of its readings', async () => {
    const before = await held();
    const text = 'subject,day,weight\nQ01,90,70\n';
    for (const name of ['weights_PLOVER-drill.csv', 'Kestrel drill.csv']) {
      await expect(study.upload(text, 'weight', name)).rejects.toMatchObject({
        code: 'import_file_named_for_arm',
      });
    }
    expect(await held()).toEqual(before);
    // Half of a name, or letters inside another word, are no arm.
    const view = await study.upload(text, 'weight', 'drill week, kestreldrills.csv');
    expect(view.state).toBe('uploaded');
  });
});

describe('a study that is locked', () => {
  const lock = (state: 'locked' | 'open') =>
    database.query('UPDATE study SET state = $2 WHERE uid = $1', [study.studyUid, state]);

  it('takes nothing that a dry run before the lock found new', async () => {
    const view = await study.check(await study.upload('subject,day,weight\nQ01,83,70\n'));
    await applyImport(study.context, view.id, {
      keepImplausible: false,
      explanation: null,
      version: view.version,
    });
    const before = await held();
    await lock('locked');
    await expect(study.work()).rejects.toThrow('may no longer do it');
    await lock('open');
    expect(await held()).toEqual(before);
    expect((await study.read(view)).state).toBe('failed');
  });

  it('waits for a lock that is being set, and then writes nothing', async () => {
    const view = await study.check(await study.upload('subject,day,weight\nQ01,84,70\n'));
    await applyImport(study.context, view.id, {
      keepImplausible: false,
      explanation: null,
      version: view.version,
    });
    const before = await held();
    let working: Promise<void> = Promise.resolve();
    await study.context.db.transaction(async (manager) => {
      await manager.query(`UPDATE study SET state = 'locked' WHERE uid = $1`, [study.studyUid]);
      working = study.work();
      await wait(400);
    });
    await working;
    await lock('open');
    expect(await held()).toEqual(before);
    expect(await study.read(view)).toMatchObject({
      state: 'uploaded',
      problem: { code: 'import_changed' },
    });
  });

  it('refuses the act, and keeps in the trail that it was tried', async () => {
    const before = await held();
    const membership = { ...study.context.membership, studyState: 'locked' as const };
    const upload = { path: '/nowhere', name: 'lab.csv', size: 1, fields: {} };
    await expect(uploadImport({ ...study.context, membership }, upload)).rejects.toMatchObject({
      code: 'study_not_open',
    });
    expect(await held()).toEqual({ ...before, entries: (before.entries ?? 0) + 1 });
    const [entry] = await database.query<{ action: string; actor_name: string }>(
      'SELECT action, actor_name FROM audit.entry WHERE chain = $1 ORDER BY seq DESC LIMIT 1',
      [study.studyUid],
    );
    expect(entry).toEqual({
      action: 'act refused: study not open',
      actor_name: 'Robin coordinator',
    });
  });
});

describe('20,000 rows', () => {
  it('are written once, whole, with one audit entry', async () => {
    const lines = ['subject,day,weight,rep'];
    for (let subject = 0; subject < 200; subject += 1) {
      for (let day = 0; day < 100; day += 1)
        lines.push(`B${1000 + subject},${-day},${60 + (day % 9)},1`);
    }
    const mapping = {
      ...MAPPING,
      replicate: 'rep',
      newSubjects: {
        site: { from: 'fixed' as const, value: 'quay' },
        consentVersion: { from: 'fixed' as const, value: '1' },
        consentDate: { from: 'fixed' as const, value: '2025-01-01' },
        baselineDate: { from: 'fixed' as const, value: '2026-06-01' },
        order: 'year-month-day' as const,
      },
    };
    const before = await held();
    const applied = await study.import(lines.join('\n'), mapping);
    expect(applied.counts).toMatchObject({
      rows: 20_000,
      fresh: 20_000,
      newSubjects: 200,
      newVisits: 20_000,
    });
    const after = await held();
    expect((after.readings ?? 0) - (before.readings ?? 0)).toBe(20_000);
    expect((after.entries ?? 0) - (before.entries ?? 0)).toBe(1);
    expect(
      (
        await study.import(
          lines
            .reverse()
            .slice(0, -1)
            .concat()
            .reverse()
            .join('\n')
            .replace(/^/, 'subject,day,weight,rep\n'),
          mapping,
        )
      ).state,
    ).toBe('nothing new');
  }, 120_000);
});
