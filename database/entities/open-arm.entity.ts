import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import type { Arm } from './arm.entity.ts';

/** The arm of a subject in a study that is not masked. */
@Entity('open_arm')
export class OpenArm {
  @PrimaryColumn({ type: 'bigint' })
  subjectId: string;

  @Column({ type: 'bigint' })
  studyId: string;

  /** Always false: the foreign key (study, masked) then refuses a masked study. */
  @Column({ type: 'boolean', default: false })
  masked: boolean;

  @Column({ type: 'bigint' })
  armId: string;

  @ManyToOne('Arm', { nullable: false })
  @JoinColumn({ name: 'arm_id' })
  arm?: Relation<Arm>;
}
