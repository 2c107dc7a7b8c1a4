import { Column, Entity, ForeignKey, Index, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { FIRST_ORGANISATION, Organisation } from './organisation.js';

export type PaperKind = 'tariff' | 'prices';

/** One version of a tariff or a price book that sites refer to by name: written once, never changed. */
@Entity('paper')
@Index('paper_version', ['organisationId', 'kind', 'name', 'version'], { unique: true })
export class Paper {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  id: string;

  @ForeignKey(() => Organisation, { name: 'paper_organisation_fk' })
  @Column({ type: 'varchar', length: 36, default: FIRST_ORGANISATION })
  organisationId: string;

  @Column({ type: 'varchar', length: 16 })
  kind: PaperKind;

  @Column({ type: 'varchar', length: 80 })
  name: string;

  /** counts the versions of a name from 1 */
  @Column({ type: 'integer' })
  version: number;

  /** local date from which it holds, "2026-01-01" */
  @Column({ type: 'varchar', length: 10 })
  date: string;

  /** tariff or price book as the site file holds it */
  @Col('json')
  document: object;

  @Col('instant')
  createdAt: Date;
}
