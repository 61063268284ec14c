import { Column, Entity, PrimaryColumn } from 'typeorm';
import { wholeNumber } from '../whole-number.ts';

/** One entry of an audit chain. Written by `audit.append` only. */
@Entity({ name: 'entry', schema: 'audit' })
export class AuditEntry {
  @PrimaryColumn({ type: 'text' })
  chain: string;

  @PrimaryColumn({ type: 'bigint', transformer: wholeNumber })
  seq: string;

  @Column({ type: 'timestamptz' })
  at: Date;

  @Column({ type: 'bigint', nullable: true })
  accountId: string | null;

  @Column({ type: 'text', nullable: true })
  actorName: string | null;

  @Column({ type: 'text', nullable: true })
  roleThen: string | null;

  @Column({ type: 'uuid', nullable: true })
  sessionUid: string | null;

  @Column({ type: 'text', nullable: true })
  requestId: string | null;

  @Column({ type: 'text' })
  action: string;

  @Column({ type: 'text' })
  entity: string;

  @Column({ type: 'uuid', nullable: true })
  entityUid: string | null;

  @Column({ type: 'jsonb' })
  before: unknown;

  @Column({ type: 'jsonb' })
  after: unknown;

  @Column({ type: 'text', nullable: true })
  reason: string | null;

  @Column({ type: 'text' })
  body: string;

  @Column({ type: 'text' })
  previousHash: string;

  @Column({ type: 'text' })
  hash: string;
}
