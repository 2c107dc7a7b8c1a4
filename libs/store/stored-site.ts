import { Column, Entity, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';

/** A site with its current document; what a plan was made from stands frozen in the revision. */
@Entity('site')
export class StoredSite {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  /** counts the sites of this installation from 1; printed on their proposals */
  @Index('site_number', { unique: true })
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
