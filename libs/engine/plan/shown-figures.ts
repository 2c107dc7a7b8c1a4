import type { MarginMap } from '../duty/margin-map.js';
import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import type { Capital } from '../money/capital.js';
import type { RecordSummary } from '../record/record-summary.js';
import { resonanceFigure } from './bank-figures.js';
import { type Figure, figure } from './figure.js';
import { PF } from './figures.js';
import type { Outcome } from './outcome.js';
import type { Study } from './study.js';

type Input = readonly [symbol: string, value: number, unit: string];

const YEAR_S = 365 * 86_400;

/**
 * What a record counts, and its greatest power.
 * @param record summary of the record
 * @returns figures
 * @source method-figures
 */
export function recordCounts(record: Omit<RecordSummary, 'notes' | 'gradeRule'>): Figure[] {
  const { beginS, endS, intervalS, intervals, missing, maxKw } = record;
  const source = 'method, record';
  const span: Input[] = [
    ['t_b', beginS, 's'],
    ['t_e', endS, 's'],
    ['T', intervalS, 's'],
  ];
  return [
    figure('record.intervals', { value: intervals, unit: '' }, { formula: '(t_e − t_b) / T − m', source }, [
      ...span,
      ['m', missing, ''],
    ]),
    figure('record.missing', { value: missing, unit: '' }, { formula: '(t_e − t_b) / T − n', source }, [
      ...span,
      ['n', intervals, ''],
    ]),
    figure(
      'record.maxKw',
      { value: maxKw, unit: 'kW' },
      { formula: 'P', source: 'the meter: greatest mean of an interval' },
      [['P', maxKw, 'kW']],
    ),
  ];
}

/**
 * What a bank costs new, its items added up.
 * @param capital items and total
 * @param currency unit of the amounts
 * @returns a figure
 * @source method-figures
 */
export function capitalFigure({ total, lines }: Capital, currency: string): Figure {
  const symbols = lines.map((_, at) => `a_${at + 1}`);
  return figure(
    'money.capital.total',
    { value: total, unit: currency },
    { formula: symbols.join(' + '), source: 'the price book, item by item' },
    lines.map(({ amount }, at) => [symbols[at]!, amount, currency]),
  );
}

/**
 * One interval of the record at the bus: need, what stages give, what is left, and the currents before and after.
 * @param outcome the plan or judgement
 * @param study the site and record it was made on
 * @param at index of the interval among the valid ones
 * @param stagesKvar effective kvar of every stage that is in [kvar]
 * @returns figures, their names beginning with `moment[` and the interval's beginning [s]
 * @source method-figures
 */
export function momentFigures(outcome: Outcome, study: Study, at: number, stagesKvar: readonly number[]): Figure[] {
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
    neededFigure(id('neededKvar'), study, at),
    ...connectedFigure(id('connectedKvar'), b, stagesKvar),
    figure(id('leftKvar'), { value: q - b, unit: 'kvar' }, { formula: 'Q − B', source }, [Q!, B!]),
    current('loadA', Math.hypot(p, q) * kva, '√(P^2 + Q^2)', [P!, Q!]),
    current('bankA', b * kva, 'B', [B!]),
    current('supplyA', Math.hypot(p, q - b) * kva, '√(P^2 + (Q − B)^2)', [P!, Q!, B!]),
    ...factor('loadFactor', 'Q', q, [P!, Q!]),
    ...factor('supplyFactor', '(Q − B)', q - b, [P!, Q!, B!]),
  ];
}

function neededFigure(id: string, study: Study, at: number): Figure {
  const p = study.load.activeKw[at]!;
  const q = study.load.reactiveKvar[at]!;
  const needed = { value: study.needKvar[at]!, unit: 'kvar' };
  if (study.load.metering.at !== 'bus') {
    const least = needed.value === 0 ? q : q - needed.value;
    return figure(id, needed, { formula: 'max(0, Q − Q_t)', source: 'method, requirement, meter at the primary' }, [
      ['Q', q, 'kvar'],
      ['Q_t', least, 'kvar'],
    ]);
  }
  return figure(id, needed, { formula: 'max(0, Q − P · √(1 / λ^2 − 1))', source: 'method, requirement' }, [
    ['Q', q, 'kvar'],
    ['P', study.target.onExport === 'absolute' ? Math.abs(p) : Math.max(0, p), 'kW'],
    ['λ', study.target.powerFactor, ''],
  ]);
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

/**
 * Hours of the record at each level, and the share of it in which some stage is in.
 * @param outcome the plan or judgement
 * @returns figures, the share first
 * @source method-figures
 */
export function hoursFigures({ result }: Outcome): Figure[] {
  const { hoursAtLevel } = result.operation;
  const { intervals, intervalS } = result.record;
  const source = 'method, operation';
  const all = (intervals * intervalS) / 3600;
  const out = hoursAtLevel[0]?.hours ?? 0;
  const share = figure(
    'operation.shareConnectedPct',
    { value: 100 * (1 - out / all), unit: '%' },
    { formula: '100 · (1 − h_0 / h)', source },
    [
      ['h_0', out, 'h'],
      ['h', all, 'h'],
    ],
  );
  const levels = hoursAtLevel.map(({ hours }, k) =>
    figure(`operation.hoursAtLevel[${k}].hours`, { value: hours, unit: 'h' }, { formula: 'n · T / 3600', source }, [
      ['n', Math.round((hours * 3600) / intervalS), ''],
      ['T', intervalS, 's'],
    ]),
  );
  return [share, ...levels];
}

/**
 * Switchings of a stage over the record that practice counts as many.
 * @param outcome the plan or judgement
 * @param practicePerYear switchings a stage and year
 * @returns a figure
 * @source method-figures
 */
export function practiceFigure({ result }: Outcome, practicePerYear: number): Figure {
  const { beginS, endS } = result.record;
  return figure(
    'operation.practiceSwitchings',
    { value: (practicePerYear * (endS - beginS)) / YEAR_S, unit: '' },
    { formula: 's_a · (t_e − t_b) / 31536000', source: 'common practice' },
    [
      ['s_a', practicePerYear, ''],
      ['t_b', beginS, 's'],
      ['t_e', endS, 's'],
    ],
  );
}

/**
 * Harmonic voltage of one level as a share of its limit, order by order.
 * @param margins of the bank
 * @param level index into its levels
 * @returns figures, their names beginning with `margins[` and the level's index
 * @source method-figures
 */
export function marginFigures({ ordersH, limitPct, voltagePct, sharePct }: MarginMap, level: number): Figure[] {
  return ordersH.map((orderH, k) =>
    figure(
      `margins[${level}].order${orderH}`,
      { value: sharePct[level]![k]!, unit: '%' },
      { formula: '100 · U_h / U_max', source: 'method, limits: the worst corner and count of stages' },
      [
        ['U_h', voltagePct[level]![k]!, '%'],
        ['U_max', limitPct[k]!, '%'],
      ],
    ),
  );
}

/**
 * Parallel resonance of another bank at the same bus, all its stages in.
 * @param outcome the plan or judgement beside it
 * @param bank the other bank
 * @returns a figure, none where its groups differ in their ratio
 * @source method-figures
 */
export function rivalFigures({ site, result }: Pick<Outcome, 'site' | 'result'>, bank: Bank): Figure[] {
  const total = bank.groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, site.nominalV), 0);
  return resonanceFigure(bank, total, result.network.shortCircuitMva).map((found) => ({
    ...found,
    id: 'rival.parallelOrderClosedFormH',
  }));
}
