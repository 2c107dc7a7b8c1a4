import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import type { Verdict } from '#libs/engine/index.js';
import { Col } from './columns.js';
import { StoredRecord } from './stored-record.js';
import { StoredSite } from './stored-site.js';

/** What is shown of the same kvar built the other way. */
export interface RivalSummary {
  /** in words: "No reactors" */
  name: string;
  verdict: Verdict;
  /** levels above 0 at which a limit is exceeded in some corner */
  levelsOver: number;
  levelsAll: number;
}

/**
 * A plan or an assessment with its frozen inputs: written once, never changed.
 * Equal inputs of one site on an equal paper are one revision until it has ended, which makes a job that runs twice harmless.
 */
@Entity('revision')
@Index('revision_number', ['siteId', 'revision'], { unique: true })
@Index('revision_content', ['siteId', 'contentHash'])
export class Revision {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  @ForeignKey(() => StoredSite, { onDelete: 'CASCADE', name: 'revision_site_fk' })
  @Column({ type: 'varchar', length: 36 })
  siteId: string;

  /** number printed on the proposal */
  @Column({ type: 'varchar', length: 32 })
  number: string;

  /** counts a site's plans and assessments from 1 */
  @Column({ type: 'integer' })
  revision: number;

  @Column({ type: 'varchar', length: 16 })
  kind: 'plan' | 'assess';

  @Index('revision_record')
  @ForeignKey(() => StoredRecord, { name: 'revision_record_fk' })
  @Column({ type: 'varchar', length: 36, nullable: true })
  recordId: string | null;

  /** null, as is the record, where the site's own estimate stood in for one */
  @Column({ type: 'varchar', length: 64, nullable: true })
  recordHash: string | null;

  /** canonical JSON of site, zone table, record hash, kind and engine version: the text the content hash is made from */
  @Column({ type: 'text' })
  inputs: string;

  @Column({ type: 'varchar', length: 32 })
  engineVersion: string;

  @Column({ type: 'varchar', length: 64 })
  contentHash: string;

  /** the result as JSON, put in words */
  @Column({ type: 'text' })
  result: string;

  /** what is proposed or judged, in one sentence */
  @Column({ type: 'varchar', length: 400 })
  proposed: string;

  @Col('json', { nullable: true })
  rival: RivalSummary | null;

  @Column({ type: 'varchar', length: 16 })
  verdict: Verdict;

  @Col('instant')
  createdAt: Date;

  @Column({ type: 'varchar', length: 200, nullable: true })
  author: string | null;

  @Column({ type: 'varchar', length: 2000, nullable: true })
  reason: string | null;

  /** how its paper looks: "Letter de"; null on A4 in English without a logo */
  @Column({ type: 'varchar', length: 60, nullable: true })
  paperForm: string | null;
}
