import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { Organisation } from './organisation.js';

/** Someone with an account. Accounts are closed, never removed: what was done under a name keeps it. */
@Entity('person')
@Index('person_sign_in', ['organisationId', 'signInName'], { unique: true })
export class Person {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  @ForeignKey(() => Organisation, { name: 'person_organisation_fk' })
  @Column({ type: 'varchar', length: 36 })
  organisationId: string;

  /** typed at sign-in, in small letters; one of its kind within the organisation */
  @Column({ type: 'varchar', length: 80 })
  signInName: string;

  /** as it is written under what they do */
  @Column({ type: 'varchar', length: 200 })
  name: string;

  /** a role of apps/server/people/actor.ts */
  @Column({ type: 'varchar', length: 16 })
  role: string;

  /** salted hash with its parameters; see apps/server/people/password-hash.ts */
  @Column({ type: 'varchar', length: 255 })
  password: string;

  /** goes up with every change; the client's If-Match is held against it */
  @Column({ type: 'integer' })
  version: number;

  @Col('instant')
  createdAt: Date;

  @Col('instant')
  updatedAt: Date;

  /** null as long as the account is open */
  @Col('instant', { nullable: true })
  closedAt: Date | null;
}
