import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Study } from './study.entity.ts';

export type MeasureNature = 'continuous' | 'positive' | 'count' | 'yes_no' | 'choice';
export type MeasureChoice = { code: string; label: string };

/** What is read, with its unit, ranges and nature of response. */
@Entity('measure')
export class Measure {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'text' })
  shortName: string;

  @Column({ type: 'text' })
  label: string;

  @Column({ type: 'text', nullable: true })
  unit: string | null;

  @Column({ type: 'integer' })
  decimals: number;

  @Column({ type: 'text' })
  nature: MeasureNature;

  @Column({ type: 'text' })
  per: 'visit' | 'subject';

  @Column({ type: 'double precision', nullable: true })
  plausibleLow: number | null;

  @Column({ type: 'double precision', nullable: true })
  plausibleHigh: number | null;

  @Column({ type: 'double precision', nullable: true })
  impossibleLow: number | null;

  @Column({ type: 'double precision', nullable: true })
  impossibleHigh: number | null;

  @Column({ type: 'double precision', nullable: true })
  alertLow: number | null;

  @Column({ type: 'double precision', nullable: true })
  alertHigh: number | null;

  @Column({ type: 'text', nullable: true })
  concern: 'high' | 'low' | 'both' | null;

  @Column({ type: 'jsonb', nullable: true })
  choices: MeasureChoice[] | null;

  @Column({ type: 'integer' })
  position: number;

  @ManyToOne('Study', { nullable: false })
  @JoinColumn({ name: 'study_id' })
  study?: Relation<Study>;
}
