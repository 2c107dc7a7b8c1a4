import { Column, Entity, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';

/** The organisation every database begins with: what was stored before there were organisations is its. */
export const FIRST_ORGANISATION = 'first';

/** Who sites belong to; to another organisation they do not exist. */
@Entity('organisation')
export class Organisation {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  /** typed at sign-in, in small letters */
  @Index('organisation_name', { unique: true })
  @Column({ type: 'varchar', length: 80 })
  name: string;

  @Col('instant')
  createdAt: Date;
}
