import { Column, Entity, PrimaryColumn } from 'typeorm';

/** Which subject is in which arm of a masked study. */
@Entity({ name: 'allocation', schema: 'sealed' })
export class SealedAllocation {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'bigint' })
  subjectId: string;

  @Column({ type: 'bigint' })
  armId: string;

  @Column({ type: 'timestamptz' })
  listedAt: Date;
}
