import type { EstimateResult, Result } from '#libs/engine/index.js';

/** A value of a table; nothing where the result has none. */
type Value = number | string | boolean | null;

/** A part of a result as a table: keys of the result as heads, their unit their last word. */
export interface ResultTable {
  name: string;
  heads: string[];
  rows: Value[][];
}

type Entry = Record<string, unknown>;

/**
 * The calculation sheet: every figure with its formula, the values put in, and its source.
 * @param result plan or judgement, in words
 * @returns one row a figure
 */
export function calculationTable({ figures }: Pick<Result, 'figures'>): ResultTable {
  const rows = figures.map(({ inputs, ...figure }) => ({
    ...figure,
    inputs: inputs.map(({ symbol, value, unit }) => `${symbol} = ${value}${unit === '' ? '' : ` ${unit}`}`).join('; '),
  }));
  return table('calculation', rows);
}

/**
 * Every part of a plan as a table, the calculation sheet last; numbers in full precision.
 * @param result plan or judgement, in words
 * @returns tables; parts that a result has none of are left out
 */
export function planTables(result: Result | EstimateResult): ResultTable[] {
  const { bank, network, duties, devices, charge, inrush, ageing } = result;
  const lists: [string, readonly object[]][] = [
    ['stages', bank.stages],
    ['duties', duties],
    ['devices', devices],
    ['charge', charge.stages],
    ['inrush', inrush.stages],
    ['ageing', ageing.cases],
    ['levels', network.levels],
    [
      'orders',
      network.levels.flatMap(({ orders, ...level }) => orders.map((order) => ({ ...placeOf(level), ...order }))),
    ],
    ...monthLists(result),
    ['findings', 'findings' in result ? (result.findings as object[]) : []],
    ['assumptions', result.assumptions],
  ];
  const tables = lists.filter(([, entries]) => entries.length > 0).map(([name, entries]) => table(name, entries));
  return [summaryTable(result), ...tables, calculationTable(result)];
}

function placeOf({
  bus,
  levelKvar,
  case: at,
}: Result['network']['levels'][number] | Omit<Result['network']['levels'][number], 'orders'>) {
  return { bus, levelKvar, case: at };
}

function monthLists(result: Result | EstimateResult): [string, readonly object[]][] {
  const need: [string, readonly object[]] = ['need', result.requirement.months];
  if (result.record === null) return [need];
  return [need, ['months', result.operation.months], ['hours', result.operation.hoursAtLevel]];
}

/** Single numbers and words of a result, by their path. */
function summaryTable(result: Result | EstimateResult): ResultTable {
  const rows = Object.entries(result).flatMap(([part, value]) => leaves(part, value));
  return { name: 'summary', heads: ['path', 'value'], rows };
}

function leaves(path: string, value: unknown): Value[][] {
  if (isValue(value)) return [[path, value]];
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return [];
  return Object.entries(value).flatMap(([key, member]) => leaves(`${path}.${key}`, member));
}

function table(name: string, entries: readonly object[]): ResultTable {
  const flat = entries.map((entry) => flattened(entry as Entry));
  const heads = [...new Set(flat.flatMap((row) => Object.keys(row)))];
  return { name, heads, rows: flat.map((row) => heads.map((head) => row[head] ?? null)) };
}

/** Members of members go by their path; lists of entries have tables of their own. */
function flattened(entry: Entry, before = ''): Record<string, Value> {
  return Object.fromEntries(
    Object.entries(entry).flatMap(([key, value]): [string, Value][] => {
      if (isValue(value)) return [[`${before}${key}`, value]];
      if (typeof value !== 'object' || value === null || Array.isArray(value)) return [];
      return Object.entries(flattened(value as Entry, `${before}${key}.`));
    }),
  );
}

function isValue(value: unknown): value is Value {
  return value === null || ['number', 'string', 'boolean'].includes(typeof value);
}
