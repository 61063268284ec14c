/** The picture of a fit with opaque ids and the ends of follow-up that the cut knows. */
import type { z } from 'zod';
import { toUnit } from '../../analysis-threads/cut-table.ts';
import type { PictureAnswer } from '../../analysis-threads/jobs.ts';
import type { pictureSchema, SpecificationInput } from '../../contracts/analysis.ts';
import type { StoredCut } from '../cuts/cut-repository.ts';
import type { StudyScope } from '../cuts/scope.ts';
import { subjectIds } from './question.ts';

export async function pictureFor(
  scope: StudyScope,
  cut: StoredCut,
  unit: SpecificationInput['unit'],
  picture: PictureAnswer,
): Promise<z.infer<typeof pictureSchema>> {
  const ids = await subjectIds(scope);
  const ends = new Map(cut.ended.map((ended) => [ended.code, ended]));
  return {
    ...picture,
    subjects: picture.subjects.map((subject) => {
      const end = ends.get(subject.code);
      return {
        id: ids.get(subject.code) ?? subject.code,
        ...subject,
        ended: end
          ? { word: end.word, time: end.day === null ? null : toUnit(end.day, unit) }
          : null,
      };
    }),
  };
}
