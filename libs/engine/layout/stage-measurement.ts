import { InputProblem, type Problem } from '../problem.js';
import type { StageGroup, StageMeasurementInput, Three } from './bank.js';
import { deltaCapacitanceUf, stageOhm } from './stage.js';

/** What a measurement says of a stage. */
export interface MeasuredStage {
  /** ΣC over the nameplate's, as a share */
  capacitanceFactor: number;
  /** of the capacitor at its rated voltage and the site's frequency [kvar] */
  ratedKvar: number;
  /** the three elements as they are connected: delta 1–2, 2–3, 3–1, or star 1, 2, 3 [µF] */
  elementUf: Three;
  /** greatest less least element, of their mean [%] */
  unbalancePct: number;
}

/** What a measurement is read with. */
export interface MeasurementBasis {
  nominalV: number;
  frequencyHz: number;
  /** `bank.connection` of the site file */
  connection?: 'delta' | 'star' | 'earthedStar';
}

/** A hand-held instrument reads to within this share; common practice. Less than that below nothing is nothing. */
const READING_SHARE = 0.03;
/** A bus that is in service lies within these shares of its nominal voltage, and of its frequency. */
const VOLTAGE_SHARE = { least: 0.7, most: 1.3 };
const FREQUENCY_SHARE = { least: 0.9, most: 1.1 };
/** New capacitors have up to 1.10 of their nameplate; half as much again is another unit's reading. */
const MOST_FACTOR = 1.5;

/**
 * The capacitance of a stage from a measurement, exact for three unlike elements.
 *
 * Line currents of a three-wire stage close to a triangle with sides I₁, I₂, I₃ and area Δ. With x, y, z the currents
 * between lines 1–2, 2–3, 3–1: (x+y+z)² = (I₁²+I₂²+I₃²)/2 + 2√3·Δ and x = (s + (I₁²+I₂²−2·I₃²)/s)/3, s = x+y+z. As
 * susceptances x/U they are turned to a star, the reactor's X_L = p·X_C taken off each line, and turned back.
 * Capacitances between terminals give the star by 1/C₁ = (1/C₁₂ + 1/C₃₁ − 1/C₂₃)/2, and the delta from it.
 * @param measurement what was read
 * @param group nameplate of the stage
 * @param basis nominal voltage and frequency of the site
 * @param path of the measurement in the site file
 * @returns capacitance, kvar at rated voltage, elements
 * @throws InputProblem naming the field that contradicts itself or can't be
 * @source derived: |I₁|² = x² + z² + x·z of two susceptances whose voltages are 60° apart; s is the sum of distances of a
 *   triangle's Fermat point
 */
export function readMeasurement(
  measurement: StageMeasurementInput,
  group: StageGroup,
  basis: MeasurementBasis,
  path: string,
): MeasuredStage {
  const problems = formProblems(measurement, basis, path);
  if (problems.length > 0) throw new InputProblem(problems);
  const { lineA, terminalUf } = measurement;
  const deltaUf =
    lineA === undefined
      ? deltaOfTerminals(terminalUf!, `${path}.terminalUf`)
      : deltaOfCurrents(lineA, measurement.busV!, reactorOf(measurement, group, basis), `${path}.lineA`);
  const nameplateUf = deltaCapacitanceUf(group, basis.frequencyHz);
  const capacitanceFactor = total(deltaUf) / (3 * nameplateUf);
  if (!(capacitanceFactor <= MOST_FACTOR)) {
    const expected = `at most ${MOST_FACTOR} times the nameplate’s ${nameplateUf} µF a delta phase: another unit’s reading, or another stage’s`;
    const found = `${capacitanceFactor} times`;
    throw new InputProblem([{ code: 'inconsistent', path: `${path}.${fieldOf(measurement)}`, expected, found }]);
  }
  const connection = measurement.connection ?? basis.connection ?? 'delta';
  const elementUf = connection === 'delta' ? deltaUf : starOfDelta(deltaUf);
  return {
    capacitanceFactor,
    ratedKvar: group.ratedKvar * capacitanceFactor,
    elementUf,
    unbalancePct: (100 * (Math.max(...elementUf) - Math.min(...elementUf))) / (total(elementUf) / 3),
  };
}

function fieldOf({ lineA }: StageMeasurementInput): 'lineA' | 'terminalUf' {
  return lineA === undefined ? 'terminalUf' : 'lineA';
}

function formProblems(given: StageMeasurementInput, basis: MeasurementBasis, path: string): Problem[] {
  const { lineA, terminalUf, busV, frequencyHz, connection } = given;
  const missing = (field: string, expected: string): Problem => ({
    code: 'missing',
    path: `${path}.${field}`,
    expected,
    found: 'nothing',
  });
  if (lineA === undefined && terminalUf === undefined) {
    return [missing('lineA', 'three line currents, or terminalUf with three capacitances')];
  }
  const contradicted = (field: string, expected: string, found: string): Problem => ({
    code: 'inconsistent',
    path: `${path}.${field}`,
    expected,
    found,
  });
  const problems: Problem[] = [];
  if (lineA !== undefined && terminalUf !== undefined) {
    problems.push(contradicted('terminalUf', 'one of lineA and terminalUf in a measurement', 'both'));
  }
  if (lineA !== undefined && busV === undefined) problems.push(missing('busV', 'the bus voltage beside the currents'));
  if (lineA === undefined && connection === undefined && basis.connection === undefined) {
    problems.push(missing('connection', '"delta", "star" or "earthedStar", here or as bank.connection'));
  }
  if (connection !== undefined && basis.connection !== undefined && connection !== basis.connection) {
    problems.push(contradicted('connection', `bank.connection, "${basis.connection}"`, `"${connection}"`));
  }
  problems.push(
    ...shareProblems(busV, basis.nominalV, VOLTAGE_SHARE, { path: `${path}.busV`, unit: 'V' }),
    ...shareProblems(frequencyHz, basis.frequencyHz, FREQUENCY_SHARE, { path: `${path}.frequencyHz`, unit: 'Hz' }),
  );
  return problems;
}

