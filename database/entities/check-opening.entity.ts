import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';
import { wholeNumber } from '../whole-number.ts';

/** That this person looked at the independence check of this specification. */
@Entity('check_opening')
export class CheckOpening {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'bigint' })
  specificationId: string;

  @Column({ type: 'bigint' })
  accountId: string;

  @Column({ type: 'timestamptz' })
  at: Date;

  @Column({ type: 'bigint', transformer: wholeNumber })
  seed: string;

  @Column({ type: 'text', nullable: true })
  result: string | null;
}
