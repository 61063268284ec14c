import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Account } from './account.entity.ts';

/** One signed-in browser. Ends by idle time, absolute time or revocation. */
@Entity('session')
export class Session {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  accountId: string;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'timestamptz' })
  lastSeenAt: Date;

  @Column({ type: 'timestamptz' })
  absoluteExpiresAt: Date;

  @Column({ type: 'timestamptz', nullable: true })
  revokedAt: Date | null;

  @Column({ type: 'text', nullable: true })
  revokedReason: string | null;

  @Column({ type: 'text', nullable: true })
  addressHash: string | null;

  @Column({ type: 'text', nullable: true })
  agent: string | null;

  @ManyToOne('Account', { nullable: false })
  @JoinColumn({ name: 'account_id' })
  account?: Relation<Account>;
}
