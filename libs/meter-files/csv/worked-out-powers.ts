import type { PowerFactorSign, VoltageBetween } from '#libs/contract/meter-map.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';

/** Columns in kW, kVA, V and A, one a phase where there are three; what the file lacks is null. */
export interface MeasuredPowers {
  activeKw: readonly Float64Array[] | null;
  apparentKva: readonly Float64Array[] | null;
  powerFactor: readonly Float64Array[] | null;
  voltageV: readonly Float64Array[] | null;
  currentA: readonly Float64Array[] | null;
}

/** How the columns are to be understood. */
export interface PowerRules {
  /** what a negative power factor says */
  sign: PowerFactorSign;
  between: VoltageBetween | null;
  /** rows that count, and where each stands in the file */
  kept: Int32Array;
  rowNumber: Int32Array;
  /** nobody needs the columns afterwards, so that kW and kvar may take their place */
  spare: boolean;
  /** what the columns of the power factor show as a whole */
  factor: FactorFacts | null;
  /** what rounding may take from a kVA in each phase, where it has been found before [kVA] */
  slackKva: readonly number[] | null;
  /** column of the apparent power, counted from 1; for messages */
  apparentColumn: number;
}

/** What columns of the power factor show as a whole. */
export interface FactorFacts {
  /** what they are divided by */
  scale: 1 | 100;
  /** of each, whether its numbers tell lagging from leading: any is below zero, or their cells say it */
  signed: readonly boolean[];
}

/** Powers worked out, one a row; NaN where a row does not give them. */
export interface WorkedOutPowers {
  activeKw: Float64Array;
  /** lagging positive */
  reactiveKvar: Float64Array;
  /** every interval is taken as lagging, because nothing tells leading ones apart */
  unsigned: boolean;
  /** the power factor was written in percent */
  percent: boolean;
  /** see PowerRules */
  slackKva: readonly number[];
}

const MOST_PROBLEMS = 20;

/**
 * Works out kW and kvar: S = √3·U·I (U line to line) or 3·U·I, P = S·λ, |Q| = √(S² − P²) or |P|·√(1/λ² − 1).
 * Three phases are worked out each and added.
 * @param measured what the file holds
 * @param rules how it is understood
 * @returns kW and kvar
 * @throws InputProblem where a kVA is less than its kW, naming row and column
 */
export function workedOutPowers(measured: MeasuredPowers, rules: PowerRules): WorkedOutPowers {
  const { scale, signed: signs } = rules.factor ?? { scale: 1, signed: [] };
  const phases = phasesOf(measured, rules, scale);
  const total = roomFor(phases, rules);
  const slackKva = rules.slackKva ?? phases.map((phase) => slackOf(phase, rules));
  const problems = phases.flatMap((phase, i) => shortRows(phase, slackKva[i]!, rules)).slice(0, MOST_PROBLEMS);
  if (problems.length > 0) throw new InputProblem(problems);
  for (const [i, phase] of phases.entries()) addPhaseInto(total, phase, { ...rules, first: i === 0 });
  const signed = phases.some(({ lambda }, phase) => lambda !== null && signs[phase]);
  return {
    ...total,
    unsigned: !signed || rules.sign === 'negativeExports',
    percent: scale !== 1,
    slackKva,
  };
}

/** Columns of one phase, or of all three together; without `s` there is `p`. */
interface PhaseColumns {
  p: Float64Array | null;
  s: Float64Array | null;
  lambda: Float64Array | null;
}

type Powers = Pick<WorkedOutPowers, 'activeKw' | 'reactiveKvar'>;

function addPhaseInto(
  total: Powers,
  { p, s, lambda }: PhaseColumns,
  { kept, sign, first }: PowerRules & { first: boolean },
): void {
  const { activeKw, reactiveKvar } = total;
  for (const row of kept) {
    const factor = lambda?.[row] ?? null;
    const { kw, kvar } = ofRow(p?.[row] ?? null, s?.[row] ?? null, factor);
    const exports = sign === 'negativeExports' && isNegative(factor);
    activeKw[row] = (first ? 0 : activeKw[row]!) + (exports ? -Math.abs(kw) : kw);
    reactiveKvar[row] = (first ? 0 : reactiveKvar[row]!) + (leads(factor, sign) ? -kvar : kvar);
  }
}

/** Columns for the powers: of a single phase the outermost of its own, where they may be written to. */
function roomFor([phase, ...others]: readonly PhaseColumns[], { spare, rowNumber }: PowerRules): Powers {
  const own = [phase!.p, phase!.s, phase!.lambda].filter((column) => column !== null);
  if (spare && others.length === 0 && own.length > 1) return { activeKw: own[0]!, reactiveKvar: own.at(-1)! };
  return { activeKw: new Float64Array(rowNumber.length), reactiveKvar: new Float64Array(rowNumber.length) };
}

