/** The analyst's acts in the demo: a cut, a check opened, a fit, a signature. */
import type { RunFitRequest } from '../api/contracts/analysis.ts';
import { openCheck } from '../api/features/analysis/open-check.ts';
import { runFit } from '../api/features/analysis/run-fit.ts';
import { freezeCut } from '../api/features/cuts/freeze-cut.ts';
import { recordOf } from '../api/features/records/service.ts';
import { signRecord } from '../api/features/records/sign-record.ts';
import type { Account, DemoStudy } from './demo-world.ts';

export function freeze(
  study: DemoStudy,
  analyst: Account,
  cut: { name: string; visitCutoff: string; measures: string[] },
): Promise<string> {
  return freezeCut(study.scope(analyst), { ...cut, exclusions: [], includeWithdrawnReason: null });
}

/** The check comes first here too: the service refuses a fit without it. */
export async function checkAndFit(
  study: DemoStudy,
  analyst: Account,
  cut: string,
  request: RunFitRequest,
): Promise<string> {
  const scope = study.scope(analyst);
  await openCheck(scope, cut, request.specification);
  return runFit(scope, cut, request);
}

export async function sign(study: DemoStudy, analyst: Account, record: string): Promise<void> {
  const scope = study.scope(analyst);
  const stored = await recordOf(scope, record);
  await signRecord(scope, stored, {
    meaning: 'I ran this analysis',
    contentSha256: stored.contentSha256,
  });
}
