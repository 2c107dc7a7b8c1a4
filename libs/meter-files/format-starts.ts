import { decodeText } from './csv/row-cells.js';
import { xmlStart } from './xml/xml-start.js';

// Apart from the readers, so that of those only the one that is wanted is loaded.

const PARQUET_STARTS = ['PAR1', 'PARE'];
const ZIP = [0x50, 0x4b, 0x03, 0x04];
const EMPTY_ZIP = [0x50, 0x4b, 0x05, 0x06];
/** so much of the head is looked at for what no text holds [bytes] */
const TEXT_HEAD_BYTES = 512;
/** one byte in so many may be a character that no text holds: a damaged text is told by row and column */
const FEW = 20;
/** what a workbook with a password and the older format begin with */
const COMPOUND = [0xd0, 0xcf, 0x11, 0xe0];

/**
 * Whether a file begins like NEM12 (or its sister NEM13, which is then refused by name).
 * @param head the first bytes
 */
export function isNem12(head: Uint8Array): boolean {
  const start = decodeText(head.subarray(0, 400)).trimStart();
  return /^"?100"?,"?NEM1[23]\b/i.test(start) || /^200,[^,\r\n]*,[^,\r\n]*,[^,\r\n]*,[A-Z]\w?,/i.test(start);
}

/**
 * Whether a file begins like an interchange with meter messages.
 * @param head the first bytes
 */
export function isMscons(head: Uint8Array): boolean {
  const start = new TextDecoder('latin1').decode(head.subarray(0, 2000)).trimStart();
  return /^UN[AB]/.test(start) && /UNH.{1,60}MSCONS/s.test(start);
}

/**
 * Whether a file holds a load profile as meters send it.
 * @param head the first bytes
 */
export function isProfileReadout(head: Uint8Array): boolean {
  return /(?:^|[^A-Za-z0-9.])P\.0[12]\(\d{10,13}\)\(/.test(new TextDecoder('latin1').decode(head));
}

/**
 * Whether a file is a workbook, or something that only looks like one.
 * @param head its first bytes
 */
export function isXlsx(head: Uint8Array): boolean {
  return isCompound(head) || [ZIP, EMPTY_ZIP].some((start) => begins(head, start));
}

/**
 * Whether a file is Parquet.
 * @param head its first bytes
 */
export function isParquet(head: Uint8Array): boolean {
  return PARQUET_STARTS.includes(Buffer.from(head.subarray(0, 4)).toString('latin1'));
}

/**
 * Whether a file begins like a message of meter readings.
 * @param head the first bytes
 */
export function isCim(head: Uint8Array): boolean {
  const start = xmlStart(head);
  return /<(?:[\w.-]+:)?MeterReadings[\s>]/.test(start) || /iec\.ch\/TC57\/[^"']*MeterReadings#/i.test(start);
}

/**
 * Whether a file begins like a feed of usage data.
 * @param head the first bytes
 */
export function isEspi(head: Uint8Array): boolean {
  const start = xmlStart(head);
  return /naesb\.org\/espi/i.test(start) || /<(?:[\w.-]+:)?(?:IntervalBlock|UsagePoint)[\s/>]/.test(start);
}

/**
 * Whether a file begins like text that is not XML, be it damaged here and there.
 * @param head the first bytes
 */
export function isPlainText(head: Uint8Array): boolean {
  const start = head.subarray(0, TEXT_HEAD_BYTES);
  let strange = 0;
  for (const byte of start) if (isStrange(byte)) strange++;
  return strange * FEW <= start.length && xmlStart(head) === '';
}

/**
 * Whether a byte is a character that no text holds, such as NUL.
 * @param byte of a file that agrees with ASCII
 */
export function isStrange(byte: number): boolean {
  return byte < 0x09 || (byte > 0x0d && byte < 0x20);
}

/**
 * Whether a file is a compound file, as a workbook with a password or of the older format is.
 * @param head its first bytes
 */
export function isCompound(head: Uint8Array): boolean {
  return begins(head, COMPOUND);
}

function begins(head: Uint8Array, start: readonly number[]): boolean {
  return start.every((byte, index) => head[index] === byte);
}
