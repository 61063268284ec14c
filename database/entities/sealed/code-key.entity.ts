import { Column, Entity, PrimaryColumn } from 'typeorm';

/** Which code stands for which arm of a masked study. */
@Entity({ name: 'code_key', schema: 'sealed' })
export class CodeKey {
  @PrimaryColumn({ type: 'uuid', default: () => 'gen_random_uuid()' })
  id: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'bigint' })
  armId: string;

  @Column({ type: 'text' })
  code: string;

  @Column({ type: 'timestamptz' })
  drawnAt: Date;
}
