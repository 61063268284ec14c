import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Site } from './site.entity.ts';
import type { Study } from './study.entity.ts';

export const SUBJECT_STATES = [
  'screening',
  'screen failed',
  'enrolled',
  'completed',
  'stopped the intervention but followed',
  'withdrawn from visits',
  'consent withdrawn',
  'lost to follow-up',
  'died',
] as const;
export type SubjectState = (typeof SUBJECT_STATES)[number];

/** A subject, known by code only. There is no arm here, on purpose. */
@Entity('subject')
export class Subject {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'bigint' })
  siteId: string;

  @Column({ type: 'text' })
  code: string;

  @Column({ type: 'text', nullable: true })
  consentVersion: string | null;

  @Column({ type: 'date', nullable: true })
  consentDate: string | null;

  @Column({ type: 'date', nullable: true })
  enrolmentDate: string | null;

  @Column({ type: 'date', nullable: true })
  baselineDate: string | null;

  @Column({ type: 'text' })
  state: SubjectState;

  @Column({ type: 'date', nullable: true })
  stateDate: string | null;

  @Column({ type: 'text', nullable: true })
  stateReason: string | null;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'bigint' })
  createdBy: string;

  @Column({ type: 'integer', default: 1 })
  version: number;

  @ManyToOne('Study', { nullable: false })
  @JoinColumn({ name: 'study_id' })
  study?: Relation<Study>;

  @ManyToOne('Site', { nullable: false })
  @JoinColumn({ name: 'site_id' })
  site?: Relation<Site>;
}
