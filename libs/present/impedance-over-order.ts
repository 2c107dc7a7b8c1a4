import {
  admittanceSquareInto,
  type Bank,
  type BankOutcome,
  bankLevels,
  type CornerCase,
  networkModel,
  networkTable,
  PeakFinder,
  stageAdmittance,
  stageBranch,
} from '#libs/engine/index.js';
import type { Axis, Chart, Mark } from './chart.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say } from './language.js';
import { linearAxis, logAxis } from './ticks.js';

const LEAST_END_H = 21;
const STEP_H = 0.02;
/** A peak this near to an order present is a reason to look again [order]. */
const REACH_H = 0.3;
/** Beyond so many levels the band is taken from so many of them, evenly spread, ends included. */
const MOST_LEVELS = 65;

/** |Z| over order at the nominal corner, level by level. */
interface Scan {
  ordersH: Float64Array;
  levels: { levelKvar: number; ohm: Float64Array; peak: { orderH: number; impedanceOhm: number } | null }[];
}

/** Both ends of a scale that two compared banks share. */
export interface SharedScale {
  leastOhm: number;
  mostOhm: number;
}

/** A bank's scan ready to be drawn beside another. */
export interface ImpedanceFigure {
  scale: SharedScale;
  /**
   * @param shared scale of both banks, where there are two
   * @param levelKvar the level drawn heavy; all stages in where absent
   */
  chart(shared?: SharedScale, levelKvar?: number): Chart;
}

/**
 * |Z| at the bus over harmonic order: band over all levels, heavy with all stages, dashed without a bank.
 * @param outcome supply, loads and orders present
 * @param bank whose levels are drawn
 * @param name what the bank is, for example "7 % reactors"
 * @returns the figure with its own scale
 */
export function impedanceOverOrder(outcome: BankOutcome, bank: Bank, name: string): ImpedanceFigure {
  const present = presentOrdersH(outcome);
  const peakH = outcome.result.network.levels.findLast((level) => level.case === 'nominal')?.parallelOrderH ?? 0;
  const endH = Math.min(50, Math.max(LEAST_END_H, Math.ceil(peakH) + 1, ...present.map((order) => order + 2)));
  const scan = scanBank(outcome, bank, endH);
  const all = scan.levels.flatMap(({ ohm }) => [Math.min(...ohm), Math.max(...ohm)]);
  const scale = { leastOhm: Math.min(...all), mostOhm: Math.max(...all) };
  return {
    scale,
    chart: (shared = scale, levelKvar = Number.POSITIVE_INFINITY) =>
      drawn({ scan, present, name, endH, levelKvar }, shared),
  };
}

/** Orders that some load or the supply brings. */
function presentOrdersH(outcome: BankOutcome): number[] {
  const orders = outcome.result.network.levels[0]?.orders ?? [];
  return orders.map(({ orderH }) => orderH);
}

function scanBank(outcome: BankOutcome, bank: Bank, endH: number): Scan {
  const { supply, loads, nominalV } = outcome.site;
  const count = Math.round((endH - 1) / STEP_H) + 1;
  const ordersH = Float64Array.from({ length: count }, (_, i) => 1 + i * STEP_H);
  const model = networkModel(supply, loads, nominalV, 0);
  const nominal = model.corners.corners[0]!;
  const { bus } = networkTable(model.corners.networks[nominal.network]!, model.damping, ordersH);
  const factors = model.corners.factors[nominal.factors]!;
  const stages = bank.groups.map((group) =>
    stageAdmittance(stageBranch(group, factors, supply.resistanceExponent), ordersH),
  );
  const peakOf = bank === outcome.bank ? knownPeaks(outcome) : foundPeaks(new PeakFinder(model, bank), nominal);
  const levels = spread(bankLevels(bank, nominalV)).map(({ levelKvar, vectors }) => {
    const square = new Float64Array(count);
    admittanceSquareInto(bus, stages, vectors[0]!, square);
    return { levelKvar, ohm: square.map((y) => 1 / Math.sqrt(y)), peak: peakOf(levelKvar, vectors[0]!) };
  });
  return { ordersH, levels };
}

type PeakOf = (levelKvar: number, vector: Int32Array) => Scan['levels'][number]['peak'];

/** The outcome has its own bank's peaks already. */
function knownPeaks(outcome: BankOutcome): PeakOf {
  const nominal = outcome.result.network.levels.filter((level) => level.case === 'nominal');
  return (levelKvar) => {
    const level = nominal.find((one) => Math.abs(one.levelKvar - levelKvar) < 1e-6);
    if (level?.parallelOrderH == null || level.peakOhm === null) return null;
    return { orderH: level.parallelOrderH, impedanceOhm: level.peakOhm };
  };
}

function foundPeaks(finder: PeakFinder, nominal: CornerCase): PeakOf {
  return (_, vector) => finder.greatest(vector, nominal);
}

function spread<T>(levels: readonly T[]): T[] {
  if (levels.length <= MOST_LEVELS) return [...levels];
  const step = (levels.length - 1) / (MOST_LEVELS - 1);
  return Array.from({ length: MOST_LEVELS }, (_, i) => levels[Math.round(i * step)]!);
}

