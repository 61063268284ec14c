import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A row of a file whose value lies outside the plausible range. */
@Entity('import_implausible')
export class ImportImplausible {
  @PrimaryColumn({ type: 'bigint' })
  importId: string;

  @PrimaryColumn({ type: 'integer' })
  line: number;

  @Column({ type: 'text' })
  subject: string;

  @Column({ type: 'text' })
  visit: string;

  @Column({ type: 'double precision' })
  value: number;
}
