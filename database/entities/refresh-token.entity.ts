import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Session } from './session.entity.ts';

/** A refresh token of a session, as its hash; using one twice betrays a theft. */
@Entity('refresh_token')
export class RefreshToken {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'bigint' })
  sessionId: string;

  @Column({ type: 'text' })
  tokenHash: string;

  @Column({ type: 'timestamptz' })
  issuedAt: Date;

  @Column({ type: 'timestamptz', nullable: true })
  usedAt: Date | null;

  @Column({ type: 'timestamptz' })
  expiresAt: Date;

  @ManyToOne('Session', { nullable: false })
  @JoinColumn({ name: 'session_id' })
  session?: Relation<Session>;
}
