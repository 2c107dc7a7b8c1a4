import { currentLimits, voltageLimits } from '#libs/engine/index.js';
import { type SlowBasis, type SlowCorner, type SlowFlow, slowFlows } from './slow-flows.js';

type Verdict = 'clear' | 'watch' | 'avoid';

/** A row of the duties. */
export interface SlowRow {
  name: string;
  group: number | null;
  value: number;
  limit: number | null;
  ratio: number | null;
  levelKvar: number | null;
  corner: SlowCorner | null;
  orderH: number | null;
  verdict: Verdict | null;
}

const SQRT3 = Math.sqrt(3);

/** Keeps the largest ratio, the earlier where they are equal, and the gravest verdict. */
class Rows {
  readonly #rows = new Map<string, SlowRow>();

  take(
    name: string,
    group: number | null,
    met: { value: number; limit: number | null; verdict: Verdict | null; flow: SlowFlow; orderH?: number },
  ): void {
    const { value, limit, verdict, flow } = met;
    const key = `${name} ${group}`;
    const ratio = limit === null ? null : value / limit;
    const row: SlowRow = {
      name,
      group,
      value,
      limit,
      ratio,
      levelKvar: flow.levelKvar,
      corner: flow.corner,
      orderH: met.orderH ?? null,
      verdict,
    };
    const known = this.#rows.get(key);
    if (known === undefined) {
      this.#rows.set(key, row);
      return;
    }
    const greater = (ratio ?? value) > (known.ratio ?? known.value) * (1 + 1e-9);
    const gravest = graver(known.verdict, verdict);
    this.#rows.set(key, { ...(greater ? row : known), verdict: gravest });
  }

  list(): SlowRow[] {
    return [...this.#rows.values()];
  }
}

function graver(a: Verdict | null, b: Verdict | null): Verdict | null {
  const order = [null, 'clear', 'watch', 'avoid'];
  return order.indexOf(a) >= order.indexOf(b) ? a : b;
}

function verdictOf(ratio: number, near: number): Verdict {
  if (ratio > 1 + 1e-9) return 'avoid';
  return ratio > near ? 'watch' : 'clear';
}

/**
 * The duties of every flow, by phasors.
 * @param basis site, bank, load current
 * @param shortCircuitMinMva least fault level at the bus [MVA]
 * @returns rows of stages and network, without discharge and inrush
 */
export function slowDuties(basis: SlowBasis, shortCircuitMinMva: number): SlowRow[] {
  const flows = slowFlows(basis);
  const rows = new Rows();
  for (const flow of flows.filter(({ counts }) => counts.some((n) => n > 0))) {
    for (const g of basis.groups.keys()) if (flow.counts[g]! > 0) stageRows(basis, flow, g, rows);
    networkRows(basis, flow, { flows, shortCircuitMinMva }, rows);
  }
  return rows.list();
}

function stageRows({ site, groups }: SlowBasis, flow: SlowFlow, g: number, rows: Rows): void {
  const group = groups[g]!;
  const { capacitanceFactor, inductanceFactor } = flow.corner;
  const xc = group.ratedV ** 2 / (group.ratedKvar * 1000) / capacitanceFactor;
  const p = (group.reactorPct / 100) * capacitanceFactor * inductanceFactor;
  const u1 = site.highestV / (1 - p);
  const i1 = site.highestV / SQRT3 / (xc * (1 - p));
  const us = [u1, ...flow.orders.map(({ orderH, stageA }) => (SQRT3 * stageA[g]! * xc) / orderH)];
  const is = [i1, ...flow.orders.map(({ stageA }) => stageA[g]!)];
  const inA = (group.ratedKvar * 1000) / (SQRT3 * group.ratedV);
  const take = (name: string, value: number, limit: number | null, near: number): void =>
    rows.take(name, g, { value, limit, verdict: limit === null ? null : verdictOf(value / limit, near), flow });
  take('capacitor voltage, highest', Math.hypot(...us), 1.1 * group.ratedV, 0.95);
  const rmsA = Math.hypot(...is);
  if (site.rules === 'iec') {
    take('capacitor voltage, continuous', site.nominalV / (1 - p), group.ratedV, 0.95);
    take('capacitor current', rmsA, 1.3 * inA * capacitanceFactor, 0.8);
  } else {
    const crest = Math.SQRT2 * us.reduce((sum, u) => sum + u, 0);
    take('capacitor voltage, crest', crest, 1.2 * Math.SQRT2 * group.ratedV, 0.95);
    take('capacitor current', rmsA, 1.35 * inA, 0.8);
    const kvar = (SQRT3 * us.reduce((sum, u, k) => sum + u * is[k]!, 0)) / 1000;
    take('capacitor reactive power', kvar, 1.35 * group.ratedKvar, 0.8);
  }
  if (group.reactorPct > 0) take('reactor current', rmsA, group.reactorMaxA, 0.8);
}

function networkRows(
  { site, loadA }: SlowBasis,
  flow: SlowFlow,
  { flows, shortCircuitMinMva }: { flows: SlowFlow[]; shortCircuitMinMva: number },
  rows: Rows,
): void {
  // Level 0 with the same source, transformer impedance and damping.
  const without = flows.find(
    ({ counts, corner, sign }) =>
      counts.every((n) => n === 0) && sign === flow.sign && corner.dampingKw === flow.corner.dampingKw,
  )!;
  const take = (
    name: string,
    { value, base, orderH }: { value: number; base: number; orderH?: number },
    limit: number,
  ): void => {
    const found = verdictOf(value / limit, 0.8);
    const already = found === 'avoid' && value - base <= 0.01 * limit;
    rows.take(name, null, {
      value,
      limit,
      verdict: already ? 'watch' : found,
      flow,
      ...(orderH === undefined ? {} : { orderH }),
    });
  };
  const voltage = voltageLimits(site.rules, site.nominalV, site.emcClass);
  take(
    'voltage distortion',
    { value: flow.voltageDistortionPct, base: without.voltageDistortionPct },
    voltage.distortionPct,
  );
  const pct = (volts: number): number => (100 * SQRT3 * volts) / site.nominalV;
  flow.orders.forEach((order, k) => {
    const limit = voltage.orderPct(order.orderH);
    if (limit === null) return;
    const base = pct(without.orders[k]!.busV);
    take('harmonic voltage', { value: pct(order.busV), base, orderH: order.orderH }, limit);
  });
  if (site.rules === 'iec' || loadA === 0 || flow.orders.length === 0) return;
  const current = currentLimits((shortCircuitMinMva * 1e6) / (SQRT3 * site.nominalV) / loadA);
  take(
    'current distortion',
    { value: flow.currentDistortionPct, base: without.currentDistortionPct },
    current.totalPct,
  );
  flow.orders.forEach((order, k) => {
    const share = (amperes: number): number => (100 * amperes) / loadA;
    const limit = current.orderPct(order.orderH);
    const base = share(without.orders[k]!.sourceA);
    take('harmonic current', { value: share(order.sourceA), base, orderH: order.orderH }, limit);
  });
}
