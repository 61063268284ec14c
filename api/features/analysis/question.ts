/** A specification asked of a cut, checked and with all that answering it needs. */
import { DEFAULT_SEED } from '../../../core/analysis/options.ts';
import type { CutJob } from '../../analysis-threads/jobs.ts';
import type { SpecificationInput } from '../../contracts/analysis.ts';
import { bytesOfCut } from '../cuts/cut-bytes.ts';
import type { CutMeasure, StoredCut } from '../cuts/cut-repository.ts';
import type { StudyScope } from '../cuts/scope.ts';
import { cutOf } from '../cuts/service.ts';
import { checkSpecification } from './check-specification.ts';

/** The seed of every check and fit, the one the command takes when none is given. */
export const SEED = DEFAULT_SEED;

export interface Question {
  cut: StoredCut;
  measure: CutMeasure;
  input: SpecificationInput;
}

/** @throws Problem not_found, analysis_… */
export async function questionOf(
  scope: StudyScope,
  cutUid: string,
  input: SpecificationInput,
): Promise<Question> {
  const cut = await cutOf(scope, cutUid);
  const [study]: { masked: boolean }[] = await scope.db.query(
    'SELECT masked FROM study WHERE id = $1',
    [scope.studyId],
  );
  return { cut, measure: checkSpecification(cut, input, study?.masked ?? true), input };
}

/** What a computing thread needs; the analysis reads the frozen bytes and nothing else. */
export async function jobOf(scope: StudyScope, { cut, input }: Question): Promise<CutJob> {
  return {
    bytes: await bytesOfCut(scope.db.manager, cut.id),
    sha256: cut.sha256,
    specification: input,
    seed: SEED,
  };
}

/** Opaque ids of subjects by their code: pictures pick subjects by what may stand in an address. */
export async function subjectIds(scope: StudyScope): Promise<Map<string, string>> {
  const rows: { code: string; uid: string }[] = await scope.db.query(
    'SELECT code, uid FROM subject WHERE study_id = $1',
    [scope.studyId],
  );
  return new Map(rows.map((row) => [row.code, row.uid]));
}
