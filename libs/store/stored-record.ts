import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { RecordSummary } from '#libs/engine/index.js';
import { Col } from './columns.js';
import { StoredSite } from './stored-site.js';

/** A load record of a site; its intervals stand in `RecordColumn`. */
@Entity('load_record')
export class StoredRecord {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  @Index('load_record_site')
  @ForeignKey(() => StoredSite, { onDelete: 'CASCADE', name: 'load_record_site_fk' })
  @Column({ type: 'varchar', length: 36 })
  siteId: string;

  /** counts the revisions of one record from 1: each further file that extends or corrects it makes the next */
  @Column({ type: 'integer', default: 1 })
  revision: number;

  /** the revision this one extends, null for the first; at most one extends each */
  @Index('load_record_previous', { unique: true })
  @ForeignKey(() => StoredRecord, { name: 'load_record_previous_fk' })
  @Column({ type: 'varchar', length: 36, nullable: true })
  previousId: string | null;

  /** SHA-256 of the record's bytes, 64 hexadecimal digits */
  @Column({ type: 'varchar', length: 64 })
  hash: string;

  @Col('double')
  intervalS: number;

  @Col('double')
  firstS: number;

  @Col('double')
  endS: number;

  // Not `intervals`: SQLite would take it for `intervalS`.
  @Column({ type: 'integer' })
  intervalCount: number;

  @Column({ type: 'integer' })
  repaired: number;

  @Column({ type: 'integer' })
  duplicates: number;

  /** what the reader decided, repaired or left out */
  @Col('json')
  notes: RecordSummary['notes'];

  /** statistics shown in lists */
  @Col('json')
  summary: RecordSummary;

  /** what the reader says of the file */
  @Col('json')
  quality: object;

  /** name of the file as it was given, null where none was */
  @Column({ type: 'varchar', length: 400, nullable: true })
  fileName: string | null;

  /** SHA-256 of the file, 64 hexadecimal digits */
  @Column({ type: 'varchar', length: 64 })
  fileHash: string;

  @Column({ type: 'integer' })
  fileBytes: number;

  /** SHA-256 of the file's header row, by which kept answers are offered again; null where it has none or it is not known */
  @Column({ type: 'varchar', length: 64, nullable: true })
  fileHeader: string | null;

  @Col('instant')
  createdAt: Date;
}