function isNegative(factor: number | null): boolean {
  return factor !== null && factor < 0;
}

function leads(factor: number | null, sign: PowerFactorSign): boolean {
  if (factor === null || sign === 'negativeExports') return false;
  return sign === 'negativeLeads' ? factor < 0 : factor > 0;
}

/** kW and the size of kvar of one row; a row whose factor is missing has no sign, and no value. */
function ofRow(p: number | null, s: number | null, lambda: number | null): { kw: number; kvar: number } {
  const size = lambda === null ? 1 : Math.abs(lambda);
  if (s === null) return { kw: p!, kvar: kvarAt(p!, size) };
  const kw = p ?? s * size;
  // a rounded kVA may lie just under its kW; a size that is no number leaves none
  return { kw, kvar: Math.sqrt(Math.max(s * s - kw * kw, 0)) + 0 * size };
}

/** |P|·√(1/λ² − 1); at a standstill instruments show a factor of 0. */
function kvarAt(kw: number, size: number): number {
  if (kw === 0) return 0 * size;
  return size === 0 ? Number.NaN : Math.abs(kw) * Math.sqrt(1 / (size * size) - 1);
}

function slackOf({ p, s }: PhaseColumns, { kept }: PowerRules): number {
  return p === null || s === null ? 0 : stepOf(p, kept) + stepOf(s, kept);
}

/** Rows whose kVA are less than their kW by more than rounding can make them. */
function shortRows({ p, s }: PhaseColumns, slackKva: number, rules: PowerRules): Problem[] {
  if (p === null || s === null) return [];
  const short = rules.kept.filter((row) => s[row]! < Math.abs(p[row]!) * (1 - 1e-9) - slackKva);
  return Array.from(short.subarray(0, MOST_PROBLEMS), (row) => ({
    code: 'out-of-range' as const,
    row: rules.rowNumber[row]!,
    ...(rules.apparentColumn > 0 ? { column: rules.apparentColumn } : {}),
    expected: `at least the active power of the row, ${Math.abs(p[row]!)} kW`,
    found: `${s[row]} kVA`,
    unit: 'kVA',
  }));
}

/** As many columns of each quantity as there are phases; voltage and current become apparent power. */
function phasesOf(measured: MeasuredPowers, rules: PowerRules, scale: number): PhaseColumns[] {
  const { activeKw, powerFactor } = measured;
  const apparentKva = measured.apparentKva ?? (measured.currentA === null ? null : voltAmperes(measured, rules));
  const lambdas = powerFactor?.map((values) => (scale === 1 ? values : values.map((value) => value / scale))) ?? null;
  const groups = [activeKw, apparentKva, lambdas].filter((group) => group !== null);
  const alike = groups.every(({ length }) => length === groups[0]!.length);
  if (!alike) {
    const whole = (group: readonly Float64Array[] | null) => (group === null ? null : sumOf(group));
    return [{ p: whole(activeKw), s: whole(apparentKva), lambda: lambdas?.[0] ?? null }];
  }
  return groups[0]!.map((_, phase) => ({
    p: activeKw?.[phase] ?? null,
    s: apparentKva?.[phase] ?? null,
    lambda: lambdas?.[phase] ?? null,
  }));
}

/** S of each phase U_LN·I; of one current for all three √3·U_LL·I [kVA]. */
function voltAmperes({ voltageV, currentA }: MeasuredPowers, { between }: PowerRules): Float64Array[] {
  const root = between === 'lineToLine' ? Math.sqrt(3) : 1;
  return currentA!.map((current, phase) => {
    const voltage = voltageV![phase] ?? voltageV![0]!;
    const lines = currentA!.length === 3 ? 1 : 3;
    return current.map((a, row) => ((lines * voltage[row]!) / root) * (a / 1000));
  });
}

/**
 * Columns added row by row; NaN where one of them has no value.
 * @param columns of one length
 */
export function sumOf(columns: readonly Float64Array[]): Float64Array {
  const [first, ...others] = columns;
  if (others.length === 0) return first!;
  const sum = Float64Array.from(first!);
  for (const column of others) for (let i = 0; i < sum.length; i++) sum[i]! += column[i]!;
  return sum;
}

const LOOK_ROWS = 2000;

/** The last digit that a column is written to: half of it is what rounding may have taken or added. */
function stepOf(values: Float64Array, kept: Int32Array): number {
  for (let digits = 0; digits < 6; digits++) {
    const power = 10 ** digits;
    const isWritten = (row: number) => {
      const scaled = values[row]! * power;
      return (
        Number.isNaN(scaled) || Math.abs(scaled - Math.round(scaled)) < 1e-6 * Math.max(1, Math.abs(scaled) * 1e-6)
      );
    };
    if (kept.subarray(0, LOOK_ROWS).every(isWritten)) return 0.5 / power;
  }
  return 0;
}
