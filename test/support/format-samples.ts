import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { ReadOptions } from '#libs/meter-files/meter-format.js';
import { STYLES, serialOf, workbookParts } from './made-workbook.js';
import { madeZip, type ZipPart } from './made-zip.js';
import { type Chance, mutate } from './mutate-file.js';
import { mutateText, mutateTokens } from './mutate-tokens.js';
import { DELIMITED_TEXTS } from './sample-delimited-texts.js';
import { msconsText, nem12Text, profileText } from './sample-messages.js';
import { sampleParquet } from './sample-parquet.js';
import { loadAt, sampleWorkbooks } from './sample-workbooks.js';
import { readMsconsSlowly, readProfileSlowly, type SlowRows } from './slow-message-reading.js';
import { readSlowly, slowText } from './slow-meter-reading.js';
import { readNem12Slowly } from './slow-nem12-reading.js';
import { readDaysSlowly, readParquetSlowly, readQuadrantsSlowly, readSheetSlowly } from './slow-row-reading.js';
import { readCimSlowly, readEspiSlowly } from './slow-xml-reading.js';

/** An independent reading of a file, knowing the codes of the notes on what the reader made of it. */
export type SlowReading = (codes: readonly string[]) => SlowRows | Promise<SlowRows>;

export interface DamagedFile {
  bytes: Uint8Array;
  names: string[];
  /** null where the sample has none */
  slowly: SlowReading | null;
}

/** A valid file, how it is read, and how it is damaged. */
export interface FormatSample {
  name: string;
  bytes: Uint8Array;
  options: ReadOptions;
  /** null where the sample has none */
  slowly: SlowReading | null;
  damage(chance: Chance): DamagedFile;
}

type SlowText = (bytes: Uint8Array, codes: readonly string[]) => SlowRows;

function textSample(
  name: string,
  text: string | Uint8Array,
  slow: SlowText | null,
  options: ReadOptions = {},
): FormatSample {
  const bytes = typeof text === 'string' ? new TextEncoder().encode(text) : text;
  const of = (file: Uint8Array): SlowReading | null => (slow === null ? null : (codes) => slow(file, codes));
  return {
    name,
    bytes,
    options,
    slowly: of(bytes),
    damage: (chance) => {
      const damaged = mutateText(bytes, chance);
      return { ...damaged, slowly: of(damaged.bytes) };
    },
  };
}

const latin1 = (bytes: Uint8Array) => new TextDecoder('latin1').decode(bytes);
const utf8 = (bytes: Uint8Array) => new TextDecoder('utf-8').decode(bytes);
const iso = (momentS: number) => `${new Date(momentS * 1000).toISOString().slice(0, 19)}Z`;
const FIRST_S = Date.UTC(2024, 4, 6) / 1000;
const ROWS = 60;

function espiText(): string {
  const base = '/espi/1_1/resource';
  const link = (rel: string, href: string) => `<link rel="${rel}" href="${base}${href}"/>`;
  const entry = (links: string, content: string) => `<entry>\n${links}\n<content>${content}</content>\n</entry>\n`;
  const channels = [
    { uom: 72, power: 0, flow: 1, value: (row: number) => 4000 + row * 37 },
    { uom: 73, power: 3, flow: 2, value: (row: number) => (row % 9 === 0 ? 0 : 1 + (row % 13) / 8) },
    { uom: 73, power: 3, flow: 3, value: (row: number) => (row % 9 === 0 ? 2.25 : 0) },
  ];
  const entries = channels.map(({ uom, power, flow, value }, k) => {
    const home = `/UsagePoint/1/MeterReading/${k}`;
    const readings = Array.from({ length: ROWS }, (_, row) => {
      const period = `<timePeriod><duration>900</duration><start>${FIRST_S + row * 900}</start></timePeriod>`;
      return `<IntervalReading>${period}<value>${value(row)}</value></IntervalReading>\n`;
    }).join('');
    const type = `<ReadingType><flowDirection>${flow}</flowDirection><powerOfTenMultiplier>${power}</powerOfTenMultiplier><uom>${uom}</uom></ReadingType>`;
    return [
      entry(link('self', home) + link('related', `/ReadingType/${k}`), '<MeterReading/>'),
      entry(link('up', `${home}/IntervalBlock`), `<IntervalBlock>\n${readings}</IntervalBlock>`),
      entry(link('self', `/ReadingType/${k}`), type),
    ].join('');
  });
  return `<?xml version="1.0"?>\n<feed xmlns="http://www.w3.org/2005/Atom" xmlns:espi="http://naesb.org/espi">\n${entries.join('')}</feed>\n`;
}

