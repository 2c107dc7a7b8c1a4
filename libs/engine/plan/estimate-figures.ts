import type { BillBounds } from '../requirement/bill-bounds.js';
import type { EquipmentRow, ListNeed } from '../requirement/list-need.js';
import type { EstimateStudy } from './estimate-study.js';
import { type Figure, figure } from './figure.js';

const SOURCE = 'method, estimate';
const TARGET_KW = '√(1 / λ^2 − 1)';

/**
 * Every bound and every row of an estimate with its formula and the values put in.
 * @param study site and estimated load
 * @returns figures
 * @source method-figures
 */
export function estimateFigures(study: EstimateStudy): Figure[] {
  const { load, site } = study;
  const addedKvar = site.recordedBank.state === 'fixed' ? site.recordedBank.kvar : null;
  return [
    ...load.months.flatMap((bounds, k) => [
      lowerFigure(bounds, k, site.targetPowerFactor, addedKvar),
      upperFigure(bounds, k, site.targetPowerFactor, addedKvar),
    ]),
    ...(load.equipment === null ? [] : listFigures(study, load.equipment)),
  ];
}

type Inputs = (readonly [string, number, string])[];

function withAdded(formula: string, addedKvar: number | null): { formula: string; inputs: Inputs } {
  if (addedKvar === null) return { formula, inputs: [] };
  return { formula: `${formula} + Q_f`, inputs: [['Q_f', addedKvar, 'kvar']] };
}

function lowerFigure(bounds: BillBounds, k: number, target: number, addedKvar: number | null): Figure {
  const { formula, inputs } = withAdded(`(E_q − E_p · ${TARGET_KW}) / t`, addedKvar);
  return figure(
    `estimate.months[${k}].lowerKvar`,
    { value: bounds.lowerKvar, unit: 'kvar' },
    { formula: `max(0, ${formula})`, source: SOURCE },
    [
      ['E_q', bounds.laggingKvarh, 'kvarh'],
      ['E_p', bounds.activeKwh, 'kWh'],
      ['λ', target, ''],
      ['t', bounds.hours, 'h'],
      ...inputs,
    ],
  );
}

function upperFigure(bounds: BillBounds, k: number, target: number, addedKvar: number | null): Figure {
  const { formula, inputs } = withAdded(`${peakFormula(bounds)} − P · ${TARGET_KW}`, addedKvar);
  const energies: Inputs = [
    ['E_q', bounds.laggingKvarh, 'kvarh'],
    ['E_p', bounds.activeKwh, 'kWh'],
  ];
  const apparent: Inputs = bounds.peakBasis === 'maxKw and maxKva' ? [['S', bounds.maxKva!, 'kVA']] : [];
  return figure(
    `estimate.months[${k}].upperKvar`,
    { value: bounds.upperKvar, unit: 'kvar' },
    { formula: `max(L, ${formula})`, source: SOURCE },
    [
      ['L', bounds.lowerKvar, 'kvar'],
      ['P', bounds.maxKw, 'kW'],
      ['λ', target, ''],
      ...energies,
      ...apparent,
      ...inputs,
    ],
  );
}

function peakFormula({ peakBasis }: BillBounds): string {
  const atMonthsFactor = 'P · E_q / E_p';
  return peakBasis === 'maxKw and maxKva' ? `max(√(S^2 − P^2), ${atMonthsFactor})` : atMonthsFactor;
}

function listFigures(study: EstimateStudy, list: ListNeed): Figure[] {
  const { targetPowerFactor, meteredAt } = study.site;
  const inputs: Inputs = [
    ['Q', list.reactiveKvar, 'kvar'],
    ['P', list.activeKw, 'kW'],
    ['λ', targetPowerFactor, ''],
  ];
  const value = { value: list.neededKvar, unit: 'kvar' };
  const id = 'estimate.equipment.neededKvar';
  return [
    ...list.rows.flatMap(rowFigures),
    meteredAt === 'bus'
      ? figure(id, value, { formula: `max(0, Q − P · ${TARGET_KW})`, source: SOURCE }, inputs)
      : figure(id, value, { formula: 'Q − Q_t', source: 'method, requirement, meter at the primary' }, [
          ['Q', list.reactiveKvar, 'kvar'],
          ['Q_t', list.reactiveKvar - list.neededKvar, 'kvar'],
        ]),
  ];
}

function rowFigures(row: EquipmentRow, k: number): Figure[] {
  const name = `estimate.equipment.rows[${k}]`;
  return [
    figure(
      `${name}.activeKw`,
      { value: row.activeKw, unit: 'kW' },
      { formula: 'n · P_N / (η / 100) · a · g', source: SOURCE },
      [
        ['n', row.count, ''],
        ['P_N', row.ratedKw, 'kW'],
        ['η', row.efficiencyPct, '%'],
        ['a', row.loadFactor, ''],
        ['g', row.coincidence, ''],
      ],
    ),
    figure(
      `${name}.reactiveKvar`,
      { value: row.reactiveKvar, unit: 'kvar' },
      { formula: 'P · √(1 / λ^2 − 1)', source: 'IEC 60050-131' },
      [
        ['P', row.activeKw, 'kW'],
        ['λ', row.powerFactor, ''],
      ],
    ),
  ];
}
