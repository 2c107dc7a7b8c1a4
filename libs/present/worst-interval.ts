import { type Figure, needFigure, type Outcome, tanFromPowerFactor } from '#libs/engine/index.js';
import { workingOf } from './figure-words.js';
import { say } from './language.js';

/** One interval worked step by step. */
export interface WorkedInterval {
  beginS: number;
  /** true where it is the one that misses the target by most, false where none does */
  misses: boolean;
  /** label, formula, working, value and unit of every step; a step without a formula was measured */
  steps: Pick<Figure, 'label' | 'formula' | 'working' | 'value' | 'unit'>[];
}

type Input = readonly [symbol: string, value: number, unit: string];

/**
 * The worst interval of the record worked in full at the bus; where none misses the target, that of greatest need.
 * @param outcome the plan or judgement
 * @returns its steps, each with the values put in
 */
export function workedInterval(outcome: Outcome): WorkedInterval {
  const { series, result, site } = outcome;
  const worst = result.operation.worstIntervals[0];
  const at = worst === undefined ? greatest(series.needKvar) : series.beginS.indexOf(worst.beginS);
  const p = site.onExport === 'absolute' ? Math.abs(series.busKw[at]!) : Math.max(0, series.busKw[at]!);
  const q = series.busKvar[at]!;
  const b = series.connectedKvar[at]!;
  const set = result.control.setPointPowerFactor;
  const tanSet = tanFromPowerFactor(set);
  const need = needFigure('', site, { activeKw: series.busKw[at]!, reactiveKvar: q, needKvar: series.needKvar[at]! });
  const smallest = Math.min(...result.bank.stages.map((stage) => stage.effectiveKvar));
  const steps = [
    measured(say`active power at the bus`, p, 'kW'),
    measured(say`reactive power of the load at the bus`, q, 'kvar'),
    measured(say`connected by the bank`, b, 'kvar'),
    { ...need, label: say`needed at the bus for the target`, working: workingOf(need) },
    step(say`left after the bank`, [q - b, 'kvar'], 'Q − B', [
      ['Q', q, 'kvar'],
      ['B', b, 'kvar'],
    ]),
    step(say`short of the target at the bus`, [Math.max(0, need.value - b), 'kvar'], 'max(0, N − B)', [
      ['N', need.value, 'kvar'],
      ['B', b, 'kvar'],
    ]),
    step(say`the controller’s deviation`, [q - p * tanSet - b, 'kvar'], 'Q − P · √(1 / λ_s^2 − 1) − B', [
      ['Q', q, 'kvar'],
      ['P', p, 'kW'],
      ['λ_s', set, ''],
      ['B', b, 'kvar'],
    ]),
  ];
  if (result.bank.stages.length > 0) {
    const ratio = result.control.responseRatio;
    steps.push(
      step(say`deviation it answers`, [ratio * smallest, 'kvar'], 'a · Q_s', [
        ['a', ratio, ''],
        ['Q_s', smallest, 'kvar'],
      ]),
    );
  }
  return { beginS: series.beginS[at]!, misses: worst !== undefined, steps };
}

function greatest(values: Float64Array): number {
  let at = 0;
  for (let i = 1; i < values.length; i++) if (values[i]! > values[at]!) at = i;
  return at;
}

function measured(label: string, value: number, unit: string): WorkedInterval['steps'][number] {
  return { label, formula: '', working: '', value, unit };
}

function step(
  label: string,
  [value, unit]: [number, string],
  formula: string,
  inputs: readonly Input[],
): WorkedInterval['steps'][number] {
  const put = inputs.map(([symbol, input, inputUnit]) => ({ symbol, value: input, unit: inputUnit }));
  const working = workingOf({ id: '', label, value, unit, formula, working: '', source: '', inputs: put });
  return { label, formula, working, value, unit };
}