function cimText(): string {
  const blocks = [
    ['0.0.2.4.1.1.12.0.0.0.0.0.0.0.0.3.72.0', (row: number) => 10 + (row % 29) / 8],
    ['0.0.2.4.2.1.12.0.0.0.0.0.0.0.0.3.73.0', (row: number) => (row % 9 === 0 ? 0 : 5 + (row % 13) / 4)],
    ['0.0.2.4.3.1.12.0.0.0.0.0.0.0.0.0.73.0', (row: number) => (row % 9 === 0 ? 2250 : 0)],
  ] as const;
  const texts = blocks.map(([ref, value]) => {
    const readings = Array.from({ length: ROWS }, (_, row) => {
      const stamp = iso(FIRST_S + (row + 1) * 900);
      return `<IntervalReadings><timeStamp>${stamp}</timeStamp><value>${value(row)}</value></IntervalReadings>\n`;
    });
    return `<IntervalBlocks>\n${readings.join('')}<ReadingType ref="${ref}"/>\n</IntervalBlocks>\n`;
  });
  return `<?xml version="1.0" encoding="UTF-8"?>\n<MeterReadings xmlns="http://iec.ch/TC57/2011/MeterReadings#">\n<MeterReading>\n${texts.join('')}<Meter><mRID>WORKS-1</mRID></Meter>\n</MeterReading>\n</MeterReadings>\n`;
}

function quadrantText(): string {
  const first = Date.UTC(2024, 4, 13, 22) / 1000;
  return Array.from({ length: 120 }, (_, row) => {
    const [year, month, day, hour, minute] = iso(first + (row + 1) * 900).match(/\d+/g)!;
    const energies = [10 + (row % 29) / 4, 0, row % 9 === 0 ? 0 : 3 + (row % 7) / 4, 0, 0, row % 9 === 0 ? 1.25 : 0];
    return `${day}/${month}/${year} ${hour}:${minute};0;${energies.join(';')}\n`;
  }).join('');
}

function daysText(): string {
  const hours = Array.from({ length: 24 }, (_, hour) => hour);
  const header = ['date', 'unit', ...hours.map((hour) => `H${String(hour + 1).padStart(2, '0')}`)];
  const days = Array.from({ length: 6 }, (_, day) => iso(Date.UTC(2024, 6, 14 + day) / 1000).slice(0, 10));
  const rows = days.flatMap((date, day) => [
    [date, 'kWh', ...hours.map((hour) => 40 + hour + day / 8)],
    [date, 'kvarh', ...hours.map((hour) => 10 + (hour % 5) / 4)],
  ]);
  return [header, ...rows].map((cells) => `${cells.join(',')}\n`).join('');
}

