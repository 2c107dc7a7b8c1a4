import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { FIRST_ORGANISATION, Organisation } from './organisation.js';

/** A site with its current document; what a plan was made from stands frozen in the revision. */
@Entity('site')
@Index('site_number', ['organisationId', 'number'], { unique: true })
export class StoredSite {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  /** whose it is: records, revisions, jobs and papers belong to whom their site belongs to */
  @ForeignKey(() => Organisation, { name: 'site_organisation_fk' })
  @Column({ type: 'varchar', length: 36, default: FIRST_ORGANISATION })
  organisationId: string;

  /** counts the sites of its organisation from 1; printed on their proposals */
  @Column({ type: 'integer' })
  number: number;

  @Column({ type: 'varchar', length: 400 })
  name: string;

  /** the site file as it was given */
  @Col('json')
  document: object;

  /** goes up with every replacement; the client's If-Match is held against it */
  @Column({ type: 'integer' })
  version: number;

  /** number of the latest revision, 0 before the first */
  @Column({ type: 'integer' })
  lastRevision: number;

  @Col('instant')
  createdAt: Date;

  @Col('instant')
  updatedAt: Date;
}
