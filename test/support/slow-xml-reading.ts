// Slow and plain readings of ESPI feeds and CIM messages, written for samples with one active and two reactive channels in
// UTC: tags are cut out by a regular expression, the tree is held whole, nothing is shared with the readers.
import { slowMean } from './slow-mean.js';
import type { SlowRows } from './slow-message-reading.js';
import { SlowRefusal } from './slow-meter-reading.js';

/** What the slow reading was not written for: it has no verdict. */
export class SlowUnsure extends Error {}

interface Node {
  name: string;
  attributes: Map<string, string>;
  nodes: Node[];
  text: string;
}

const PIECE = /<!--[\s\S]*?-->|<!\[CDATA\[([\s\S]*?)\]\]>|<\?[\s\S]*?\?>|<\/?[^<>]*>|[^<]+/g;

function plain(text: string): string {
  if (/&(?!lt;|gt;|amp;|quot;|apos;)/.test(text)) throw new SlowUnsure('a reference to a character');
  const known: Record<string, string> = { lt: '<', gt: '>', quot: '"', apos: "'", amp: '&' };
  return text.replace(/&(\w+);/g, (_, name: string) => known[name]!);
}

function nodeOf(tag: string): Node {
  const name = /^<(?:[^\s/>:]*:)?([^\s/>]+)/.exec(tag)?.[1] ?? '';
  const attributes = [...tag.matchAll(/([\w:.-]+)\s*=\s*(?:"([^"]*)"|'([^']*)')/g)];
  const pairs = attributes.map(([, key, a, b]) => [key!, plain(a ?? b ?? '')] as const);
  return { name, attributes: new Map(pairs), nodes: [], text: '' };
}

function treeOf(text: string): Node {
  const root: Node = { name: '', attributes: new Map(), nodes: [], text: '' };
  const open = [root];
  for (const [piece, data] of text.replace(/^\ufeff/, '').matchAll(PIECE)) {
    const top = open.at(-1)!;
    if (data !== undefined) top.text += data;
    else if (/^<[!?]/.test(piece)) continue;
    else if (piece.startsWith('</')) open.pop();
    else if (piece.startsWith('<')) {
      const node = nodeOf(piece);
      top.nodes.push(node);
      if (!piece.endsWith('/>')) open.push(node);
    } else top.text += plain(piece);
    if (open.length === 0) throw new SlowRefusal('an end without a beginning');
  }
  if (open.length > 1) throw new SlowRefusal(`${open.at(-1)!.name} has no end`);
  return root;
}

function all({ nodes }: Node, name: string): Node[] {
  return nodes.flatMap((node) => [...(node.name === name ? [node] : []), ...all(node, name)]);
}

const child = (node: Node | undefined, name: string) => node?.nodes.findLast((other) => other.name === name);
const textOf = (node: Node | undefined) => (node === undefined || node.nodes.length > 0 ? '' : node.text.trim());

function numberOf(text: string): number {
  if (text === '') return Number.NaN;
  if (!/^[-+]?(?:\d+\.?\d*|\.\d+)(?:e[-+]?\d+)?$/i.test(text)) throw new SlowRefusal(`number ${text}`);
  return Number(text) + 0;
}

/** Readings of one channel. */
interface Series {
  unit: number;
  power: number;
  flow: number;
  values: Map<number, number>;
  lengths: Set<number>;
}

function add({ values }: Series, beginS: number, value: number): void {
  const known = values.get(beginS);
  if (known !== undefined && !Object.is(known, value)) throw new SlowRefusal(`two values at ${beginS}`);
  values.set(beginS, value);
}

/** Rows of an active channel (import or net) with a lagging and a leading one. */
function rowsOf(series: readonly Series[]): SlowRows {
  const filled = series.filter(({ values }) => values.size > 0);
  const lengths = new Set(filled.flatMap((one) => [...one.lengths]));
  if (lengths.size !== 1) throw new SlowUnsure('intervals of other lengths');
  const [intervalS = 0] = lengths;
  const one = (units: number[], flows: number[]) => {
    const fits = filled.filter(({ unit, flow }) => units.includes(unit) && flows.includes(flow));
    if (fits.length !== 1) throw new SlowUnsure(`${fits.length} channels for one quantity`);
    return fits[0]!;
  };
  const used = [one([38, 72], [1, 4]), one([63, 73], [2]), one([63, 73], [3])];
  if (used.length !== filled.length) throw new SlowUnsure('more channels than are used');
  const rows = new Map<number, [number, number, number]>();
  for (const beginS of used[0]!.values.keys()) {
    const row = used.map(({ unit, power, values }) => {
      const over = power < 3 ? 10 ** (3 - power) : 1;
      const kilo = ((values.get(beginS) ?? Number.NaN) * (power > 3 ? 10 ** (power - 3) : 1)) / over;
      return unit > 71 ? slowMean(kilo, intervalS) : kilo;
    });
    if (!row.some(Number.isNaN)) rows.set(beginS, row as [number, number, number]);
  }
  return { intervalS, rows };
}

const pathOf = (href: string) =>
  href
    .trim()
    .replace(/^\w+:\/\/[^/]*/, '')
    .replace(/\/$/, '');

function linksOf(entry: Node, rel: string): string[] {
  return entry.nodes
    .filter(({ name, attributes }) => name === 'link' && attributes.get('rel') === rel)
    .map(({ attributes }) => pathOf(attributes.get('href') ?? ''));
}

/** @param text a feed of one usage point whose entries are linked by paths without a host */
export function readEspiSlowly(text: string): SlowRows {
  const entries = all(treeOf(text), 'entry');
  const kinds = entries.map((entry) => child(child(entry, 'content'), 'ReadingType'));
  const series = new Map<string, Series>();
  entries.forEach((entry) => {
    if (child(child(entry, 'content'), 'MeterReading') === undefined) return;
    const related = linksOf(entry, 'related');
    const at = entries.findIndex(
      (other, i) => kinds[i] && linksOf(other, 'self').some((self) => related.includes(self)),
    );
    const [self] = linksOf(entry, 'self');
    const type = kinds[at];
    if (type === undefined || self === undefined) throw new SlowUnsure('a link is lost');
    if (series.has(self)) throw new SlowUnsure('two meter readings of one link');
    const whole = (name: string) => {
      if (all(type, name).length !== 1) throw new SlowUnsure(`${name} not once`);
      return numberOf(textOf(child(type, name)));
    };
    const [unit, power, flow] = [whole('uom'), whole('powerOfTenMultiplier'), whole('flowDirection')];
    series.set(self, { unit, power, flow, values: new Map(), lengths: new Set() });
  });
  for (const entry of entries) {
    for (const block of all(entry, 'IntervalBlock')) {
      const home = linksOf(entry, 'up').map((up) => series.get(up.replace(/\/IntervalBlock$/, '')));
      if (home.length !== 1 || home[0] === undefined) throw new SlowUnsure('a block without a home');
      for (const reading of all(block, 'IntervalReading')) addEspi(home[0], reading);
    }
  }
  return rowsOf([...series.values()]);
}

function addEspi(series: Series, reading: Node): void {
  const period = child(reading, 'timePeriod');
  const beginS = numberOf(textOf(child(period, 'start')));
  const lengthS = numberOf(textOf(child(period, 'duration')));
  if (Number.isNaN(beginS) || Number.isNaN(lengthS)) throw new SlowUnsure('a reading without a time');
  series.lengths.add(lengthS);
  add(series, beginS, numberOf(textOf(child(reading, 'value'))));
}

/** @param text a message of one meter whose readings are stamped in UTC at their ends, in quarters of an hour */
export function readCimSlowly(text: string): SlowRows {
  const root = treeOf(text);
  const meters = all(root, 'MeterReading').map((meter) => textOf(child(child(meter, 'Meter'), 'mRID')));
  if (new Set(meters).size !== 1) throw new SlowUnsure('several meters');
  const series = new Map<string, Series>();
  for (const block of all(root, 'IntervalBlocks')) {
    const ref = child(block, 'ReadingType')?.attributes.get('ref') ?? '';
    const codes = ref.split('.').map(Number);
    const expected = [0, 0, 2, 4, codes[4]!, 1, 12, 0, 0, 0, 0, 0, 0, 0, 0, codes[15]!, codes[16]!, 0];
    if (codes.join() !== expected.join()) throw new SlowUnsure(`type ${ref}`);
    const known = series.get(ref) ?? {
      flow: codes[4]!,
      power: codes[15]!,
      unit: codes[16]!,
      values: new Map(),
      lengths: new Set([900]),
    };
    series.set(ref, known);
    for (const reading of all(block, 'IntervalReadings')) addCim(known, reading);
  }
  return rowsOf([...series.values()]);
}

function addCim(series: Series, reading: Node): void {
  if (reading.nodes.some(({ name }) => !['timeStamp', 'value'].includes(name)))
    throw new SlowUnsure('more of a reading');
  const stamp = textOf(child(reading, 'timeStamp'));
  const endS = /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\dZ$/.test(stamp) ? Date.parse(stamp) / 1000 : Number.NaN;
  if (Number.isNaN(endS)) throw new SlowUnsure(`stamp ${stamp}`);
  add(series, endS - 900, numberOf(textOf(child(reading, 'value'))));
}
