import { InputProblem } from '#libs/engine/index.js';
import { RowProblems } from '../row-problems.js';
import type { XmlElement, XmlVisitor } from '../xml/walk-xml.js';
import { EspiBlockParts, EspiBlocks } from './espi-blocks.js';
import { type EspiType, EspiTypeParts } from './espi-type.js';

/** More meter readings than any file of one site has, and more days of them. */
const MOST_ENTRIES = 1000;
const MOST_HOMES = 50_000;
const MOST_LINKS = 1000;
const LONGEST_NAME = 80;

/** An entry of the feed and the links by which others find it. */
export interface EspiEntry {
  self: string | null;
  up: string[];
  related: string[];
  title: string;
  row: number;
  /** meter readings in the feed before it */
  after: number;
}

export interface TypeEntry extends EspiEntry, EspiType {}

export interface UsageEntry extends EspiEntry {
  /** by its service category; not gas, water or heat */
  electric: boolean;
}

/** Blocks whose links lead to one place. */
export interface BlockEntry extends EspiEntry {
  blocks: EspiBlocks;
  /** entries of the feed that are gathered here */
  entries: number;
}

type ResourceName = 'UsagePoint' | 'MeterReading' | 'ReadingType' | 'IntervalBlock';
const RESOURCES: readonly string[] = ['UsagePoint', 'MeterReading', 'ReadingType', 'IntervalBlock'];

/** Gathers the resources of a feed, entry by entry. */
export class EspiFeed implements XmlVisitor {
  readonly usagePoints: UsageEntry[] = [];
  readonly meterReadings: EspiEntry[] = [];
  readonly readingTypes: TypeEntry[] = [];
  readonly blocks = new Map<string, BlockEntry>();
  readonly problems = new RowProblems();
  #entry: EspiEntry | null = null;
  #resource: ResourceName | null = null;
  #kind: ResourceName | null = null;
  #implicit = false;
  #type: EspiTypeParts | null = null;
  #block: EspiBlockParts | null = null;
  #blocks = new EspiBlocks();
  #electric = true;

  opened(element: XmlElement): void {
    const { name, parent, attributes } = element;
    if (this.#resource === null && name === 'entry') this.#begin(element);
    else if (this.#resource === null && name === 'link' && parent === 'entry') this.#link(attributes);
    else if (this.#resource === null && RESOURCES.includes(name)) this.#openResource(name as ResourceName, element);
    else if (this.#resource === 'IntervalBlock') this.#block?.open(element);
  }

  closed(element: XmlElement): void {
    const { name, parent, text } = element;
    if (this.#resource !== null) this.#take(element, this.#resource);
    else if (name === 'title' && parent === 'entry' && this.#entry !== null)
      this.#entry.title = text.slice(0, LONGEST_NAME);
    else if (name === 'entry') this.#end();
  }

  #begin({ row }: { row: number }): void {
    this.#entry = { self: null, up: [], related: [], title: '', row, after: this.meterReadings.length };
    this.#kind = null;
    this.#implicit = false;
    this.#blocks = new EspiBlocks();
  }

  #link({ rel = '', href = '' }: Readonly<Record<string, string>>): void {
    const entry = this.#entry;
    if (entry === null || href === '') return;
    const path = pathOf(href);
    if (rel === 'self') entry.self = path;
    else if (rel === 'up' && entry.up.length < MOST_LINKS) entry.up.push(path);
    else if (rel === 'related' && entry.related.length < MOST_LINKS) entry.related.push(path);
  }

  /** A resource that stands in no entry is one by itself. */
  #openResource(name: ResourceName, element: XmlElement): void {
    if (this.#entry === null) {
      this.#begin(element);
      this.#implicit = true;
    }
    this.#resource = name;
    this.#kind = name;
    if (name === 'ReadingType') this.#type = new EspiTypeParts();
    if (name === 'IntervalBlock') this.#block = new EspiBlockParts(element.row);
    if (name === 'UsagePoint') this.#electric = true;
  }

  #take(element: XmlElement, resource: ResourceName): void {
    const { name, parent, text } = element;
    if (name === resource) {
      this.#resource = null;
      if (name === 'IntervalBlock') this.#block?.closeInto(this.#blocks, this.problems);
      if (this.#implicit) this.#end();
    } else if (resource === 'ReadingType') this.#type?.take(element, this.problems);
    else if (resource === 'IntervalBlock') this.#block?.take(element, this.problems);
    else if (resource === 'UsagePoint' && name === 'kind' && parent === 'ServiceCategory')
      this.#electric = text === '0';
  }

  #end(): void {
    const entry = this.#entry;
    this.#entry = null;
    if (entry === null || this.#kind === null) return;
    if (this.#kind === 'UsagePoint') this.usagePoints.push({ ...entry, electric: this.#electric });
    else if (this.#kind === 'MeterReading') this.meterReadings.push(entry);
    else if (this.#kind === 'IntervalBlock') this.#endBlocks(entry);
    else if (this.#type !== null) this.readingTypes.push({ ...entry, ...this.#type.close() });
    const counts = [this.usagePoints.length, this.meterReadings.length, this.readingTypes.length];
    if (Math.max(...counts) <= MOST_ENTRIES && this.blocks.size <= MOST_HOMES) return;
    const expected = `at most ${MOST_ENTRIES} meter readings with ${MOST_HOMES} blocks by different links`;
    throw new InputProblem([{ code: 'too-large', row: entry.row, expected, found: 'more' }]);
  }

  #endBlocks(entry: EspiEntry): void {
    if (this.#blocks.readings.count === 0) return;
    const key = homeOf(entry);
    const known = this.blocks.get(key) ?? { ...entry, blocks: new EspiBlocks(), entries: 0 };
    this.blocks.set(key, known);
    known.entries++;
    known.blocks.append(this.#blocks);
  }
}

/** Where blocks belong together: links under one meter reading, or none at all behind one. */
function homeOf({ self, up, after }: EspiEntry): string {
  if (self === null && up.length === 0) return `after ${after}`;
  const home = [...up, self?.slice(0, self.lastIndexOf('/')) ?? ''].join(' ');
  return /\/MeterReading\/[^/]+/i.test(home) ? home : `${home} ${self}`;
}

/** A link without host and query, as feeds write it both ways. */
function pathOf(href: string): string {
  return href
    .trim()
    .replace(/^[a-z][a-z0-9+.-]*:\/\/[^/]*/i, '')
    .replace(/[?#].*$/, '')
    .replace(/\/+$/, '');
}
