import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

/** The answer to a request that carried an Idempotency-Key. `status` is null while it runs; sealed routes leave `body` null. */
@Entity('idempotency')
export class Idempotency {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'bigint' })
  accountId: string;

  @Column({ type: 'text' })
  key: string;

  @Column({ type: 'text' })
  route: string;

  @Column({ type: 'text' })
  requestHash: string;

  @Column({ type: 'integer', nullable: true })
  status: number | null;

  @Column({ type: 'text', nullable: true })
  body: string | null;

  @Column({ type: 'timestamptz' })
  createdAt: Date;
}
