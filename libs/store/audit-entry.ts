import { Column, Entity, Index, PrimaryColumn } from 'typeorm';
import type { ChainEntry } from '#libs/review/audit-chain.js';

/**
 * One line of the log: what happened to which revision, by whom. Lines are added and never changed; they outlive what
 * they speak of, so nothing here refers to another table.
 */
@Entity('audit_entry')
export class AuditEntry implements ChainEntry {
  @PrimaryColumn({ type: 'integer' })
  sequence: number;

  @Index('audit_entry_revision')
  @Column({ type: 'varchar', length: 36 })
  revisionId: string;

  /** canonical JSON: the text its hash is made from */
  @Column({ type: 'text' })
  content: string;

  @Column({ type: 'varchar', length: 64 })
  previousHash: string;

  @Column({ type: 'varchar', length: 64 })
  hash: string;
}
