import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Study } from './study.entity.ts';

/** An arm of the protocol. Its name is no secret; who is in it may be. */
@Entity('arm')
export class Arm {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'text' })
  name: string;

  @Column({ type: 'integer' })
  position: number;

  @ManyToOne('Study', { nullable: false })
  @JoinColumn({ name: 'study_id' })
  study?: Relation<Study>;
}
