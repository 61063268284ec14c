import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Study } from './study.entity.ts';

/** A place where subjects are seen; its time zone says which day it is there. */
@Entity('site')
export class Site {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'text' })
  code: string;

  @Column({ type: 'text' })
  name: string;

  @Column({ type: 'text' })
  timeZone: string;

  @ManyToOne('Study', { nullable: false })
  @JoinColumn({ name: 'study_id' })
  study?: Relation<Study>;
}
