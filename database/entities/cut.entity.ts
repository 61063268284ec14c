import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Study } from './study.entity.ts';

/** A frozen, hashed copy of readings. Never changes; its bytes are in `cut_chunk`. */
@Entity('cut')
export class Cut {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'integer' })
  number: number;

  @Column({ type: 'text' })
  name: string;

  @Column({ type: 'jsonb' })
  measures: unknown;

  @Column({ type: 'date' })
  visitCutoff: string;

  @Column({ type: 'timestamptz' })
  enteredUntil: Date;

  @Column({ type: 'bigint' })
  frozenBy: string;

  @Column({ type: 'timestamptz' })
  frozenAt: Date;

  @Column({ type: 'jsonb' })
  exclusions: unknown;

  @Column({ type: 'text', nullable: true })
  withdrawnIncludedReason: string | null;

  @Column({ type: 'jsonb' })
  withdrawnLeftOut: unknown;

  @Column({ type: 'integer' })
  rowCount: number;

  @Column({ type: 'integer' })
  subjectCount: number;

  @Column({ type: 'integer' })
  readingCount: number;

  @Column({ type: 'integer' })
  lateCount: number;

  @Column({ type: 'integer' })
  pendingCount: number;

  @Column({ type: 'integer', default: 0 })
  openQueries: number;

  @Column({ type: 'jsonb' })
  lateRows: unknown;

  @Column({ type: 'jsonb' })
  pendingRows: unknown;

  @Column({ type: 'jsonb' })
  ended: unknown;

  @Column({ type: 'jsonb' })
  groups: string[];

  @Column({ type: 'text' })
  sha256: string;

  @Column({ type: 'bigint', nullable: true })
  previousCutId: string | null;

  @Column({ type: 'jsonb' })
  difference: unknown;

  @ManyToOne('Study', { nullable: false })
  @JoinColumn({ name: 'study_id' })
  study?: Relation<Study>;
}
