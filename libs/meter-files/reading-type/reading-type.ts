/**
 * What the readings of a series are, by the code lists of IEC 61968-9, which ESPI shares.
 * 0 is "not applicable" in every list, and stands for whatever a file leaves out.
 */
export interface ReadingType {
  /** unit of measure, before the power of ten */
  unit: number;
  /** power of ten of the unit */
  power: number;
  flowDirection: number;
  accumulation: number;
  phase: number;
  commodity: number;
  /** average, maximum and the like */
  qualifier: number;
  measurementKind: number;
  /** period that the value tells of as a whole: billing period, day, season */
  macroPeriod: number;
  /** whether the value is that of a harmonic, a tariff period, a consumption tier or a critical peak only */
  partial: boolean;
}

/** A reading type of which nothing is said. */
export const UNSTATED: Readonly<ReadingType> = {
  unit: 0,
  power: 0,
  flowDirection: 0,
  accumulation: 0,
  phase: 0,
  commodity: 0,
  qualifier: 0,
  measurementKind: 0,
  macroPeriod: 0,
  partial: false,
};

export type Family = 'active' | 'reactive' | 'voltage';

/** What the values of a series are to the record. */
export type ValueForm = 'energy' | 'power' | 'register';

interface Unit {
  name: string;
  /** null where the record has no use for it */
  family: Family | null;
  energy: boolean;
}

const UNITS = new Map<number, Unit>([
  [29, { name: 'V', family: 'voltage', energy: false }],
  [38, { name: 'W', family: 'active', energy: false }],
  [61, { name: 'VA', family: null, energy: false }],
  [63, { name: 'var', family: 'reactive', energy: false }],
  [71, { name: 'VAh', family: null, energy: true }],
  [72, { name: 'Wh', family: 'active', energy: true }],
  [73, { name: 'varh', family: 'reactive', energy: true }],
]);

const FLOWS = new Map([
  [1, 'forward'],
  [2, 'lagging'],
  [3, 'leading'],
  [4, 'net'],
  [5, 'Q1+Q2'],
  [7, 'Q1+Q3'],
  [8, 'Q1+Q4'],
  [9, 'Q1−Q4'],
  [10, 'Q2+Q3'],
  [11, 'Q2+Q4'],
  [12, 'Q2−Q3'],
  [13, 'Q3+Q4'],
  [14, 'Q3−Q2'],
  [15, 'Q1'],
  [16, 'Q2'],
  [17, 'Q3'],
  [18, 'Q4'],
  [19, 'reverse'],
  [20, 'total'],
  [21, 'total by phase'],
]);

/** Codes of all conductors of a supply together, whatever its kind. */
const ALL_PHASES = [0, 41, 97, 193, 224, 225, 768, 769, 1248, 1249, 2272, 2273, 6369, 10_465, 17_153];
/** Codes of a phase by itself, with or without neutral. */
const PHASES = new Map([
  [128, 'A'],
  [129, 'A'],
  [64, 'B'],
  [65, 'B'],
  [32, 'C'],
  [33, 'C'],
]);

const ACCUMULATIONS = new Map([
  [1, 'register'],
  [2, 'continuous cumulative'],
  [3, 'cumulative'],
  [6, 'indicating'],
  [9, 'summation'],
  [10, 'time delay'],
  [12, 'instantaneous'],
  [13, 'latching'],
  [14, 'bounded'],
]);

/** Not applicable, average, normal, sum; the others tell of an extreme. */
const QUALIFIERS = [0, 2, 12, 26];
/** Not applicable, electricity as the meter has it, electricity behind instrument transformers. */
const COMMODITIES = [0, 1, 2];
/** Distortion, losses, sequences, total harmonic distortion: they have the unit of power and are not the load. */
const OTHER_KINDS = [10, 31, 32, 33, 36, 47, 48];
const REGISTERS = [1, 3, 9];
const SAMPLES = [6, 12];

/**
 * The quantity of a reading type.
 * @returns null where the record has no use for it
 */
export function familyOf({ unit }: ReadingType): Family | null {
  return UNITS.get(unit)?.family ?? null;
}

/**
 * The phase of a reading type.
 * @returns A, B or C for one phase of several, the code for other parts of a supply; null for all of it together
 */
export function phaseOf({ phase }: ReadingType): string | null {
  return ALL_PHASES.includes(phase) ? null : (PHASES.get(phase) ?? `${phase}`);
}

/**
 * What the values are.
 * @param type the reading type
 * @returns null for maxima, tariff periods, harmonics, losses, sums of demands and whatever else is no load in time
 */
export function formOf(type: ReadingType): ValueForm | null {
  const unit = UNITS.get(type.unit);
  const whole = !type.partial && type.macroPeriod === 0 && QUALIFIERS.includes(type.qualifier);
  const load = COMMODITIES.includes(type.commodity) && !OTHER_KINDS.includes(type.measurementKind);
  if (unit === undefined || unit.family === null || !whole || !load) return null;
  if (!unit.energy) return isMean(type) || isSample(type) ? 'power' : null;
  if (REGISTERS.includes(type.accumulation)) return 'register';
  return isMean(type) ? 'energy' : null;
}

/** Values of the whole interval, or nothing said to the contrary. */
function isMean({ accumulation }: ReadingType): boolean {
  return accumulation === 0 || accumulation === 4;
}

/** @returns whether values are taken at a moment and not over an interval */
export function isSample({ accumulation, qualifier }: ReadingType): boolean {
  return SAMPLES.includes(accumulation) && qualifier !== 2;
}

/**
 * A reading type in words, for notes and refusals.
 * @param type the reading type
 */
export function describeType(type: ReadingType): string {
  const phase = phaseOf(type);
  const parts = [
    UNITS.get(type.unit)?.name ?? `unit ${type.unit}`,
    type.flowDirection === 0 ? '' : (FLOWS.get(type.flowDirection) ?? `flow ${type.flowDirection}`),
    ACCUMULATIONS.get(type.accumulation) ?? '',
    phase === null ? '' : `phase ${phase}`,
    COMMODITIES.includes(type.commodity) ? '' : 'not electricity',
    QUALIFIERS.includes(type.qualifier) ? '' : `qualifier ${type.qualifier}`,
    OTHER_KINDS.includes(type.measurementKind) ? `kind ${type.measurementKind}` : '',
    type.macroPeriod === 0 ? '' : `period ${type.macroPeriod}`,
    type.partial ? 'part' : '',
  ];
  return parts.filter((part) => part !== '').join(' ');
}
