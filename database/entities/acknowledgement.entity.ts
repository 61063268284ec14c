import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Account } from './account.entity.ts';

/** Why a person wants the ordinary fit of repeated readings all the same. */
@Entity('acknowledgement')
export class Acknowledgement {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  specificationId: string;

  @Column({ type: 'bigint' })
  accountId: string;

  @Column({ type: 'text' })
  reason: string;

  @Column({ type: 'timestamptz' })
  at: Date;

  @ManyToOne('Account', { nullable: false })
  @JoinColumn({ name: 'account_id' })
  account?: Relation<Account>;
}
