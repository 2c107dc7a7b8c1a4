// Slow and plain readings of MSCONS and of P.01 load profiles, written for samples with energies of one metering point:
// text is cut by regular expressions, values go through exact decimal strings, nothing is shared with the readers.
import { slowMean } from './slow-mean.js';
import { SlowRefusal } from './slow-meter-reading.js';

export interface SlowRows {
  intervalS: number;
  /** kW, lagging kvar, leading kvar by beginning, UTC [s] */
  rows: Map<number, [number, number, number]>;
}

const PLACES: Record<string, 0 | 1 | 2> = { 1: 0, 3: 1, 4: 2, 5: 1, 6: 1, 7: 2, 8: 2 };
const UNITS: Record<string, [family: 'p' | 'q', times: number, over: number, energy: boolean]> = {
  WTT: ['p', 1, 1000, false],
  KWT: ['p', 1, 1, false],
  MAW: ['p', 1000, 1, false],
  WHR: ['p', 1, 1000, true],
  KWH: ['p', 1, 1, true],
  MWH: ['p', 1000, 1, true],
  D44: ['q', 1, 1000, false],
  K5: ['q', 1, 1, false],
  KVR: ['q', 1, 1, false],
  MAR: ['q', 1000, 1, false],
  K3: ['q', 1, 1, true],
  MAH: ['q', 1000, 1, true],
};

/** Values by code and beginning, with the unit they are in. */
type Found = Map<string, { code: string; unit: string; values: Map<number, number> }>;

function rowsOf(found: Found, intervalS: number, unitOf: (unit: string) => (typeof UNITS)[string]): SlowRows {
  const whole = (place: number) => [...found.values()].some(({ code }) => PLACES[code] === place && Number(code) < 5);
  const used = [...found.values()].filter(({ code }) => Number(code) < 5 || !whole(PLACES[code]!));
  const rows = new Map<number, [number, number, number]>();
  const counts = new Map<number, number>();
  for (const { code, unit, values } of used) {
    const [, times, over, energy] = unitOf(unit);
    for (const [beginS, value] of values) {
      if (Number.isNaN(value)) continue;
      const row = rows.get(beginS) ?? [0, 0, 0];
      const kilo = (value * times) / over;
      row[PLACES[code]!] += energy ? slowMean(kilo, intervalS) : kilo;
      rows.set(beginS, row);
      counts.set(beginS, (counts.get(beginS) ?? 0) + 1);
    }
  }
  for (const [beginS, count] of counts) if (count < used.length) rows.delete(beginS);
  return { intervalS, rows };
}

function add(
  found: Found,
  { key, ...entry }: { key: string; code: string; unit: string },
  beginS: number,
  value: number,
) {
  const known = found.get(key) ?? { ...entry, values: new Map<number, number>() };
  if (known.unit !== entry.unit) throw new SlowRefusal(`units ${known.unit} and ${entry.unit} in ${key}`);
  const before = known.values.get(beginS);
  if (before !== undefined && before !== value) throw new SlowRefusal(`two values at ${beginS}`);
  known.values.set(beginS, value);
  found.set(key, known);
}

/** @param text a file whose marks are the usual ones */
// biome-ignore lint/complexity/noExcessiveCognitiveComplexity: one plain loop shows best that nothing is left out
export function readMsconsSlowly(text: string): SlowRows {
  const pieces = text.replace(/^\s*UNA:\+[.,]\? '/, '').match(/(?:\?[\s\S]|[^?'])+'/g) ?? [];
  const found: Found = new Map();
  let intervalS = Number.NaN;
  let code = '';
  let open: { value: number; unit: string; begin: number | null; end: number | null } | null = null;
  const close = () => {
    if (open !== null && open.begin !== null) {
      if (open.end !== null) {
        const lengthS = open.end - open.begin;
        if (!Number.isNaN(intervalS) && intervalS !== lengthS) throw new SlowRefusal(`intervals of ${lengthS} s`);
        intervalS = lengthS;
      }
      const value = open.value;
      add(found, { key: code, code: codeNumber(code), unit: open.unit }, open.begin, value);
    }
    open = null;
  };
  for (const piece of pieces) {
    const elements = piece
      .slice(0, -1)
      .trimStart()
      .replace(/\?([\s\S])/g, (_, char: string) => `\ue000${char.charCodeAt(0)};`)
      .split('+')
      .map((element) =>
        element.split(':').map((part) => part.replace(/\ue000(\d+);/g, (_, n) => String.fromCharCode(+n))),
      );
    const [tag] = elements[0]!;
    if (tag === 'LIN' || tag === 'UNT' || tag === 'UNS' || tag === 'QTY' || tag === 'UNH') close();
    if (tag === 'LIN') code = '';
    if (tag === 'PIA')
      code =
        elements
          .slice(2)
          .map(([id]) => id!)
          .find((id) => id !== '') ?? '';
    if (tag === 'QTY' && PLACES[codeNumber(code)] !== undefined) {
      const [qualifier, value, unit = ''] = elements[1]!;
      if (UNITS[unit.toUpperCase()] === undefined) throw new SlowRefusal(`unit ${unit}`);
      open = {
        value: qualifier === '20' ? Number.NaN : decimal(value!),
        unit: unit.toUpperCase(),
        begin: null,
        end: null,
      };
    }
    if (tag === 'DTM' && open !== null) {
      const [qualifier, time] = elements[1]!;
      if (qualifier === '163') open.begin = moment(time!);
      if (qualifier === '164') open.end = moment(time!);
    }
  }
  close();
  if (Number.isNaN(intervalS)) throw new SlowRefusal('no interval');
  return rowsOf(found, intervalS, (unit) => UNITS[unit]!);
}

