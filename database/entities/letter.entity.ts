import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

/** A letter of the outbox: to whom, of what kind, in which state; never its text. */
@Entity('letter')
export class Letter {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  toAccount: string;

  @Column({ type: 'text' })
  kind: string;

  @Column({ type: 'text' })
  state: 'waiting' | 'sent' | 'failed';

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'timestamptz', nullable: true })
  sentAt: Date | null;
}
