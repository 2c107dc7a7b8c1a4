import { Entity, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';

/** Something an installation does once in its life, such as loading the example. */
@Entity('milestone')
export class Milestone {
  @PrimaryColumn({ type: 'varchar', length: 32 })
  name: string;

  @Col('instant')
  reachedAt: Date;
}