function shareProblems(
  value: number | undefined,
  of: number,
  { least, most }: { least: number; most: number },
  place: { path: string; unit: string },
): Problem[] {
  if (value === undefined || (value >= least * of && value <= most * of)) return [];
  const expected = `between ${least * of} and ${most * of}, as a bus in service has`;
  return [{ code: 'out-of-range', ...place, expected, found: `${value}` }];
}

/** The reactor in each line at the frequency of the reading: its reactance, and ω. */
interface LineReactor {
  inductiveOhm: number;
  omega: number;
}

// The reactor's inductance is the nameplate's; its reactance goes with the frequency.
function reactorOf(given: StageMeasurementInput, group: StageGroup, basis: MeasurementBasis): LineReactor {
  const frequencyHz = given.frequencyHz ?? basis.frequencyHz;
  const { inductiveOhm } = stageOhm(group);
  return {
    inductiveOhm: (inductiveOhm * frequencyHz) / basis.frequencyHz,
    omega: 2 * Math.PI * frequencyHz,
  };
}

function deltaOfCurrents(lineA: Three, busV: number, { inductiveOhm, omega }: LineReactor, path: string): Three {
  const between = currentsBetween(lineA, path);
  const siemens = between.map((a) => a / busV) as Three;
  return withoutReactor(siemens, inductiveOhm).map((s) => (s / omega) * 1e6) as Three;
}

function currentsBetween([a, b, c]: Three, path: string): Three {
  const most = Math.max(a, b, c);
  const slack = READING_SHARE * most;
  if (!(most > 0)) {
    const expected = 'currents that flow: a stage that is dead is left out of the bank';
    throw new InputProblem([{ code: 'out-of-range', path, expected, found: 'none', unit: 'A' }]);
  }
  const sides = [-a + b + c, a - b + c, a + b - c];
  if (sides.some((side) => side < -slack)) {
    const expected =
      'three currents that add up to nothing, as in three wires: none greater than the other two together';
    throw new InputProblem([{ code: 'inconsistent', path, expected, found: [a, b, c].join(', '), unit: 'A' }]);
  }
  const heron = sides.reduce((product, side) => product * Math.max(side, 0), a + b + c);
  const area = Math.sqrt(heron) / 4;
  const s = Math.sqrt((a * a + b * b + c * c) / 2 + 2 * Math.sqrt(3) * area);
  const element = (one: number, other: number, third: number): number =>
    (s + (one * one + other * other - 2 * third * third) / s) / 3;
  const between: Three = [element(a, b, c), element(b, c, a), element(c, a, b)];
  if (between.some((one) => one < -READING_SHARE * s)) {
    const expected = 'currents that three capacitors can draw: one of the three would be less than nothing';
    throw new InputProblem([{ code: 'inconsistent', path, expected, found: [a, b, c].join(', '), unit: 'A' }]);
  }
  return between.map((one) => Math.max(one, 0)) as Three;
}

// A stage with one line dead is a single pair of terminals with two reactors in series.
function withoutReactor(siemens: Three, inductiveOhm: number): Three {
  if (inductiveOhm === 0) return siemens;
  const alive = siemens.filter((one) => one > READING_SHARE * total(siemens));
  if (alive.length === 1) return siemens.map((s) => (s === alive[0] ? 1 / (1 / s + 2 * inductiveOhm) : 0)) as Three;
  const star = starOfDelta(siemens).map((y) => 1 / (1 / y + inductiveOhm)) as Three;
  return deltaOfStar(star);
}

function deltaOfTerminals(terminalUf: Three, path: string): Three {
  const [m12, m23, m31] = terminalUf.map((uf) => 1 / uf) as Three;
  const inverse: Three = [(m12 + m31 - m23) / 2, (m12 + m23 - m31) / 2, (m23 + m31 - m12) / 2];
  if (inverse.some((one) => !(one > 0))) {
    const expected = 'three capacitances that three capacitors can show: one of the three would be less than nothing';
    throw new InputProblem([{ code: 'inconsistent', path, expected, found: terminalUf.join(', '), unit: 'µF' }]);
  }
  return deltaOfStar(inverse.map((one) => 1 / one) as Three);
}

function deltaOfStar([y1, y2, y3]: Three): Three {
  const sum = y1 + y2 + y3;
  return [(y1 * y2) / sum, (y2 * y3) / sum, (y3 * y1) / sum];
}

// Y₁ = (x·y + y·z + z·x)/y, the element opposite to the line.
function starOfDelta([x, y, z]: Three): Three {
  const products = x * y + y * z + z * x;
  const least = Number.EPSILON * total([x, y, z]);
  return [products / Math.max(y, least), products / Math.max(z, least), products / Math.max(x, least)];
}

function total([a, b, c]: Three): number {
  return a + b + c;
}
