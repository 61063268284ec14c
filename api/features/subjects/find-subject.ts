import { type Site, Subject } from '../../../database/entities/index.ts';
import { Problem } from '../../http/problems.ts';
import type { StudyAct } from './study-act.ts';

export type SubjectWithSite = Subject & { site: Site };

/**
 * The subject an act is about, held until the transaction ends, so that two acts on one subject follow
 * each other.
 *
 * @throws Problem `subject_unknown`, in the same words for a subject of another site
 */
export async function holdSubject(act: StudyAct, code: string): Promise<SubjectWithSite> {
  const subject = await act.tx.manager
    .getRepository(Subject)
    .createQueryBuilder('subject')
    .innerJoinAndSelect('subject.site', 'site')
    .setLock('pessimistic_write', undefined, ['subject'])
    .where('subject.study_id = :studyId AND subject.code = :code', {
      studyId: act.study.id,
      code,
    })
    .getOne();
  if (!subject?.site || (act.siteIds !== null && !act.siteIds.includes(subject.siteId))) {
    throw new Problem('subject_unknown', { subject: code });
  }
  return subject as SubjectWithSite;
}
