import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

export type JobState = 'waiting' | 'running' | 'done' | 'failed' | 'cancelled';

/** How far a long piece of work has come; it carries ids, never data. */
@Entity('job')
export class Job {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'text' })
  kind: string;

  @Column({ type: 'bigint', nullable: true })
  studyId: string | null;

  @Column({ type: 'bigint', nullable: true })
  accountId: string | null;

  /** The uid of the record the work is about, such as an import. */
  @Column({ type: 'uuid', nullable: true })
  subjectUid: string | null;

  @Column({ type: 'text', default: 'waiting' })
  state: JobState;

  @Column({ type: 'integer', default: 0 })
  done: number;

  @Column({ type: 'integer', nullable: true })
  total: number | null;

  @Column({ type: 'text', nullable: true })
  messageCode: string | null;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'timestamptz', nullable: true })
  startedAt: Date | null;

  @Column({ type: 'timestamptz', nullable: true })
  finishedAt: Date | null;

  @Column({ type: 'boolean', default: false })
  cancelRequested: boolean;

  @Column({ type: 'jsonb' })
  problem: unknown;
}