/** The number of the quantity in a code that names the total of an interval. */
function codeNumber(code: string): string {
  return /^(?:\d{1,3}-\d{1,3}:)?(\d{1,3})\.(?:4|5|25|29)(?:\.0)?(?:[*&]\d{1,3})?$/.exec(code.trim())?.[1] ?? '';
}

function decimal(text: string): number {
  if (!/^[+-]?\d+(?:[.,]\d*)?$/.test(text)) throw new SlowRefusal(`number ${text}`);
  return Number(text.replace(',', '.'));
}

function moment(text: string): number {
  const parts = /^(\d{4})(\d\d)(\d\d)(\d\d)(\d\d)([+-]\d\d|Z|UTC)?$/.exec(text);
  if (parts === null) throw new SlowRefusal(`time ${text}`);
  const [, year, month, day, hours, minutes, offset = '+00'] = parts;
  const hoursAhead = /\d/.test(offset) ? Number(offset) : 0;
  return Date.UTC(+year!, +month! - 1, +day!, +hours!, +minutes!) / 1000 - hoursAhead * 3600;
}

const SYMBOLS: Record<string, (typeof UNITS)[string]> = {
  w: ['p', 1, 1000, false],
  kw: ['p', 1, 1, false],
  mw: ['p', 1000, 1, false],
  wh: ['p', 1, 1000, true],
  kwh: ['p', 1, 1, true],
  mwh: ['p', 1000, 1, true],
  var: ['q', 1, 1000, false],
  kvar: ['q', 1, 1, false],
  mvar: ['q', 1000, 1, false],
  varh: ['q', 1, 1000, true],
  kvarh: ['q', 1, 1, true],
  mvarh: ['q', 1000, 1, true],
};

/** @param text a read-out in UTC (season 2), standard time (0) or summer time (1) of a zone without offset */
// biome-ignore lint/complexity/noExcessiveCognitiveComplexity: one plain loop shows best that nothing is left out
export function readProfileSlowly(text: string): SlowRows {
  const found: Found = new Map();
  let head: { endS: number; intervalS: number; columns: [string, string][] } | null = null;
  let intervalS = Number.NaN;
  let at = 0;
  for (const raw of text.split('\n')) {
    const line = raw.trim();
    const header = /^(?:.*:)?P\.0[12]\((\d{10,13})\)\(([^)]*)\)\((\d+)\)\((\d+)\)(.*)$/.exec(line);
    if (header !== null) {
      const [, stamp, , minutes, count, rest] = header;
      const pairs = [...rest!.matchAll(/\(([^)]*)\)\(([^)]*)\)/g)].slice(0, Number(count));
      const lengthS = Number(minutes) * 60;
      if (!Number.isNaN(intervalS) && lengthS !== intervalS) throw new SlowRefusal('two interval lengths');
      intervalS = lengthS;
      head = {
        endS: clock(stamp!),
        intervalS: lengthS,
        columns: pairs.map(([, code, unit]) => [code!.trim(), unit!.trim().toLowerCase()]),
      };
      at = 0;
    } else if (line.startsWith('(') && head !== null) {
      const cells = [...line.matchAll(/\(([^()]*)\)/g)].map(([, cell]) => cell!.trim());
      for (let i = 0; i < cells.length; i += head.columns.length) {
        const beginS = head.endS - head.intervalS + at++ * head.intervalS;
        if (head.endS % head.intervalS !== 0) continue;
        for (const [k, [code, unit]] of head.columns.entries()) {
          const number = codeNumber(code);
          if (PLACES[number] === undefined) continue;
          if (SYMBOLS[unit] === undefined) throw new SlowRefusal(`unit ${unit}`);
          const cell = cells[i + k]!.replace(/\*[A-Za-z]+$/, '');
          add(
            found,
            { key: `${code} ${unit}`, code: number, unit },
            beginS,
            /\d/.test(cell) ? decimal(cell) : Number.NaN,
          );
        }
      }
    } else if (line !== '') head = null;
  }
  if (Number.isNaN(intervalS)) throw new SlowRefusal('no head');
  return rowsOf(found, intervalS, (unit) => SYMBOLS[unit]!);
}

function clock(stamp: string): number {
  const season = stamp.length % 2 === 1 ? stamp[0] : '2';
  const digits = stamp.length % 2 === 1 ? stamp.slice(1) : stamp;
  const [year = 0, month = 1, day = 1, hours = 0, minutes = 0, seconds = 0] = digits.match(/\d\d/g)!.map(Number);
  return Date.UTC(2000 + year, month - 1, day, hours, minutes, seconds) / 1000 - (season === '1' ? 3600 : 0);
}
