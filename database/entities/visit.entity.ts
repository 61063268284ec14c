import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { PlannedVisit } from './planned-visit.entity.ts';
import type { Subject } from './subject.entity.ts';

export type DatePrecision = 'day' | 'month' | 'year';
export const CONTACT_MODES = ['in person', 'phone', 'remote'] as const;
export type ContactMode = (typeof CONTACT_MODES)[number];
export const MISSED_REASONS = [
  'ill or in hospital',
  'away',
  'could not be reached',
  'refused this visit',
  'site unable',
  'weather or transport',
  'no longer due',
  'unknown',
  'other',
] as const;
export type MissedReason = (typeof MISSED_REASONS)[number];

/** A visit of a subject: planned or, with a reason, unscheduled; dated, or missed with a reason. */
@Entity('visit')
export class Visit {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'bigint' })
  subjectId: string;

  @Column({ type: 'bigint', nullable: true })
  plannedVisitId: string | null;

  @Column({ type: 'text', nullable: true })
  unscheduledReason: string | null;

  @Column({ type: 'date', nullable: true })
  date: string | null;

  /** A partial date keeps its first possible day in `date`. */
  @Column({ type: 'text', default: 'day' })
  datePrecision: DatePrecision;

  @Column({ type: 'text', nullable: true })
  contactMode: ContactMode | null;

  @Column({ type: 'text', nullable: true })
  missedReason: MissedReason | null;

  @Column({ type: 'text', nullable: true })
  missedText: string | null;

  @Column({ type: 'bigint', nullable: true })
  importId: string | null;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'bigint' })
  createdBy: string;

  @Column({ type: 'integer', default: 1 })
  version: number;

  @ManyToOne('Subject', { nullable: false })
  @JoinColumn({ name: 'subject_id' })
  subject?: Relation<Subject>;

  @ManyToOne('PlannedVisit', { nullable: true })
  @JoinColumn({ name: 'planned_visit_id' })
  plannedVisit?: Relation<PlannedVisit> | null;
}
