import type { Bank } from '../layout/bank.js';
import { compensatedSum } from '../quantity/compensated-sum.js';
import { bankFigures } from './bank-figures.js';
import { type Figure, figure, PF } from './figure.js';
import { needFigure } from './need-figure.js';
import { distortionFigures, dutyFigures, neutralFigure, supplyFigures } from './network-figures.js';
import type { RecordSummary } from '../record/record-summary.js';
import type { Result } from './result.js';
import type { Operated, Study } from './study.js';

/**
 * Every deciding figure with its formula and the values put in.
 * @param study site and record
 * @param bank the bank
 * @param operated the bank simulated
 * @param result the result so far
 * @returns figures in the order of the job
 * @source method-figures
 */
export function figures(study: Study, bank: Bank, operated: Operated, result: Result): Figure[] {
  return [
    ...recordFigures(result),
    ...requirementFigures(study, result),
    ...supplyFigures(study, result),
    ...bankFigures(study, bank, result),
    ...operationFigures(study, bank, operated, result),
    ...distortionFigures(result),
    ...dutyFigures(result),
  ];
}

function recordFigures({ record }: Result): Figure[] {
  if (record.powerFactorLagging === null || record.powerFactorNet === null) return [];
  return [
    figure('record.powerFactorLagging', { value: record.powerFactorLagging, unit: '' }, PF, [
      ['E_p', record.activeKwh, 'kWh'],
      ['E_q', record.laggingKvarh, 'kvarh'],
    ]),
    figure('record.powerFactorNet', { value: record.powerFactorNet, unit: '' }, PF, [
      ['E_p', record.activeKwh, 'kWh'],
      ['E_q', record.laggingKvarh - record.leadingKvarh, 'kvarh'],
    ]),
  ];
}

/**
 * What a record counts, and its greatest power.
 * @param record summary of the record
 * @returns figures
 * @source method-figures
 */
export function recordCounts(record: Omit<RecordSummary, 'notes' | 'gradeRule'>): Figure[] {
  const { beginS, endS, intervalS, intervals, missing, maxKw } = record;
  const source = 'method, record';
  const span: readonly (readonly [string, number, string])[] = [
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

function requirementFigures(study: Study, result: Result): Figure[] {
  const { requirement } = result;
  const worst = study.needKvar.indexOf(requirement.maxKvar);
  const ascending = study.needKvar.slice().sort();
  const load = {
    activeKw: study.load.activeKw[worst]!,
    reactiveKvar: study.load.reactiveKvar[worst]!,
    needKvar: requirement.maxKvar,
  };
  return [
    needFigure('requirement.maxKvar', study.site, load),
    quantileFigure('requirement.p99Kvar', requirement.p99Kvar, ascending, 0.99),
    quantileFigure('requirement.p95Kvar', requirement.p95Kvar, ascending, 0.95),
    figure(
      'requirement.meanKvar',
      { value: requirement.meanKvar, unit: 'kvar' },
      { formula: 'S / n', source: 'method, requirement' },
      [
        ['S', compensatedSum(study.needKvar), 'kvar'],
        ['n', study.needKvar.length, ''],
      ],
    ),
  ];
}

/** Between the two neighbours of a rank, in proportion. */
function quantileFigure(id: string, value: number, ascending: Float64Array, share: number): Figure {
  const position = (ascending.length - 1) * share;
  const below = Math.floor(position);
  return figure(id, { value, unit: 'kvar' }, { formula: 'a + f · (b − a)', source: 'method, requirement' }, [
    ['a', ascending[below]!, 'kvar'],
    ['b', ascending[Math.min(ascending.length - 1, below + 1)]!, 'kvar'],
    ['f', position - below, ''],
  ]);
}

function operationFigures(study: Study, bank: Bank, operated: Operated, result: Result): Figure[] {
  const found: Figure[] = [];
  const lowest = result.operation.months
    .filter((month) => month.powerFactorLagging !== null)
    .reduce<(typeof result.operation.months)[number] | null>(
      (low, month) => (low === null || month.powerFactorLagging! < low.powerFactorLagging! ? month : low),
      null,
    );
  if (lowest !== null) {
    found.push(
      figure('operation.lowestMonthPowerFactor', { value: lowest.powerFactorLagging!, unit: '' }, PF, [
        ['E_p', lowest.activeKwh, 'kWh'],
        ['E_q', lowest.laggingKvarh, 'kvarh'],
      ]),
    );
  }
  if (bank.groups.length > 0) found.push(...switchingFigures(result), ...transformerFigures(study, operated));
  return [...found, ...neutralFigure(study)];
}

function switchingFigures({ operation, record }: Result): Figure[] {
  const { switchings, totalSwitchings, shareInTargetPct } = operation;
  const symbols = switchings.map((_, at) => `s_${at + 1}`);
  const n = record.intervals;
  return [
    figure(
      'operation.totalSwitchings',
      { value: totalSwitchings, unit: '' },
      { formula: symbols.join(' + '), source: 'method, operation' },
      switchings.map((count, at) => [symbols[at]!, count, ''] as const),
    ),
    figure(
      'operation.shareInTargetPct',
      { value: shareInTargetPct, unit: '%' },
      { formula: '100 · n_t / n', source: 'method, operation' },
      [
        ['n_t', Math.round((shareInTargetPct * n) / 100), ''],
        ['n', n, ''],
      ],
    ),
  ];
}

// At the interval of greatest apparent power before the bank; what the transformer carries is the bus power.
function transformerFigures(study: Study, operated: Operated): Figure[] {
  const { activeKw, reactiveKvar } = study.load;
  let peak = 0;
  for (let i = 1; i < activeKw.length; i++) {
    const at = (k: number): number => activeKw[k]! ** 2 + reactiveKvar[k]! ** 2;
    if (at(i) > at(peak)) peak = i;
  }
  const p = activeKw[peak]!;
  const q = reactiveKvar[peak]!;
  const b = operated.deliveredKvar[peak]!;
  const found = [
    figure(
      'operation.freedKva',
      { value: Math.hypot(p, q) - Math.hypot(p, q - b), unit: 'kVA' },
      { formula: '√(P^2 + Q^2) − √(P^2 + (Q − B)^2)', source: 'method, requirement' },
      [
        ['P', p, 'kW'],
        ['Q', q, 'kvar'],
        ['B', b, 'kvar'],
      ],
    ),
  ];
  const distortionPct = distortionAtPeakPct(study);
  if (distortionPct > 0 && p > 0) {
    found.push(
      figure(
        'loads.truePowerFactorAfter',
        { value: p / Math.hypot(p, q - b) / Math.sqrt(1 + (distortionPct / 100) ** 2), unit: '' },
        { formula: 'P / √(P^2 + (Q − B)^2) / √(1 + (D / 100)^2)', source: 'Grady and Gilleskie 1993' },
        [
          ['P', p, 'kW'],
          ['Q', q, 'kvar'],
          ['B', b, 'kvar'],
          ['D', distortionPct, '%'],
        ],
      ),
    );
  }
  return found;
}

// Injected harmonic current as a share of the greatest load current: what no bank can mend.
function distortionAtPeakPct(study: Study): number {
  const { excitation, loadA } = study.model;
  const square = excitation.injectedA.reduce((sum, a) => sum + a * a, 0);
  return loadA > 0 ? (100 * Math.sqrt(square)) / loadA : 0;
}
