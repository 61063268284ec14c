import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Cut } from './cut.entity.ts';

/** What is asked of a cut: measure, axis, unit, group. Numbered per measure and cut, whoever asks. */
@Entity('specification')
export class Specification {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'bigint' })
  cutId: string;

  @Column({ type: 'text' })
  measure: string;

  @Column({ type: 'text' })
  axis: 'since_baseline' | 'planned_day';

  @Column({ type: 'text' })
  unit: 'days' | 'weeks';

  @Column({ type: 'boolean' })
  groupBy: boolean;

  @Column({ type: 'text' })
  sha256: string;

  @Column({ type: 'integer' })
  number: number;

  @Column({ type: 'timestamptz' })
  createdAt: Date;

  @ManyToOne('Cut', { nullable: false })
  @JoinColumn({ name: 'cut_id' })
  cut?: Relation<Cut>;
}