/** Texts with an independent reading, at least one of each format of text. */
function readTexts(): FormatSample[] {
  return [
    ...DELIMITED_TEXTS.map(({ name, text, dialect }) =>
      textSample(`csv: ${name}`, text, (bytes, codes) =>
        readSlowly(bytes, codes.includes('stamps-assumed-beginnings') ? { ...dialect, stamp: 'begin' } : dialect),
      ),
    ),
    textSample('csv: days in columns', daysText(), (bytes) => readDaysSlowly(utf8(bytes))),
    textSample('quadrant-rows: made', quadrantText(), (bytes, codes) =>
      readQuadrantsSlowly(slowText(bytes), codes.includes('stamps-assumed-beginnings')),
    ),
    textSample('nem12: made', nem12Text(), (bytes) => readNem12Slowly(new TextDecoder('windows-1252').decode(bytes)), {
      format: 'nem12',
    }),
    textSample('mscons: made', msconsText(), (bytes) => readMsconsSlowly(latin1(bytes)), { format: 'mscons' }),
    textSample('profile-readout: made', profileText(), (bytes) => readProfileSlowly(latin1(bytes)), {
      format: 'profile-readout',
    }),
    textSample('espi: made', espiText(), (bytes) => readEspiSlowly(utf8(bytes))),
    textSample('cim-meter-readings: made', cimText(), (bytes) => readCimSlowly(utf8(bytes))),
  ];
}

const GOLDEN = fileURLToPath(new URL('../golden/meter-files/', import.meta.url));

/** The project's samples that are files, each for a trap of its own. */
function goldenTexts(): FormatSample[] {
  const names = readdirSync(GOLDEN).filter((name) => /\.(?:csv|xml|edi|txt)$/.test(name));
  return names
    .sort()
    .map((name) =>
      textSample(name, new Uint8Array(readFileSync(GOLDEN + name)), null, { siteTimeZone: 'Europe/Berlin' }),
    );
}

const SHEET = 'xl/worksheets/sheet1.xml';
const STRINGS = 'xl/sharedStrings.xml';

/** A workbook whose parts are damaged before they are packed, so that the sums over them are right. */
function partsSample(): FormatSample {
  const serial = (row: number) => ({ serial: serialOf('2024-05-06 00:00') + row / 96, style: STYLES.stamp });
  const rows = Array.from({ length: 96 }, (_, row) => [serial(row), loadAt(row).kw, loadAt(row).kvar]);
  const header = ['interval begin', 'active power [kW]', 'reactive power [kvar]'];
  const parts = workbookParts({ sheets: [{ name: 'Load', rows: [header, ...rows] }] });
  const of = (all: readonly ZipPart[]): SlowReading => {
    const content = (name: string) => String(all.find((part) => part.name === name)?.content);
    return () => readSheetSlowly(content(SHEET), content(STRINGS));
  };
  return {
    name: 'xlsx: parts damaged before they are packed',
    bytes: madeZip(parts),
    options: {},
    slowly: of(parts),
    damage: (chance) => {
      const name = chance.of([SHEET, SHEET, SHEET, STRINGS]);
      const names: string[] = [];
      const damaged = parts.map((part) => {
        if (part.name !== name) return part;
        const changed = mutateTokens(String(part.content), chance);
        names.push(name, ...changed.names);
        return { ...part, content: changed.text };
      });
      return { bytes: madeZip(damaged), names, slowly: of(damaged) };
    },
  };
}

/** A file of bytes; damage that shows in no sum over it reaches the slow reading too. */
function bytesSample(
  name: string,
  bytes: Uint8Array,
  slow: ((bytes: Uint8Array) => Promise<SlowRows>) | null,
): FormatSample {
  const of = (file: Uint8Array): SlowReading | null => (slow === null ? null : () => slow(file));
  return {
    name,
    bytes,
    options: {},
    slowly: of(bytes),
    damage: (chance) => {
      const damaged = mutate(bytes, chance);
      return { ...damaged, slowly: of(damaged.bytes) };
    },
  };
}

/** Valid files of every format, the ones with an independent reading first. */
export function formatSamples(): FormatSample[] {
  return [
    ...readTexts(),
    partsSample(),
    ...sampleParquet().map(({ name, bytes }) => bytesSample(`parquet: ${name}`, bytes, readParquetSlowly)),
    ...sampleWorkbooks().map(({ name, bytes }) => bytesSample(`xlsx: ${name}`, bytes, null)),
    ...goldenTexts(),
  ];
}
