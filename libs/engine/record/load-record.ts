import { InputProblem, type Problem, type Remark } from '../problem.js';

/**
 * The meter's interval record: one entry an interval that the file holds, missing ones left out.
 * Powers are interval means at the meter. `laggingKvar` and `leadingKvar` are both ≥ 0;
 * a signed column is split at the reader (lagging = max(Q, 0), leading = max(−Q, 0)).
 */
export interface LoadRecord {
  /** length of every interval [s] */
  readonly intervalS: number;
  /** UTC epoch seconds of each interval's beginning, ascending, on the grid firstS + n·intervalS */
  readonly beginS: Float64Array;
  /** mean active power [kW], imported > 0 */
  readonly activeKw: Float64Array;
  /** mean inductive reactive power [kvar], ≥ 0 */
  readonly laggingKvar: Float64Array;
  /** mean capacitive reactive power [kvar], ≥ 0 */
  readonly leadingKvar: Float64Array;
  /** mean line-to-line voltage [V], or null where the file has none */
  readonly voltageV: Float64Array | null;
  /** kvar of an old bank that was connected [kvar], or null */
  readonly connectedKvar: Float64Array | null;
  /** 1 where a standby supply ran, or null */
  readonly standby: Uint8Array | null;
  /** beginning of the first grid slot [s] */
  readonly firstS: number;
  /** end of the last grid slot, exclusive [s] */
  readonly endS: number;
  /** grid slots without a valid interval */
  readonly missing: number;
  /** intervals filled by a repair that was asked for */
  readonly repaired: number;
  /** rows dropped as identical repeats */
  readonly duplicates: number;
  /** what the reader decided, repaired or left out */
  readonly notes: readonly Remark[];
}

/** What a record is made from; absent optional columns are null. */
export interface LoadRecordParts {
  intervalS: number;
  beginS: Float64Array;
  activeKw: Float64Array;
  laggingKvar: Float64Array;
  leadingKvar: Float64Array;
  voltageV?: Float64Array | null;
  connectedKvar?: Float64Array | null;
  standby?: Uint8Array | null;
  repaired?: number;
  duplicates?: number;
  notes?: readonly Remark[];
}

/**
 * Checks the columns once and closes them into a record; nothing after this door holds a NaN.
 * @param parts columns of equal length n ≥ 1, times ascending on one grid
 * @returns the record, its columns shared with `parts`
 * @throws InputProblem where lengths differ, a value is not finite, a reactive column is negative or times leave the grid
 */
export function createLoadRecord(parts: LoadRecordParts): LoadRecord {
  const problems = [...lengthProblems(parts)];
  if (problems.length === 0) problems.push(...timeProblems(parts), ...valueProblems(parts));
  if (problems.length > 0) throw new InputProblem(problems);
  const n = parts.beginS.length;
  const firstS = parts.beginS[0]!;
  const endS = parts.beginS[n - 1]! + parts.intervalS;
  return {
    intervalS: parts.intervalS,
    beginS: parts.beginS,
    activeKw: parts.activeKw,
    laggingKvar: parts.laggingKvar,
    leadingKvar: parts.leadingKvar,
    voltageV: parts.voltageV ?? null,
    connectedKvar: parts.connectedKvar ?? null,
    standby: parts.standby ?? null,
    firstS,
    endS,
    missing: Math.round((endS - firstS) / parts.intervalS) - n,
    repaired: parts.repaired ?? 0,
    duplicates: parts.duplicates ?? 0,
    notes: parts.notes ?? [],
  };
}

function lengthProblems(parts: LoadRecordParts): Problem[] {
  const n = parts.beginS.length;
  const columns = optionalColumns(parts);
  if (n === 0) return [{ code: 'empty-file', expected: 'at least one interval', found: 'none' }];
  return Object.entries(columns)
    .filter(([, values]) => values !== null && values.length !== n)
    .map(([name, values]) => ({
      code: 'wrong-length' as const,
      path: name,
      expected: `${n} values`,
      found: `${values?.length}`,
    }));
}

function optionalColumns(parts: LoadRecordParts): Record<string, Float64Array | Uint8Array | null> {
  return {
    activeKw: parts.activeKw,
    laggingKvar: parts.laggingKvar,
    leadingKvar: parts.leadingKvar,
    voltageV: parts.voltageV ?? null,
    connectedKvar: parts.connectedKvar ?? null,
    standby: parts.standby ?? null,
  };
}

function timeProblems(parts: LoadRecordParts): Problem[] {
  const { beginS, intervalS } = parts;
  if (!(intervalS > 0) || !Number.isFinite(intervalS)) {
    return [{ code: 'out-of-range', path: 'intervalS', expected: 'more than 0', found: `${intervalS}`, unit: 's' }];
  }
  const firstS = beginS[0]!;
  // among whole seconds a step of one interval stays on the grid
  const whole = [intervalS, firstS, beginS[beginS.length - 1]!].every(Number.isSafeInteger);
  for (let i = whole ? firstOffStep(beginS, intervalS) : 0; i < beginS.length; i++) {
    if (whole && i > 0 && beginS[i]! - beginS[i - 1]! === intervalS) continue;
    const stepS = i === 0 ? intervalS : beginS[i]! - beginS[i - 1]!;
    const slot = (beginS[i]! - firstS) / intervalS;
    if (!(stepS >= intervalS) || !Number.isSafeInteger(slot)) {
      return [
        {
          code: 'mixed-intervals',
          row: i + 1,
          expected: `a time ascending on a grid of ${intervalS} s`,
          found: `${beginS[i]}`,
          unit: 's',
        },
      ];
    }
  }
  return [];
}

/** Index of the first moment that is not one interval after the one before it, or the number of moments. */
function firstOffStep(beginS: Float64Array, intervalS: number): number {
  const n = beginS.length;
  let i = 1;
  let before = beginS[0]!;
  // four at a time, which takes half as long as one by one
  for (; i + 3 < n; i += 4) {
    const a = beginS[i]!;
    const b = beginS[i + 1]!;
    const c = beginS[i + 2]!;
    const d = beginS[i + 3]!;
    if (a - before !== intervalS || b - a !== intervalS || c - b !== intervalS || d - c !== intervalS) break;
    before = d;
  }
  while (i < n && beginS[i]! - beginS[i - 1]! === intervalS) i++;
  return i;
}

function valueProblems(parts: LoadRecordParts): Problem[] {
  const signed = new Set(['activeKw']);
  const problems: Problem[] = [];
  for (const [name, values] of Object.entries(optionalColumns(parts))) {
    if (values === null) continue;
    const bad = firstBad(values, signed.has(name) ? -Number.MAX_VALUE : 0);
    if (bad < 0) continue;
    const expected = signed.has(name) ? 'a finite number' : 'a finite number, 0 or more';
    problems.push({ code: 'not-finite', path: name, row: bad + 1, expected, found: `${values[bad]}` });
  }
  return problems;
}

/** Index of the first value that is not finite or below the least there may be, or −1. */
function firstBad(values: Float64Array | Uint8Array, least: number): number {
  const most = Number.MAX_VALUE;
  const n = values.length;
  let i = 0;
  // four at a time, which takes half as long as one by one
  for (; i + 3 < n; i += 4) {
    const a = values[i]!;
    const b = values[i + 1]!;
    const c = values[i + 2]!;
    const d = values[i + 3]!;
    if (!(a >= least && a <= most && b >= least && b <= most)) break;
    if (!(c >= least && c <= most && d >= least && d <= most)) break;
  }
  for (; i < n; i++) if (!(values[i]! >= least && values[i]! <= most)) return i;
  return -1;
}
