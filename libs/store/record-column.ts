import { Column, Entity, ForeignKey, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';
import { StoredRecord } from './stored-record.js';

/** One quantity of a load record over one UTC month, packed; see packed-column.ts. */
@Entity('record_column')
export class RecordColumn {
  @ForeignKey(() => StoredRecord, { onDelete: 'CASCADE', name: 'record_column_record_fk' })
  @PrimaryColumn({ type: 'varchar', length: 36 })
  recordId: string;

  /** "2018-01" in UTC */
  @PrimaryColumn({ type: 'varchar', length: 16 })
  month: string;

  /** name of the column in the load record */
  @PrimaryColumn({ type: 'varchar', length: 16 })
  quantity: string;

  @Column({ type: 'integer' })
  intervals: number;

  /** stored integer ÷ scale = value; null where the values stand as 64-bit floats */
  @Col('double', { nullable: true })
  scale: number | null;

  @Col('double')
  firstScaled: number;

  @Col('bytes')
  bytes: Buffer;
}
