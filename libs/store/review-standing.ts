import { Column, Entity, ForeignKey, PrimaryColumn } from 'typeorm';
import type { ReviewState } from '#libs/review/review.js';
import { Revision } from './revision.js';

/** Where a revision's review stands: what follows from its lines of the log, kept for lists and for If-Match. */
@Entity('review')
export class ReviewStanding {
  @ForeignKey(() => Revision, { onDelete: 'CASCADE', name: 'review_revision_fk' })
  @PrimaryColumn({ type: 'varchar', length: 36 })
  revisionId: string;

  @Column({ type: 'varchar', length: 16 })
  state: ReviewState;

  /** goes up with every act; the client's If-Match is held against it */
  @Column({ type: 'integer' })
  version: number;

  /** its latest line of the log, so that lines cut off the end are missed */
  @Column({ type: 'integer' })
  lastSequence: number;
}
