import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Study } from './study.entity.ts';

/** A visit of the schedule: target day from baseline, window in days before and after. */
@Entity('planned_visit')
export class PlannedVisit {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'text' })
  name: string;

  @Column({ type: 'integer' })
  targetDay: number;

  @Column({ type: 'integer' })
  windowBefore: number;

  @Column({ type: 'integer' })
  windowAfter: number;

  @Column({ type: 'integer' })
  position: number;

  @ManyToOne('Study', { nullable: false })
  @JoinColumn({ name: 'study_id' })
  study?: Relation<Study>;
}
