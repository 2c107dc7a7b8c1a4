import type { Duty } from '../duty/duty-row.js';
import type { Verdict } from '../duty/rules.js';
import type { Result } from '../plan/result.js';

/** Figures that are held against each other. */
export const CHANGE_FIGURES = [
  'verdict',
  'need.maxKvar',
  'need.p95Kvar',
  'need.meanKvar',
  'record.powerFactor',
  'record.maxKw',
  'operation.lowestPowerFactor',
  'operation.monthsBelow',
  'operation.shareInTargetPct',
  'operation.switchingsPerDay',
  'money.billPerDay',
  'money.savingPerYear',
  'bank.effectiveKvar',
  'network.shortCircuitMva',
  'network.shortCircuitMinMva',
  'network.voltageDistortionPct',
  'network.currentDistortionPct',
  'duty',
] as const;

/** One figure before and after. */
export interface ResultChange {
  id: (typeof CHANGE_FIGURES)[number];
  /** of a duty; null for other figures */
  name: string | null;
  /** entry of the site's own `bank.stages`, null for the bank as a whole */
  group: number | null;
  /** null where the figure did not exist */
  before: number | Verdict | null;
  after: number | Verdict | null;
  unit: string;
  /** after, where there is one */
  limit: number | null;
  verdictBefore: Verdict | null;
  verdictAfter: Verdict | null;
}

/** A result, and where the entries of its bank come from. */
export interface Compared {
  result: Result;
  ofGroup: readonly number[];
}

/** Figures closer than this share are the same: the last digits of two sums. */
const SAME_SHARE = 1e-9;

/**
 * What changed between two results of one site, in numbers: need, power factor, operations, cost, distortion, duties,
 * verdict. What did not change is left out.
 * @param before earlier result
 * @param after later result
 * @returns changed figures, in the order of `CHANGE_FIGURES`; none where nothing changed
 * @source method-reevaluation
 */
export function resultChanges(before: Compared, after: Compared): ResultChange[] {
  const [old, now] = [figuresOf(before), figuresOf(after)];
  const keys = [...new Set([...old.keys(), ...now.keys()])];
  const rank = (key: string): number => CHANGE_FIGURES.indexOf(key.split('|')[0] as ResultChange['id']);
  return keys
    .sort((a, b) => rank(a) - rank(b))
    .flatMap((key) => {
      const [was, is] = [old.get(key) ?? null, now.get(key) ?? null];
      const head = (is ?? was)!;
      if (same(was?.value ?? null, is?.value ?? null) && was?.verdict === is?.verdict) return [];
      return [
        {
          id: head.id,
          name: head.name,
          group: head.group,
          before: was?.value ?? null,
          after: is?.value ?? null,
          unit: head.unit,
          limit: is?.limit ?? null,
          verdictBefore: was?.verdict ?? null,
          verdictAfter: is?.verdict ?? null,
        },
      ];
    });
}

function same(a: number | Verdict | null, b: number | Verdict | null): boolean {
  if (typeof a !== 'number' || typeof b !== 'number') return a === b;
  return Math.abs(a - b) <= SAME_SHARE * Math.max(Math.abs(a), Math.abs(b));
}

interface FigureRow {
  id: ResultChange['id'];
  name: string | null;
  group: number | null;
  value: number | Verdict | null;
  unit: string;
  limit: number | null;
  verdict: Verdict | null;
}

function figuresOf({ result, ofGroup }: Compared): Map<string, FigureRow> {
  const { record, requirement, operation, network, money, bank, verdict } = result;
  const days = (record.intervals * record.intervalS) / 86_400;
  const factors = operation.months.flatMap(({ powerFactorLagging: of }) => (of === null ? [] : [of]));
  const below = factors.filter((factor) => factor < requirement.targetPowerFactor * (1 - 1e-12)).length;
  const most = (of: 'voltageDistortionPct' | 'currentDistortionPct'): number =>
    Math.max(0, ...network.levels.map((level) => level[of]));
  const values: [ResultChange['id'], number | Verdict | null, string][] = [
    ['verdict', verdict, ''],
    ['need.maxKvar', requirement.maxKvar, 'kvar'],
    ['need.p95Kvar', requirement.p95Kvar, 'kvar'],
    ['need.meanKvar', requirement.meanKvar, 'kvar'],
    ['record.powerFactor', record.powerFactorLagging, ''],
    ['record.maxKw', record.maxKw, 'kW'],
    ['operation.lowestPowerFactor', factors.length === 0 ? null : Math.min(...factors), ''],
    ['operation.monthsBelow', below, ''],
    ['operation.shareInTargetPct', operation.shareInTargetPct, '%'],
    ['operation.switchingsPerDay', operation.totalSwitchings / days, ''],
    ['money.billPerDay', money === null ? null : money.bills.after.total / days, ''],
    ['money.savingPerYear', money?.savingPerYear ?? null, ''],
    ['bank.effectiveKvar', bank.effectiveKvar, 'kvar'],
    ['network.shortCircuitMva', network.shortCircuitMva, 'MVA'],
    ['network.shortCircuitMinMva', network.shortCircuitMinMva, 'MVA'],
    ['network.voltageDistortionPct', most('voltageDistortionPct'), '%'],
    ['network.currentDistortionPct', most('currentDistortionPct'), '%'],
  ];
  const rows = new Map<string, FigureRow>(
    values.map(([id, value, unit]) => [id, { id, name: null, group: null, value, unit, limit: null, verdict: null }]),
  );
  for (const duty of result.duties) takeDuty(rows, duty, duty.group === null ? null : ofGroup[duty.group]!);
  return rows;
}

// Parts of one group that measure unlike are one row, the one with the greatest ratio.
function takeDuty(rows: Map<string, FigureRow>, duty: Duty, group: number | null): void {
  const { name, value, unit, limit, verdict } = duty;
  const key = `duty|${name}|${group}`;
  const known = rows.get(key);
  const share = (of: { value: unknown; limit: number | null }): number =>
    of.limit === null ? 0 : Number(of.value) / of.limit;
  if (known !== undefined && share(known) >= share(duty)) return;
  rows.set(key, { id: 'duty', name, group, value, unit, limit, verdict });
}
