import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { Person } from './person.js';

/** A browser somebody signed in with. */
@Entity('person_session')
export class PersonSession {
  /** SHA-256 of the token in the cookie, 64 hexadecimal digits: whoever reads the table cannot use it */
  @PrimaryColumn({ type: 'varchar', length: 64 })
  tokenHash: string;

  @Index('person_session_person')
  @ForeignKey(() => Person, { onDelete: 'CASCADE', name: 'person_session_person_fk' })
  @Column({ type: 'varchar', length: 36 })
  personId: string;

  @Col('instant')
  createdAt: Date;

  @Col('instant')
  expiresAt: Date;
}
