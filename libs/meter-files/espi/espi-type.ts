import { InputProblem } from '#libs/engine/index.js';
import { type ReadingType, UNSTATED } from '../reading-type/reading-type.js';
import type { RowProblems } from '../row-problems.js';
import type { XmlElement } from '../xml/walk-xml.js';
import { readWhole } from '../xml/xml-numbers.js';

const CODE = { min: 0, max: 65_535 };
const POWER = { min: -12, max: 12 };
const LENGTH_S = { min: 0, max: 366 * 86_400 };

/** Where each element of a ReadingType goes. */
const FIELDS = new Map<string, keyof ReadingType>([
  ['uom', 'unit'],
  ['powerOfTenMultiplier', 'power'],
  ['flowDirection', 'flowDirection'],
  ['accumulationBehaviour', 'accumulation'],
  ['phase', 'phase'],
  ['commodity', 'commodity'],
  ['dataQualifier', 'qualifier'],
  ['kind', 'measurementKind'],
  ['timeAttribute', 'macroPeriod'],
]);
/** Elements that make a value a part of the whole where they are not 0. */
const PARTS = ['tou', 'consumptionTier', 'cpp', 'numerator'];
/** Billing period, day, month, season, week, specified period; older files write the interval here. */
const MACRO_PERIODS = [8, 11, 13, 22, 24, 32];
const DAY_S = 86_400;

/** A ReadingType of a feed. */
export interface EspiType {
  type: ReadingType;
  /** NaN where the type does not state it [s] */
  intervalS: number;
  /** quality of readings that state none */
  defaultQuality: number;
}

/** Takes the elements of a ReadingType. */
export class EspiTypeParts {
  readonly #type: ReadingType = { ...UNSTATED };
  readonly #seen = new Set<string>();
  #intervalS = Number.NaN;
  #defaultQuality = 0;

  take(element: XmlElement, problems: RowProblems): void {
    const { name, parent, row, column } = element;
    const field = FIELDS.get(name);
    const known = field !== undefined || PARTS.includes(name) || name === 'intervalLength' || name === 'defaultQuality';
    if (!known || parent === 'argument') return;
    if (this.#seen.has(name)) {
      const expected = `one ${name} in a reading type`;
      throw new InputProblem([{ code: 'inconsistent', row, column, expected, found: 'another' }]);
    }
    this.#seen.add(name);
    const range = name === 'powerOfTenMultiplier' ? POWER : name === 'intervalLength' ? LENGTH_S : CODE;
    const value = readWhole(element, range, problems);
    if (Number.isNaN(value)) return;
    if (field !== undefined) Object.assign(this.#type, { [field]: value });
    else if (PARTS.includes(name)) this.#type.partial ||= value !== 0;
    else if (name === 'defaultQuality') this.#defaultQuality = value;
    else if (value > 0) this.#intervalS = value;
  }

  /** The type as it stands when its element ends. */
  close(): EspiType {
    const { macroPeriod } = this.#type;
    const short = this.#intervalS < DAY_S;
    const type = { ...this.#type, macroPeriod: MACRO_PERIODS.includes(macroPeriod) && !short ? macroPeriod : 0 };
    return { type, intervalS: this.#intervalS, defaultQuality: this.#defaultQuality };
  }
}

/** Whether two types say the same. */
export function sameType(a: EspiType, b: EspiType): boolean {
  return (
    JSON.stringify([a.type, a.intervalS, a.defaultQuality]) === JSON.stringify([b.type, b.intervalS, b.defaultQuality])
  );
}
