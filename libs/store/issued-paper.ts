import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { Revision } from './revision.js';

/** The proposal as it was approved, when the log says: kept for ever, so neither it nor its revision can be removed. */
@Entity('issued_paper')
export class IssuedPaper {
  // No cascade: what was issued stays, and with it the revision and the site it is of.
  @ForeignKey(() => Revision, { name: 'issued_paper_revision_fk' })
  @PrimaryColumn({ type: 'varchar', length: 36 })
  revisionId: string;

  @Col('bytes')
  bytes: Buffer;

  @Index('issued_paper_sha256')
  @Column({ type: 'varchar', length: 64 })
  sha256: string;
}