interface Drawing {
  scan: Scan;
  present: number[];
  name: string;
  endH: number;
  levelKvar: number;
}

function drawn({ scan, present, name, endH, levelKvar }: Drawing, scale: SharedScale): Chart {
  const none = scan.levels[0]!;
  const full = scan.levels.findLast((level) => level.levelKvar <= levelKvar + 1e-6) ?? none;
  const isAll = full === scan.levels.at(-1);
  const which = isAll ? say`all stages in` : formatQuantity(full.levelKvar, 'kvar');
  const milli = (ohm: Float64Array) => ohm.map((value) => value * 1000);
  const withBank = scan.levels.slice(1);
  const top = extreme(withBank, scan.ordersH.length, Math.max);
  const bottom = extreme(withBank, scan.ordersH.length, Math.min);
  const peak = full === none ? null : full.peak;
  return {
    id: 'impedanceOverOrder',
    finding: `${name}: ${peak === null ? say`no peak with ${which}` : say`${which}, the peak lies at order ${formatNumber(peak.orderH)}`}`,
    caption: say`Impedance at the bus, nominal case.`,
    sentence: sentence(scan, name, present),
    x: orderAxis(endH, present),
    y: logAxis(say`impedance`, 'mΩ', { least: scale.leastOhm * 1000, most: scale.mostOhm * 1000 }),
    equalScales: false,
    series: [
      ...(withBank.length > 0
        ? [{ part: 'bank' as const, shape: 'wash' as const, x: scan.ordersH, y: milli(top), base: milli(bottom) }]
        : []),
      { part: 'without', shape: 'line', x: scan.ordersH, y: milli(none.ohm) },
      ...(full === none
        ? []
        : [{ part: 'site' as const, shape: 'line' as const, x: scan.ordersH, y: milli(full.ohm) }]),
    ],
    marks: [...peakMarks(withBank, present), ...ring(peak, endH)],
    table: {
      columns: [say`level kvar`, say`peak at order`, say`peak mΩ`].map((head) => ({ head, right: true })),
      rows: scan.levels.map(({ levelKvar, peak: own }) => [
        formatNumber(levelKvar),
        own === null ? '–' : formatNumber(own.orderH),
        own === null ? '–' : formatNumber(own.impedanceOhm * 1000),
      ]),
    },
  };
}

function ring(peak: { orderH: number; impedanceOhm: number } | null, endH: number): Mark[] {
  if (peak === null || peak.orderH > endH) return [];
  return [
    { kind: 'ring', x: peak.orderH, y: peak.impedanceOhm * 1000, text: formatNumber(peak.orderH), side: 'right' },
  ];
}

function extreme(levels: Scan['levels'], count: number, pick: (a: number, b: number) => number): Float64Array {
  const out = Float64Array.from(levels[0]?.ohm ?? new Float64Array(count));
  for (const { ohm } of levels) for (let i = 0; i < count; i++) out[i] = pick(out[i]!, ohm[i]!);
  return out;
}

/** Windows around the orders present, and a tick for the peak of each level: heavy where it stands in a window. */
function peakMarks(levels: Scan['levels'], present: readonly number[]): Mark[] {
  const windows: Mark[] = present.map((order) => ({ kind: 'window', from: order - REACH_H, to: order + REACH_H }));
  const peaks: Mark[] = levels.flatMap(({ peak }) => {
    if (peak === null) return [];
    const near = present.some((order) => Math.abs(order - peak.orderH) <= REACH_H);
    return [{ kind: 'tick' as const, x: peak.orderH, heavy: near }];
  });
  return [...windows, ...peaks];
}

function orderAxis(endH: number, present: readonly number[]): Axis {
  const axis = linearAxis(say`harmonic order`, '', { least: 0, most: endH });
  const odd = Array.from({ length: Math.ceil(endH / 2) }, (_, i) => 2 * i + 1).filter((order) => order <= endH);
  const orders = [...new Set([...odd, ...present])].filter((order) => order <= endH).sort((a, b) => a - b);
  const ticks = orders.map((at) => ({ at, text: formatNumber(at, 'given'), strong: present.includes(at) }));
  return { ...axis, from: 1, to: endH, ticks };
}

function sentence(scan: Scan, name: string, present: readonly number[]): string {
  const full = scan.levels.at(-1)!;
  const orders = present.length === 0 ? say`No order is present.` : say`Orders present: ${present.join(', ')}.`;
  const peaks = scan.levels.slice(1).flatMap(({ peak }) => (peak === null ? [] : [peak.orderH]));
  if (peaks.length === 0 || full.peak === null)
    return say`Impedance at the bus, ${name}. ${orders} The bank makes no peak.`;
  return say`Impedance at the bus, ${name}. ${orders} The levels’ peaks lie between order ${formatNumber(Math.min(...peaks))} and
      ${formatNumber(Math.max(...peaks))}; with all stages in, ${formatQuantity(full.peak.impedanceOhm * 1000, 'mΩ')} at order
      ${formatNumber(full.peak.orderH)}.`;
}
