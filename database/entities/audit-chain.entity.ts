import { Column, Entity, PrimaryColumn } from 'typeorm';
import { wholeNumber } from '../whole-number.ts';

/** The head of an audit chain. */
@Entity({ name: 'chain', schema: 'audit' })
export class AuditChain {
  @PrimaryColumn({ type: 'text' })
  name: string;

  @Column({ type: 'bigint', transformer: wholeNumber })
  headSeq: string;

  @Column({ type: 'text' })
  headHash: string;
}
