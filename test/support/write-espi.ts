import type { LoadRecord } from '#libs/engine/index.js';

/** Codes of ESPI for the three columns of a record: active net of export, reactive of either sign. */
const COLUMNS = [
  { column: 'activeKw', uom: 38, flow: 4 },
  { column: 'laggingKvar', uom: 63, flow: 2 },
  { column: 'leadingKvar', uom: 63, flow: 3 },
] as const;

/** How a feed is written; every way means the same. */
export interface EspiForm {
  /** power of ten of the unit, W or var; the values become whole numbers of it */
  power: number;
  /** prefix of the elements, or empty */
  prefix: string;
  /** intervals in a block */
  perBlock: number;
  /** each reading with its own time */
  timed: boolean;
}

/** A record as an ESPI feed, one meter reading a column. */
export function writeEspi(record: LoadRecord, form: EspiForm): string {
  const { prefix } = form;
  const name = (local: string) => (prefix === '' ? local : `${prefix}:${local}`);
  const xmlns = prefix === '' ? 'xmlns' : `xmlns:${prefix}`;
  const resource = (local: string, links: string, content: string) =>
    `<entry>${links}<content><${name(local)} ${xmlns}="http://naesb.org/espi">${content}</${name(local)}></content></entry>\n`;
  const leaf = (local: string, value: number) => `<${name(local)}>${value}</${name(local)}>`;
  const entries = COLUMNS.flatMap(({ column, uom, flow }, k) => {
    const type = leaf('flowDirection', flow) + leaf('powerOfTenMultiplier', form.power) + leaf('uom', uom);
    return [
      ...blocksOf(record, form).map(({ from, to }) => {
        const times = { startS: record.beginS[from]!, durationS: (to - from) * record.intervalS };
        const interval = leaf('duration', times.durationS) + leaf('start', times.startS);
        const readings = Array.from(record[column].subarray(from, to), (kilo, i) => {
          const period = leaf('duration', record.intervalS) + leaf('start', record.beginS[from + i]!);
          const time = form.timed ? `<${name('timePeriod')}>${period}</${name('timePeriod')}>` : '';
          const value = leaf('value', Math.round(kilo * 10 ** (3 - form.power)));
          return `<${name('IntervalReading')}>${time}${value}</${name('IntervalReading')}>\n`;
        });
        const content = `<${name('interval')}>${interval}</${name('interval')}>${readings.join('')}`;
        return resource('IntervalBlock', linkOf('up', `/MeterReading/${k}/IntervalBlock`), content);
      }),
      resource('ReadingType', linkOf('self', `/ReadingType/${k}`), type),
      resource('MeterReading', linkOf('self', `/MeterReading/${k}`) + linkOf('related', `/ReadingType/${k}`), ''),
    ];
  });
  return `<?xml version="1.0"?>\n<feed xmlns="http://www.w3.org/2005/Atom">\n${entries.join('')}</feed>\n`;
}

function linkOf(rel: string, href: string): string {
  return `<link rel="${rel}" href="${href}"/>`;
}

/** Stretches of a record without a gap, none longer than a block. */
function blocksOf({ beginS, intervalS }: LoadRecord, { perBlock }: EspiForm): { from: number; to: number }[] {
  const blocks: { from: number; to: number }[] = [];
  for (let i = 0; i < beginS.length; i++) {
    const open = blocks.at(-1);
    const goesOn = open !== undefined && i - open.from < perBlock && beginS[i]! - beginS[i - 1]! === intervalS;
    if (goesOn) open.to = i + 1;
    else blocks.push({ from: i, to: i + 1 });
  }
  return blocks;
}
