import { Column, Entity, PrimaryColumn } from 'typeorm';

/** How often something was tried in one window of time. */
@Entity('rate_counter')
export class RateCounter {
  @PrimaryColumn({ type: 'text' })
  key: string;

  @PrimaryColumn({ type: 'timestamptz' })
  windowStart: Date;

  @Column({ type: 'integer', default: 0 })
  count: number;
}
