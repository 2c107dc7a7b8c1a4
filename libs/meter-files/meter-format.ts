import type { MeterMap } from '#libs/contract/meter-map.js';
import type { LoadRecord, Watch } from '#libs/engine/index.js';
import type { MeterBytes } from './meter-bytes.js';
import type { Quality } from './record/quality.js';

/** What a caller may say about a meter file. */
export interface ReadOptions {
  /** name of a row of the table of formats; without it the file is recognised by its first bytes */
  format?: string;
  /** what a person says about the file; it wins over whatever the reader would find out */
  map?: MeterMap;
  /** zone of local stamps: IANA name or fixed offset; wins over the map's */
  timeZone?: string;
  /** the site's zone, taken for local stamps where nothing else is said */
  siteTimeZone?: string;
  /** hears of the progress where `sizeBytes` is known; may stop the reading */
  watch?: Watch;
  /** size of the file, for the progress [bytes] */
  sizeBytes?: number;
}

/** A record and how good the file behind it was. */
export interface MeterReading {
  record: LoadRecord;
  quality: Quality;
}

/** A row of the table of formats. */
export interface MeterFormat {
  /** what `--format` takes */
  name: string;
  title: string;
  /** where the format is publicly described */
  described: readonly string[];
  /** @param head the first bytes of the file, without a byte order mark */
  recognises(head: Uint8Array): boolean;
  read(bytes: MeterBytes, options: ReadOptions): Promise<MeterReading>;
}

/** Longest record that is read: ten years of one-minute intervals and a month. */
export const MAX_INTERVALS = 5_300_000;
