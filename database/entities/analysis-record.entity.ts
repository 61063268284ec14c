import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import { wholeNumber } from '../whole-number.ts';
import type { Cut } from './cut.entity.ts';
import type { Specification } from './specification.entity.ts';

/** A fit that was run, with everything needed to run it again. Never changes. */
@Entity('analysis_record')
export class AnalysisRecord {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'bigint' })
  cutId: string;

  @Column({ type: 'bigint' })
  specificationId: string;

  @Column({ type: 'text' })
  fit: 'pooled' | 'ordinary';

  @Column({ type: 'text' })
  purpose: 'planned' | 'exploratory';

  @Column({ type: 'bigint', nullable: true })
  acknowledgementId: string | null;

  @Column({ type: 'text' })
  checkText: string;

  @Column({ type: 'text' })
  resultText: string;

  @Column({ type: 'text', nullable: true })
  pictureText: string | null;

  @Column({ type: 'jsonb' })
  headline: unknown;

  @Column({ type: 'text', nullable: true })
  stamp: string | null;

  @Column({ type: 'text' })
  contentSha256: string;

  @Column({ type: 'text' })
  engineVersion: string;

  @Column({ type: 'bigint', transformer: wholeNumber })
  seed: string;

  @Column({ type: 'bigint' })
  createdBy: string;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @ManyToOne('Cut', { nullable: false })
  @JoinColumn({ name: 'cut_id' })
  cut?: Relation<Cut>;

  @ManyToOne('Specification', { nullable: false })
  @JoinColumn({ name: 'specification_id' })
  specification?: Relation<Specification>;
}
