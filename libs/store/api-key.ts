import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { Person } from './person.js';

/** A key programs use in a person's name. */
@Entity('api_key')
export class ApiKey {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  @Index('api_key_person')
  @ForeignKey(() => Person, { onDelete: 'CASCADE', name: 'api_key_person_fk' })
  @Column({ type: 'varchar', length: 36 })
  personId: string;

  /** what it is for */
  @Column({ type: 'varchar', length: 80 })
  name: string;

  /** never more than its maker's, who may lose some of theirs later */
  @Column({ type: 'varchar', length: 16 })
  role: string;

  /** SHA-256 of the key, 64 hexadecimal digits; the key itself is shown once */
  @Index('api_key_hash', { unique: true })
  @Column({ type: 'varchar', length: 64 })
  keyHash: string;

  @Col('instant')
  createdAt: Date;

  @Col('instant', { nullable: true })
  expiresAt: Date | null;

  @Col('instant', { nullable: true })
  revokedAt: Date | null;
}
