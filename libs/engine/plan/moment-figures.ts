import { type Figure, figure, PF } from './figure.js';
import { needFigure } from './need-figure.js';
import type { Outcome } from './outcome.js';

type Input = readonly [symbol: string, value: number, unit: string];

/**
 * One interval of the record at the bus: need, what stages give, what is left, and the currents before and after.
 * @param outcome the plan or judgement
 * @param at index of the interval among the valid ones
 * @param stagesKvar effective kvar of every stage that is in [kvar]
 * @returns figures, their names beginning with `moment[` and the interval's beginning [s]
 * @source method-figures
 */
export function momentFigures(outcome: Outcome, at: number, stagesKvar: readonly number[]): Figure[] {
  const { series, site } = outcome;
  const id = (name: string) => `moment[${series.beginS[at]!}].${name}`;
  const p = series.busKw[at]!;
  const q = series.busKvar[at]!;
  const b = series.connectedKvar[at]!;
  const source = 'method, requirement';
  const [P, Q, B]: Input[] = [
    ['P', p, 'kW'],
    ['Q', q, 'kvar'],
    ['B', b, 'kvar'],
  ];
  const U: Input = ['U', site.nominalV, 'V'];
  const kva = 1000 / (Math.sqrt(3) * site.nominalV);
  const current = (name: string, value: number, power: string, inputs: Input[]) =>
    figure(id(name), { value, unit: 'A' }, { formula: `1000 · ${power} / (√(3) · U)`, source }, [...inputs, U]);
  const factor = (name: string, kvar: string, left: number, inputs: Input[]) =>
    p === 0
      ? []
      : [
          figure(
            id(name),
            { value: Math.abs(p) / Math.hypot(p, left), unit: '' },
            { formula: `√(P^2) / √(P^2 + ${kvar}^2)`, source: PF.source },
            inputs,
          ),
        ];
  return [
    needFigure(id('neededKvar'), site, { activeKw: p, reactiveKvar: q, needKvar: series.needKvar[at]! }),
    ...connectedFigure(id('connectedKvar'), b, stagesKvar),
    figure(id('leftKvar'), { value: q - b, unit: 'kvar' }, { formula: 'Q − B', source }, [Q!, B!]),
    current('loadA', Math.hypot(p, q) * kva, '√(P^2 + Q^2)', [P!, Q!]),
    current('bankA', b * kva, 'B', [B!]),
    current('supplyA', Math.hypot(p, q - b) * kva, '√(P^2 + (Q − B)^2)', [P!, Q!, B!]),
    ...factor('loadFactor', 'Q', q, [P!, Q!]),
    ...factor('supplyFactor', '(Q − B)', q - b, [P!, Q!, B!]),
  ];
}

function connectedFigure(id: string, value: number, stagesKvar: readonly number[]): Figure[] {
  if (stagesKvar.length === 0) return [];
  const symbols = stagesKvar.map((_, at) => `Q_${at + 1}`);
  return [
    figure(
      id,
      { value, unit: 'kvar' },
      { formula: symbols.join(' + '), source: 'method, operation: every stage that is in' },
      stagesKvar.map((kvar, at) => [symbols[at]!, kvar, 'kvar']),
    ),
  ];
}
