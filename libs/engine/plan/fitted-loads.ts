import { couplesAtPrimary } from '../duty/limits-point.js';
import { bankLevels } from '../layout/levels.js';
import { bankModel, eachFlow } from '../network/flow.js';
import type { Loads, MeasuredDistortion, OrderFactor } from '../network/loads.js';
import { siteNetwork } from '../network/network-model.js';
import { summationExponent } from '../network/summation.js';
import { InputProblem, type Problem, type Remark, remark } from '../problem.js';
import { settleBank } from './settle-bank.js';
import type { SettledSite } from './settled-site.js';
import type { Site } from './site.js';

/** A level this near to the one that was in counts as the same [kvar]. */
const LEVEL_REACH_KVAR = 0.5;

/** A reading beside what loads and background each make of it alone, nominal case. */
interface Reading {
  orderH: number;
  path: string;
  read: number;
  unit: string;
  ofLoads: number;
  ofBackground: number;
}

/** What the nominal case makes of one kind of source, by order. */
interface Computed {
  /** % of nominal */
  voltagePct: Map<number, number>;
  /** supply current per phase [A] */
  currentA: Map<number, number>;
}

/**
 * Scales the currents of the distorting loads, all alike at an order, so that the nominal case with the same kvar connected
 * meets the reading: with r^α = x·a^α + b^α, a what the loads and b what the background make alone, the factor is x^(1/α).
 * Where voltage and current were read, x is the least-squares one. Orders without a reading keep their currents, and
 * nothing is added to the sources.
 * @param site validated site, `loads.measured.use` being "fit"
 * @param settled the site with its defaults
 * @param measured the reading
 * @returns loads with their factors, and a line for each order
 * @throws InputProblem where the reading leaves open what to scale
 * @source method-measured
 */
export function fittedLoads(
  site: Site,
  settled: SettledSite,
  measured: MeasuredDistortion,
): { loads: Loads; lines: Remark[] } {
  refuse(openSources(settled.loads));
  const { loads } = settled;
  const ofLoads = computed(site, { ...settled, loads: { ...loads, backgroundPct: [] } }, measured);
  const ofBackground = computed(site, { ...settled, loads: { ...loads, distorting: [] } }, measured);
  const readings = readingsOf(measured, ofLoads, ofBackground);
  refuse(readings.filter(({ ofLoads: a }) => !(a > 0)).map(withoutSource));
  const ordersH = [...new Set(readings.map(({ orderH }) => orderH))].sort((a, b) => a - b);
  const fits = ordersH.map((orderH) => {
    const here = readings.filter((reading) => reading.orderH === orderH);
    return { orderH, ...fitAt(here, summationExponent(orderH, loads.summation)) };
  });
  refuse(fits.flatMap(({ problems }) => problems));
  const factors: OrderFactor[] = fits.map(({ orderH, factor }) => ({ orderH, factor }));
  const kept = [...ofLoads.voltagePct.keys()].filter((h) => !ordersH.includes(h));
  const lines = fits.map(({ orderH, factor, residualPct }) =>
    remark('measured.fitted', { orderH, factor, residualPct }, { path: 'loads.measured.use' }),
  );
  const orders = kept.sort((a, b) => a - b).join(', ');
  if (orders !== '') lines.push(remark('measured.keptOrders', { orders }, { path: 'loads.measured.use' }));
  return { loads: { ...loads, factors }, lines };
}

function refuse(problems: Problem[]): void {
  if (problems.length > 0) throw new InputProblem(problems);
}

function openSources(loads: Loads): Problem[] {
  const problems: Problem[] = [];
  if ((loads.distorting ?? []).length === 0) {
    const expected = 'the distorting loads whose currents are to meet the reading';
    problems.push({ code: 'missing', path: 'loads.distorting', expected, found: 'none' });
  }
  if (loads.backgroundPct === null) {
    const expected = 'the background, or an empty list for none: a reading alone does not tell it from the loads';
    problems.push({ code: 'missing', path: 'loads.backgroundPct', expected, found: 'nothing' });
  }
  return problems;
}

