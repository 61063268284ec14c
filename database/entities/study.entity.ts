import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

export type StudyState = 'open' | 'locked' | 'closed';

/** A study. Days: `closingDays` before a window ends, `lateDays` between visit and entry. */
@Entity('study')
export class Study {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'text' })
  name: string;

  @Column({ type: 'text' })
  shortName: string;

  @Column({ type: 'boolean' })
  masked: boolean;

  @Column({ type: 'text', default: 'open' })
  state: StudyState;

  @Column({ type: 'integer', default: 3 })
  closingDays: number;

  @Column({ type: 'integer', default: 14 })
  lateDays: number;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @Column({ type: 'integer', default: 1 })
  version: number;
}
