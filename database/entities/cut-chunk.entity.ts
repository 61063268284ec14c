import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A piece of the bytes of a cut, in order of `seq`. */
@Entity('cut_chunk')
export class CutChunk {
  @PrimaryColumn({ type: 'bigint' })
  cutId: string;

  @PrimaryColumn({ type: 'integer' })
  seq: number;

  @Column({ type: 'bytea' })
  bytes: Buffer;
}
