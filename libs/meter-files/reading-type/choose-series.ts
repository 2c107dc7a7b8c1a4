import { InputProblem } from '#libs/engine/index.js';
import type { Quantity } from '../record/build-columns.js';
import { FLOW_SCHEMES, type FlowScheme, LEADING_FLOWS } from './flow-schemes.js';
import {
  describeType,
  type Family,
  familyOf,
  formOf,
  isSample,
  phaseOf,
  type ReadingType,
  type ValueForm,
} from './reading-type.js';
import type { TimedReadings } from './timed-readings.js';

/** Readings of one kind of one meter. */
export interface Series {
  type: ReadingType;
  readings: TimedReadings;
  /** length of its intervals; NaN where neither file nor stamps tell [s] */
  intervalS: number;
}

/** A series that becomes part of the record. */
export interface ChosenSeries {
  series: Series;
  quantity: Quantity;
  form: ValueForm;
  negative: boolean;
}

const FORMS: readonly ValueForm[] = ['energy', 'power', 'register'];
/** Longest intervals that are preferred to shorter ones because they tell leading kvar [s]. */
const LONGEST_LOAD_S = 3600;

interface Way {
  /** means and registers only, no values of a moment */
  means: boolean;
  /** with leading kvar told apart, by their sign or by a series of their own */
  leading: boolean;
}

const WAYS: readonly Way[] = [
  { means: true, leading: true },
  { means: true, leading: false },
  { means: false, leading: false },
];

/**
 * Chooses the series that make up a record, so that nothing counts twice: all of one length of interval, leading kvar with
 * them where the file has them, of that the shortest; means before values of a moment; and of each quantity one way of
 * splitting it by direction, one that tells both directions first, in one form throughout where it can be (energies before
 * powers before registers), else each direction in its own. Phases add up where their sum is not given.
 * @param all series of one meter
 * @returns those of each quantity; none where no way is complete
 */
export function chooseSeries(all: readonly Series[]): ChosenSeries[] {
  const candidates = all.filter(({ type }) => formOf(type) !== null);
  const lengths = [...new Set(candidates.map(({ intervalS }) => intervalS))].filter(Number.isFinite);
  lengths.sort((a, b) => a - b);
  for (const way of WAYS) {
    for (const intervalS of lengths) {
      const chosen = chosenOf(candidates.filter((series) => series.intervalS === intervalS && fits(series, way)));
      if (isWhole(chosen) && (!way.leading || (intervalS <= LONGEST_LOAD_S && tellsLeading(chosen)))) return chosen;
    }
  }
  return chosenOf(candidates);
}

/**
 * Which of the series that are left out tell leading kvar, where those that are chosen tell none.
 * @param chosen the series of the record
 * @param all series of the meter
 */
export function leadingLeftOut(chosen: readonly ChosenSeries[], all: readonly Series[]): readonly Series[] {
  if (tellsLeading(chosen)) return [];
  return all.filter(({ type }) => formOf(type) !== null && isLeading(type));
}

function fits({ type }: Series, { means }: Way): boolean {
  return !means || !isSample(type) || familyOf(type) === 'voltage';
}

function isWhole(chosen: readonly ChosenSeries[]): boolean {
  const has = (...quantities: Quantity[]) => chosen.some(({ quantity }) => quantities.includes(quantity));
  return has('active') && has('lagging', 'reactive');
}

function tellsLeading(chosen: readonly ChosenSeries[]): boolean {
  return chosen.some(({ series }) => isLeading(series.type));
}

function isLeading(type: ReadingType): boolean {
  return familyOf(type) === 'reactive' && LEADING_FLOWS.includes(type.flowDirection);
}

function chosenOf(candidates: readonly Series[]): ChosenSeries[] {
  return (['active', 'reactive', 'voltage'] as const).flatMap((family) => {
    const series = candidates.filter(({ type }) => familyOf(type) === family);
    const means = series.filter(({ type }) => !isSample(type));
    const ofMeans = chooseOfFamily(means, family);
    return ofMeans.length > 0 ? ofMeans : chooseOfFamily(series, family);
  });
}

function chooseOfFamily(series: readonly Series[], family: Family): ChosenSeries[] {
  const pools = [...FORMS.map((form) => series.filter(({ type }) => formOf(type) === form)), firstForms(series)];
  for (const schemes of FLOW_SCHEMES[family]) {
    for (const pool of pools) {
      const parts = partsOf(oneCommodity(shortest(pool)), family, schemes);
      if (parts.length > 0) return parts.map((part) => ({ ...part, form: formOf(part.series.type)! }));
    }
  }
  return [];
}

/** Of each direction of each phase the first form that there is. */
function firstForms(series: readonly Series[]): readonly Series[] {
  const rankOf = ({ type }: Series) => FORMS.indexOf(formOf(type)!);
  const alike = ({ type: a }: Series, { type: b }: Series) =>
    a.flowDirection === b.flowDirection && phaseOf(a) === phaseOf(b);
  return series.filter((each) => !series.some((other) => alike(each, other) && rankOf(other) < rankOf(each)));
}

function shortest(series: readonly Series[]): readonly Series[] {
  const intervalS = series.reduce((least, each) => Math.min(least, each.intervalS), Number.POSITIVE_INFINITY);
  return Number.isFinite(intervalS) ? series.filter((each) => each.intervalS === intervalS) : series;
}

/** Values behind the instrument transformers, where both are given. */
function oneCommodity(series: readonly Series[]): readonly Series[] {
  const primary = series.filter(({ type }) => type.commodity === 2);
  return primary.length > 0 ? primary : series;
}

type Part = Omit<ChosenSeries, 'form'>;

function partsOf(series: readonly Series[], family: Family, schemes: readonly FlowScheme[]): Part[] {
  const whole = schemeOf(
    series.filter(({ type }) => phaseOf(type) === null),
    schemes,
  );
  // phases against neutral don't add up to a voltage
  if (whole.length > 0 || family === 'voltage') return whole;
  const phases = ['A', 'B', 'C'].map((phase) =>
    schemeOf(
      series.filter(({ type }) => phaseOf(type) === phase),
      schemes,
    ),
  );
  const given = phases.filter((parts) => parts.length > 0);
  return given.length === 2 ? [] : given.flat();
}

function schemeOf(series: readonly Series[], schemes: readonly FlowScheme[]): Part[] {
  for (const scheme of schemes) {
    const parts: Part[] = [];
    let whole = true;
    for (const { flows, quantity, optional, negativeFlow } of scheme) {
      const flow = flows.find((code) => series.some(({ type }) => type.flowDirection === code));
      // another of the same direction tells the same again
      const found = series.find(({ type }) => type.flowDirection === flow);
      if (found === undefined) whole &&= optional === true;
      else parts.push({ series: found, quantity, negative: flow === negativeFlow });
    }
    if (!whole) continue;
    for (const part of parts) refuseOtherPower(series, part.series);
    return parts;
  }
  return [];
}

/** The same quantity in kWh here and in Wh there: one of the powers of ten may be an error by a thousand. */
function refuseOtherPower(all: readonly Series[], { type, readings }: Series): void {
  const alike = (other: ReadingType) =>
    JSON.stringify({ ...other, power: 0 }) === JSON.stringify({ ...type, power: 0 });
  const other = all.find((each) => each.type.power !== type.power && alike(each.type));
  if (other === undefined) return;
  const expected = `${describeType(type)} with a power of ten of ${type.power}, as in row ${readings.rowNumber.at(0)}`;
  const row = other.readings.rowNumber.at(0);
  throw new InputProblem([{ code: 'inconsistent', row, expected, found: `${other.type.power}` }]);
}
