import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

/** A person who may sign in. The password is kept as an argon2id hash only. */
@Entity('account')
export class Account {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'text' })
  email: string;

  @Column({ type: 'text' })
  name: string;

  @Column({ type: 'text' })
  passwordHash: string;

  @Column({ type: 'boolean', default: false })
  administrator: boolean;

  @Column({ type: 'boolean', default: false })
  mustChangePassword: boolean;

  @Column({ type: 'timestamptz', nullable: true })
  disabledAt: Date | null;

  @Column({ type: 'text', default: 'system' })
  theme: 'system' | 'light' | 'dark';

  @Column({ type: 'text', default: 'UTC' })
  timeZone: string;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'integer', default: 1 })
  version: number;
}
