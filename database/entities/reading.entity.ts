import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Measure } from './measure.entity.ts';
import type { Visit } from './visit.entity.ts';

export const NOT_DONE_REASONS = [
  'visit missed',
  'subject refused',
  'instrument failure',
  'sample lost or inadequate',
  'not applicable',
  'unknown',
] as const;
export type NotDoneReason = (typeof NOT_DONE_REASONS)[number];

/** A reading: exactly one of value, choice, limit (censored) and not done. No visit: taken once per subject. */
@Entity('reading')
export class Reading {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'bigint' })
  subjectId: string;

  @Column({ type: 'bigint', nullable: true })
  visitId: string | null;

  @Column({ type: 'bigint' })
  measureId: string;

  @Column({ type: 'integer', default: 1 })
  replicate: number;

  @Column({ type: 'double precision', nullable: true })
  value: number | null;

  @Column({ type: 'text', nullable: true })
  choice: string | null;

  @Column({ type: 'text', nullable: true })
  limitSign: '<' | '>' | null;

  @Column({ type: 'double precision', nullable: true })
  limitValue: number | null;

  @Column({ type: 'text', nullable: true })
  notDone: NotDoneReason | null;

  @Column({ type: 'text', nullable: true })
  explanation: string | null;

  @Column({ type: 'bigint', nullable: true })
  importId: string | null;

  @Column({ type: 'timestamptz' })
  enteredAt: Date;

  @Column({ type: 'bigint' })
  enteredBy: string;

  @Column({ type: 'integer', default: 1 })
  version: number;

  @ManyToOne('Visit', { nullable: true })
  @JoinColumn({ name: 'visit_id' })
  visit?: Relation<Visit> | null;

  @ManyToOne('Measure', { nullable: false })
  @JoinColumn({ name: 'measure_id' })
  measure?: Relation<Measure>;
}
