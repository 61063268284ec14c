import { Entity, PrimaryColumn } from 'typeorm';

/** A site that a coordinator works for. */
@Entity('membership_site')
export class MembershipSite {
  @PrimaryColumn({ type: 'bigint' })
  membershipId: string;

  @PrimaryColumn({ type: 'bigint' })
  siteId: string;
}