function computed(site: Site, settled: SettledSite, measured: MeasuredDistortion): Computed {
  const { supply, loads, nominalV, topology } = settled;
  const shape = { nominalV, loadA: 0, topology, primary: couplesAtPrimary(settled) };
  const whole = siteNetwork(supply, loads, shape);
  const model = { ...whole, corners: { ...whole.corners, corners: whole.corners.corners.slice(0, 1) } };
  const { bank } = settleBank(
    measured.bankKvar === 0 ? { stages: [] } : (site.bank ?? { stages: [] }),
    site.frequencyHz,
  );
  const levels = bankLevels(bank, nominalV);
  const level = levels.find(({ levelKvar }) => Math.abs(levelKvar - measured.bankKvar) <= LEVEL_REACH_KVAR);
  if (level === undefined) {
    const expected = `0, or a level of the bank that was in: ${levels.map(({ levelKvar }) => levelKvar).join(', ')}`;
    const found = `${measured.bankKvar}`;
    throw new InputProblem([{ code: 'unknown-level', path: 'loads.measured.bankKvar', expected, found, unit: 'kvar' }]);
  }
  const place = measured.place === undefined ? model.bankBus : model.buses.indexOf(measured.place);
  const found: Computed = { voltagePct: new Map(), currentA: new Map() };
  eachFlow(model, bankModel(model, bank, [{ ...level, vectors: level.vectors.slice(0, 1) }]), (flow) => {
    for (const [i, orderH] of flow.ordersH.entries()) {
      const { voltageV } = flow.buses[place < 0 ? model.bankBus : place]!;
      found.voltagePct.set(orderH, (100 * voltageV[i]! * Math.sqrt(3)) / nominalV);
      found.currentA.set(orderH, flow.sourceA[i]!);
    }
  });
  return found;
}

function readingsOf(measured: MeasuredDistortion, ofLoads: Computed, ofBackground: Computed): Reading[] {
  const reading = (
    quantity: keyof Computed,
    at: { k: number; orderH: number; read: number; unit: string },
  ): Reading => ({
    orderH: at.orderH,
    path: `loads.measured.${quantity}[${at.k}]`,
    read: at.read,
    unit: at.unit,
    ofLoads: ofLoads[quantity].get(at.orderH) ?? 0,
    ofBackground: ofBackground[quantity].get(at.orderH) ?? 0,
  });
  return [
    ...(measured.voltagePct ?? []).map(({ orderH, pct }, k) =>
      reading('voltagePct', { k, orderH, read: pct, unit: '%' }),
    ),
    ...(measured.currentA ?? []).map(({ orderH, a }, k) => reading('currentA', { k, orderH, read: a, unit: 'A' })),
  ];
}

function withoutSource({ orderH, path, read, unit }: Reading): Problem {
  const expected = `a distorting load with a current at order ${orderH}, which could be scaled`;
  return { code: 'inconsistent', path, expected, found: `${read}, and no load with such a current`, unit };
}

function fitAt(
  readings: readonly Reading[],
  alpha: number,
): { factor: number; residualPct: number; problems: Problem[] } {
  let above = 0;
  let below = 0;
  for (const { read, ofLoads, ofBackground } of readings) {
    const a = ofLoads ** alpha;
    const b = ofBackground ** alpha;
    const r = read ** alpha;
    const weight = 1 / Math.max(r, a + b) ** 2;
    above += weight * a * (r - b);
    below += weight * a * a;
  }
  const x = above / below;
  const problems = x < 0 ? readings.filter(({ read, ofBackground }) => read < ofBackground).map(ofBackgroundAlone) : [];
  const share = Math.max(0, x);
  const residualPct = readings.reduce((most, { read, ofLoads, ofBackground }) => {
    const met = (share * ofLoads ** alpha + ofBackground ** alpha) ** (1 / alpha);
    return Math.max(most, (100 * Math.abs(met - read)) / Math.max(met, read, Number.MIN_VALUE));
  }, 0);
  return { factor: share ** (1 / alpha), residualPct, problems };
}

function ofBackgroundAlone({ path, read, ofBackground, unit }: Reading): Problem {
  const expected = `at least ${ofBackground}, which the stated background makes alone`;
  return { code: 'inconsistent', path, expected, found: `${read}`, unit };
}
