import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { Revision } from './revision.js';

/** A link that shows one revision to whoever has it, until it expires or is revoked. */
@Entity('revision_link')
export class RevisionLink {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  @Index('revision_link_revision')
  @ForeignKey(() => Revision, { onDelete: 'CASCADE', name: 'revision_link_revision_fk' })
  @Column({ type: 'varchar', length: 36 })
  revisionId: string;

  /** SHA-256 of the token in the link, 64 hexadecimal digits; the link itself is shown once */
  @Index('revision_link_token', { unique: true })
  @Column({ type: 'varchar', length: 64 })
  tokenHash: string;

  /** name of who made it */
  @Column({ type: 'varchar', length: 200 })
  madeBy: string;

  @Col('instant')
  createdAt: Date;

  @Col('instant')
  expiresAt: Date;

  @Col('instant', { nullable: true })
  revokedAt: Date | null;
}
