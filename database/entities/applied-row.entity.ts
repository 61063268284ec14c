import { Column, Entity, PrimaryColumn } from 'typeorm';

/** The hash of the content of a row that was applied once, so that a repeat is known. */
@Entity('applied_row')
export class AppliedRow {
  @PrimaryColumn({ type: 'bigint' })
  studyId: string;

  @PrimaryColumn({ type: 'bytea' })
  contentHash: Buffer;

  @Column({ type: 'bigint' })
  importId: string;

  @Column({ type: 'bigint' })
  readingId: string;
}
