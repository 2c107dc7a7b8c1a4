import { InputProblem } from '#libs/engine/index.js';
import type { Quantity } from '../record/build-columns.js';
import { FLOW_SCHEMES } from './flow-schemes.js';
import {
  describeType,
  type Family,
  familyOf,
  formOf,
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

/**
 * Chooses the series that make up a record, so that nothing counts twice: of the same quantity the shortest intervals,
 * energies before powers before registers, the sum of the phases where it is given, and one way of splitting by direction.
 * @param all series of one meter
 * @returns those of each quantity; none where no way is complete
 */
export function chooseSeries(all: readonly Series[]): ChosenSeries[] {
  return (['active', 'reactive', 'voltage'] as const).flatMap((family) => {
    for (const form of FORMS) {
      const candidates = all.filter(({ type }) => familyOf(type) === family && formOf(type) === form);
      const chosen = chooseOfFamily(oneCommodity(shortest(candidates)), family);
      if (chosen.length > 0) return chosen.map((part) => ({ ...part, form }));
    }
    return [];
  });
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

function chooseOfFamily(series: readonly Series[], family: Family): Part[] {
  const whole = schemeOf(
    series.filter(({ type }) => phaseOf(type) === null),
    family,
  );
  // phases against neutral don't add up to a voltage
  if (whole.length > 0 || family === 'voltage') return whole;
  const phases = ['A', 'B', 'C'].map((phase) =>
    schemeOf(
      series.filter(({ type }) => phaseOf(type) === phase),
      family,
    ),
  );
  const given = phases.filter((parts) => parts.length > 0);
  return given.length === 2 ? [] : given.flat();
}

function schemeOf(series: readonly Series[], family: Family): Part[] {
  for (const scheme of FLOW_SCHEMES[family]) {
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
  const expected = `${describeType(type)} with a power of ten of ${type.power}, as in row ${readings.rowNumber[0]}`;
  const row = other.readings.rowNumber[0]!;
  throw new InputProblem([{ code: 'inconsistent', row, expected, found: `${other.type.power}` }]);
}
