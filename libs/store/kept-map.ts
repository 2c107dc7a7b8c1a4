import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { FIRST_ORGANISATION, Organisation } from './organisation.js';

/** Answers about meter files, kept under a name to be chosen again. */
@Entity('kept_map')
@Index('kept_map_name', ['organisationId', 'name'], { unique: true })
export class KeptMap {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  @ForeignKey(() => Organisation, { name: 'kept_map_organisation_fk' })
  @Column({ type: 'varchar', length: 36, default: FIRST_ORGANISATION })
  organisationId: string;

  @Column({ type: 'varchar', length: 80 })
  name: string;

  /** the map as it was given */
  @Col('json')
  map: object;

  /** SHA-256 of the header row of the file it was made for, 64 hexadecimal digits; null where none is known */
  @Index('kept_map_header')
  @Column({ type: 'varchar', length: 64, nullable: true })
  header: string | null;

  /** goes up with every replacement; the client's If-Match is held against it */
  @Column({ type: 'integer' })
  version: number;

  @Col('instant')
  createdAt: Date;

  @Col('instant')
  updatedAt: Date;
}
