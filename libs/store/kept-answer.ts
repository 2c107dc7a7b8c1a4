import { Column, Entity, PrimaryColumn } from 'typeorm';
import { Col } from './columns.js';

/** The answer to a request that names an idempotency key, so that the same request again changes nothing. */
@Entity('kept_answer')
export class KeptAnswer {
  @PrimaryColumn({ type: 'varchar', length: 36 })
  organisationId: string;

  @PrimaryColumn({ type: 'varchar', length: 36 })
  personId: string;

  /** as the client chose it */
  @PrimaryColumn({ type: 'varchar', length: 200 })
  key: string;

  /** which of several requests at once came first */
  @Column({ type: 'varchar', length: 36 })
  claim: string;

  /** SHA-256 of method, address and body, 64 hexadecimal digits */
  @Column({ type: 'varchar', length: 64 })
  fingerprint: string;

  /** HTTP status of the answer, null as long as there is none */
  @Column({ type: 'integer', nullable: true })
  status: number | null;

  /** type, location and ETag of the answer */
  @Col('json', { nullable: true })
  headers: Record<string, string> | null;

  /** null where the answer may not be kept */
  @Column({ type: 'text', nullable: true })
  body: string | null;

  @Col('instant')
  createdAt: Date;
}
