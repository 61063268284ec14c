import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Account } from './account.entity.ts';
import type { Study } from './study.entity.ts';

export const STUDY_ROLES = [
  'owner',
  'coordinator',
  'monitor',
  'analyst',
  'unblinded statistician',
  'board member',
  'safety officer',
] as const;
export type StudyRole = (typeof STUDY_ROLES)[number];

/** One duty of one person in one study. Removed memberships stay. */
@Entity('membership')
export class Membership {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'bigint' })
  accountId: string;

  @Column({ type: 'text' })
  role: StudyRole;

  @Column({ type: 'boolean', default: false })
  chair: boolean;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'timestamptz', nullable: true })
  removedAt: Date | null;

  @Column({ type: 'integer', default: 1 })
  version: number;

  @ManyToOne('Study', { nullable: false })
  @JoinColumn({ name: 'study_id' })
  study?: Relation<Study>;

  @ManyToOne('Account', { nullable: false })
  @JoinColumn({ name: 'account_id' })
  account?: Relation<Account>;
}
