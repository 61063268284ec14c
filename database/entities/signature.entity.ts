import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

/** A signature: the name as it was then, the time with its zone, the meaning, the hash signed. */
@Entity('signature')
export class Signature {
  @PrimaryGeneratedColumn('identity', { type: 'bigint', generatedIdentity: 'ALWAYS' })
  id: string;

  @Column({ type: 'uuid', default: () => 'uuid_v7()' })
  uid: string;

  @Column({ type: 'bigint' })
  studyId: string;

  @Column({ type: 'text' })
  entityKind: string;

  @Column({ type: 'uuid' })
  entityUid: string;

  @Column({ type: 'bigint' })
  accountId: string;

  @Column({ type: 'text' })
  signedName: string;

  @Column({ type: 'timestamptz' })
  signedAt: Date;

  @Column({ type: 'text' })
  zone: string;

  @Column({ type: 'text' })
  meaning: string;

  @Column({ type: 'text' })
  contentSha256: string;
}
