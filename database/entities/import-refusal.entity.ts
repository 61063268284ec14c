import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A row of a file that was refused, with the reason as a code. */
@Entity('import_refusal')
export class ImportRefusal {
  @PrimaryColumn({ type: 'bigint' })
  importId: string;

  @PrimaryColumn({ type: 'integer' })
  line: number;

  @Column({ type: 'text' })
  subject: string;

  @Column({ type: 'text' })
  value: string;

  @Column({ type: 'text' })
  reasonCode: string;

  @Column({ type: 'jsonb' })
  params: Record<string, string | number>;
}
