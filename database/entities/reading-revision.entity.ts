import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Reading } from './reading.entity.ts';

export const CORRECTION_REASONS = [
  'transcription error',
  'source corrected',
  'unit error',
  'wrong subject or visit',
  'late source',
  'answer to a query',
  'other',
] as const;
export type CorrectionReason = (typeof CORRECTION_REASONS)[number];

/** What a reading was before a correction and after it, and why. Never changes. */
@Entity('reading_revision')
export class ReadingRevision {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  readingId: string;

  @Column({ type: 'timestamptz' })
  at: Date;

  @Column({ type: 'bigint' })
  byAccount: string;

  @Column({ type: 'double precision', nullable: true })
  oldValue: number | null;

  @Column({ type: 'text', nullable: true })
  oldChoice: string | null;

  @Column({ type: 'text', nullable: true })
  oldLimitSign: '<' | '>' | null;

  @Column({ type: 'double precision', nullable: true })
  oldLimitValue: number | null;

  @Column({ type: 'text', nullable: true })
  oldNotDone: string | null;

  @Column({ type: 'double precision', nullable: true })
  newValue: number | null;

  @Column({ type: 'text', nullable: true })
  newChoice: string | null;

  @Column({ type: 'text', nullable: true })
  newLimitSign: '<' | '>' | null;

  @Column({ type: 'double precision', nullable: true })
  newLimitValue: number | null;

  @Column({ type: 'text', nullable: true })
  newNotDone: string | null;

  @Column({ type: 'text' })
  reason: CorrectionReason;

  @Column({ type: 'text', nullable: true })
  reasonText: string | null;

  @ManyToOne('Reading', { nullable: false })
  @JoinColumn({ name: 'reading_id' })
  reading?: Relation<Reading>;
}
