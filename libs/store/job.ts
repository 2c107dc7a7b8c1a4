import { Column, Entity, ForeignKey, Index, PrimaryGeneratedColumn } from 'typeorm';
import { Col } from './columns.js';
import { StoredSite } from './stored-site.js';

export type JobState = 'queued' | 'running' | 'done' | 'failed' | 'cancelled';

/**
 * Long work asked for, and how far it is. `attempt` is the fencing token: it goes up with every claim, and whoever
 * writes says which attempt it is, so that a worker which was given up changes nothing any more.
 */
@Entity('job')
@Index('job_state', ['state', 'id'])
export class Job {
  @PrimaryGeneratedColumn({ type: 'integer' })
  id: number;

  /** what it is called outside; a number would tell how much work others have */
  @Index('job_public', { unique: true })
  @Column({ type: 'varchar', length: 36, default: '' })
  publicId: string;

  @Index('job_site')
  @ForeignKey(() => StoredSite, { onDelete: 'CASCADE', name: 'job_site_fk' })
  @Column({ type: 'varchar', length: 36 })
  siteId: string;

  @Column({ type: 'varchar', length: 16 })
  kind: string;

  /** SHA-256 of the frozen inputs, 64 hexadecimal digits */
  @Column({ type: 'varchar', length: 64 })
  inputHash: string;

  @Column({ type: 'varchar', length: 32 })
  engineVersion: string;

  /** what the work needs, frozen when it was asked for */
  @Col('json')
  request: object;

  @Column({ type: 'varchar', length: 16 })
  state: JobState;

  @Column({ type: 'integer' })
  attempt: number;

  /** goes up with every change a reader may see */
  @Column({ type: 'integer' })
  step: number;

  /** when its worker was last heard of, UTC epoch seconds [s] */
  @Col('double')
  heartbeatS: number;

  /** share done, 0 … 1 */
  @Col('double')
  progress: number;

  /** why it failed */
  @Col('json', { nullable: true })
  error: object | null;

  /** revision it led to */
  @Column({ type: 'integer', nullable: true })
  revision: number | null;

  /** load record it led to */
  @Column({ type: 'varchar', length: 36, nullable: true })
  recordId: string | null;

  /** when its worker began, UTC epoch seconds; null before [s] */
  @Col('double', { nullable: true })
  startedS: number | null;

  @Col('instant')
  createdAt: Date;

  @Col('instant', { nullable: true })
  finishedAt: Date | null;
}
