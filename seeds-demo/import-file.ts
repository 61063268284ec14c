/** An import in the demo, through the service: upload, dry run, apply, with the queue's part played at once. */
import { randomUUID } from 'node:crypto';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { ImportMapping, ImportView } from '../api/contracts/imports.ts';
import { importOf, importView } from '../api/features/imports/rows.ts';
import {
  applyImport,
  checkImport,
  type ImportContext,
  uploadImport,
} from '../api/features/imports/service.ts';
import { importJobs } from '../api/features/imports/work.ts';
import type { JobOrder } from '../api/jobs/jobs.ts';
import type { Account, DemoStudy } from './demo-world.ts';

type FileToImport = { name: string; text: string; measure: string; mapping: ImportMapping };

export async function importFile(
  study: DemoStudy,
  coordinator: Account,
  file: FileToImport,
): Promise<ImportView> {
  const { deps, clock } = study.world;
  const orders: JobOrder[] = [];
  const context: ImportContext = {
    db: deps.databases.masked,
    actor: study.actor(coordinator, 'coordinator'),
    membership: await study.membership(coordinator),
    deps: {
      store: deps.store,
      importThreads: deps.importThreads,
      clock: () => clock.now,
      jobs: {
        changes: { watch: () => () => undefined },
        start: async (_manager, order) => {
          orders.push(order);
          return randomUUID();
        },
      },
    },
  };
  const work = importJobs({ ...deps, clock: () => clock.now });
  const workOff = async () => {
    for (const order of orders.splice(0)) {
      const job = work.find(({ kind }) => kind === order.kind);
      await job?.handler({
        jobUid: randomUUID(),
        subjectUid: order.subjectUid,
        studyId: order.studyId,
        accountId: order.accountId,
        progress: async () => undefined,
        cancelled: async () => false,
      });
    }
  };
  const scope = { studyId: study.id, accountId: coordinator.id };
  const read = async (id: string) => importView(await importOf(context.db.manager, scope, id));

  const uploaded = await upload(context, study, file);
  await checkImport(context, uploaded.id, { mapping: file.mapping, version: uploaded.version });
  await workOff();
  const checked = await read(uploaded.id);
  if (checked.state !== 'checked') return checked;
  await applyImport(context, uploaded.id, {
    keepImplausible: false,
    explanation: null,
    version: checked.version,
  });
  await workOff();
  return read(uploaded.id);
}

async function upload(context: ImportContext, study: DemoStudy, file: FileToImport) {
  const [measure]: { uid: string }[] = await context.db.query(
    'SELECT uid FROM measure WHERE study_id = $1 AND short_name = $2',
    [study.id, file.measure],
  );
  const folder = await mkdtemp(join(tmpdir(), 'tetherline-demo-'));
  try {
    const path = join(folder, 'file');
    await writeFile(path, file.text);
    return await uploadImport(context, {
      path,
      name: file.name,
      size: Buffer.byteLength(file.text),
      fields: { measure: measure?.uid ?? '' },
    });
  } finally {
    await rm(folder, { recursive: true });
  }
}
