import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import { wholeNumber } from '../whole-number.ts';
import type { Account } from './account.entity.ts';
import type { Measure } from './measure.entity.ts';

export type ImportState =
  | 'uploaded'
  | 'checking'
  | 'checked'
  | 'applying'
  | 'applied'
  | 'nothing new'
  | 'failed'
  | 'cancelled';

/** A file of readings of one measure, from upload to what was applied. */
@Entity('import')
export class Import {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'bigint' })
  accountId: string;

  @Column({ type: 'bigint' })
  measureId: string;

  @Column({ type: 'text' })
  fileName: string;

  @Column({ type: 'text' })
  fileHash: string;

  @Column({ type: 'bigint', transformer: wholeNumber })
  fileSize: string;

  /** Rows below the header, blank lines aside. */
  @Column({ type: 'integer' })
  fileRows: number;

  @Column({ type: 'text' })
  objectKey: string;

  @Column({ type: 'text' })
  state: ImportState;

  @Column({ type: 'text' })
  delimiter: string;

  @Column({ type: 'jsonb' })
  columns: unknown;

  @Column({ type: 'jsonb' })
  suggestedMapping: unknown;

  @Column({ type: 'jsonb' })
  mapping: unknown;

  @Column({ type: 'jsonb' })
  counts: unknown;

  @Column({ type: 'text', nullable: true })
  appliedHash: string | null;

  @Column({ type: 'boolean', nullable: true })
  keepImplausible: boolean | null;

  @Column({ type: 'text', nullable: true })
  explanation: string | null;

  @Column({ type: 'jsonb' })
  problem: unknown;

  @Column({ type: 'uuid', nullable: true })
  jobUid: string | null;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'timestamptz', nullable: true })
  checkedAt: Date | null;

  @Column({ type: 'timestamptz', nullable: true })
  appliedAt: Date | null;

  @Column({ type: 'integer', default: 1 })
  version: number;

  @ManyToOne('Measure', { nullable: false })
  @JoinColumn({ name: 'measure_id' })
  measure?: Relation<Measure>;

  @ManyToOne('Account', { nullable: false })
  @JoinColumn({ name: 'account_id' })
  account?: Relation<Account>;
}
