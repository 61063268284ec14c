/** Makes a study from a set-up file, and reads a set-up back. */
import type { EntityManager } from 'typeorm';
import { Arm, Measure, PlannedVisit, Site, Study } from '../../../database/entities/index.ts';
import type { Tx } from '../../audit/transaction.ts';
import type { SetupFile, SetupView } from '../../contracts/setup.ts';
import { Problem } from '../../http/problems.ts';

/**
 * The study with its sites, arms, measures and planned visits; all of it or nothing.
 *
 * @param setup checked against `setupFileSchema`
 * @throws Problem `setup_study_exists` where the short name is in use
 */
export async function createStudyFromSetup(tx: Tx, now: Date, setup: SetupFile): Promise<Study> {
  const { manager } = tx;
  const { study: fields } = setup;
  if (await manager.getRepository(Study).existsBy({ shortName: fields.shortName })) {
    throw new Problem('setup_study_exists', { shortName: fields.shortName });
  }
  const saved = await manager.getRepository(Study).save({ ...fields, createdAt: now });
  const studyId = saved.id;
  await manager.getRepository(Site).insert(setup.sites.map((site) => ({ studyId, ...site })));
  if (setup.arms.length > 0) {
    await manager
      .getRepository(Arm)
      .insert(setup.arms.map((name, index) => ({ studyId, name, position: index + 1 })));
  }
  await manager
    .getRepository(Measure)
    .insert(setup.measures.map((measure, index) => ({ studyId, ...measure, position: index + 1 })));
  const inOrder = [...setup.visits].sort((a, b) => a.targetDay - b.targetDay);
  await manager
    .getRepository(PlannedVisit)
    .insert(inOrder.map((visit, index) => ({ studyId, ...visit, position: index + 1 })));
  tx.audit({
    at: now,
    studyUid: saved.uid,
    action: 'study set up',
    entity: 'study',
    entityUid: saved.uid,
    after: setup,
  });
  return manager.getRepository(Study).findOneByOrFail({ id: studyId });
}

export async function readSetup(manager: EntityManager, studyId: string): Promise<SetupView> {
  const study = await manager.getRepository(Study).findOneByOrFail({ id: studyId });
  const of = { where: { studyId }, order: { position: 'ASC' } } as const;
  const sites = await manager
    .getRepository(Site)
    .find({ where: { studyId }, order: { id: 'ASC' } });
  const arms = await manager.getRepository(Arm).find(of);
  const measures = await manager.getRepository(Measure).find(of);
  const visits = await manager.getRepository(PlannedVisit).find(of);
  return {
    study: {
      id: study.uid,
      name: study.name,
      shortName: study.shortName,
      masked: study.masked,
      state: study.state,
      closingDays: study.closingDays,
      lateDays: study.lateDays,
    },
    sites: sites.map(({ uid, code, name, timeZone }) => ({ id: uid, code, name, timeZone })),
    arms: arms.map((arm) => arm.name),
    measures: measures.map((measure) => ({
      id: measure.uid,
      shortName: measure.shortName,
      label: measure.label,
      unit: measure.unit,
      decimals: measure.decimals,
      nature: measure.nature,
      per: measure.per,
      plausibleLow: measure.plausibleLow,
      plausibleHigh: measure.plausibleHigh,
      impossibleLow: measure.impossibleLow,
      impossibleHigh: measure.impossibleHigh,
      alertLow: measure.alertLow,
      alertHigh: measure.alertHigh,
      concern: measure.concern,
      choices: measure.choices,
    })),
    visits: visits.map(({ uid, name, targetDay, windowBefore, windowAfter }) => ({
      id: uid,
      name,
      targetDay,
      windowBefore,
      windowAfter,
    })),
  };
}
