import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { Revision } from './revision.js';

/** The proposal of a revision as it was first made: the same bytes at every download. */
@Entity('proposal')
export class ProposalFile {
  @ForeignKey(() => Revision, { onDelete: 'CASCADE', name: 'proposal_revision_fk' })
  @PrimaryColumn({ type: 'varchar', length: 36 })
  revisionId: string;

  @Col('bytes')
  bytes: Buffer;

  @Index('proposal_sha256')
  @Column({ type: 'varchar', length: 64 })
  sha256: string;
}
