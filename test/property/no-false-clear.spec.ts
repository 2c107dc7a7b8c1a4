// Second methods: direct phasors from the nameplates over every level and corner (test/support/slow-duties.ts) for sites
// of one bus; for networks the circuit put together from the site file alone, every element a row
// (test/support/slow-circuit.ts), at levels and corners of chance.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  basisOf,
  type CornerCase,
  type Duty,
  firmVerdict,
  NAMEPLATE,
  type NetworkScene,
  networkScene,
  type Outcome,
  type SettledSite,
  type Site,
  settleControl,
  UTC_TABLE,
  voltageLimits,
} from '#libs/engine/index.js';
import { busesNetlist, type Drive } from '../support/buses-netlist.js';
import { type Chance, chance } from '../support/chance.js';
import { madeBuses } from '../support/made-buses.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { slowCircuit } from '../support/slow-circuit.js';
import { type SlowRow, slowDuties } from '../support/slow-duties.js';
import { admittanceOfStage } from '../support/slow-network.js';
import { runs, SEED } from '../support/soak.js';

const SITES = runs(500, 10_000);
/** One site in so many has a network of several buses. */
const NETWORK_EVERY = 8;
const ORDERS_H = [5, 7, 11, 13];
/** Eight of these are the days a record needs to be planned on. */
const INTERVAL_S = 2 * 86_400;

function madeLoads(random: Chance, buses: string[]): Site['loads'] {
  const dirty = random.oneOf([0.1, 0.3, 1]);
  const orders = (most: number) =>
    ORDERS_H.map((orderH) => ({ orderH, pct: (random.between(0.2, 1) * most) / orderH }));
  return {
    motorSharePct: random.oneOf([0, 60, 100]),
    distorting: Array.from({ length: random.whole(1, 2) }, (_, k) => ({
      name: `load ${k}`,
      ...(buses.length > 0 ? { bus: random.oneOf(buses) } : {}),
      fundamentalA: random.between(20, 300),
      orders: orders(100 * dirty),
    })),
    backgroundPct: random.next() < 0.7 ? orders(5 * dirty) : [],
    dampingKw: random.oneOf([{ max: 300, min: 100 }, { max: 200 }, { max: 50, min: 50 }]),
  };
}

function madeBank(random: Chance, nominalV: number): NonNullable<Site['bank']> {
  const stage = () => ({
    count: random.whole(1, 2),
    ratedKvar: random.oneOf([12.5, 25, 50]),
    ratedV: nominalV * random.oneOf([1.1, 1.2, 1.31]),
    reactorPct: random.oneOf([0, 7, 12.5, 14]),
    reactorQuality: random.oneOf([20, 60]),
    ...(random.next() < 0.3 ? { reactorMaxA: random.between(30, 120) } : {}),
  });
  return { stages: Array.from({ length: random.whole(1, 2) }, stage), interStageUh: 20 };
}

function oneBusSite(random: Chance): Site {
  const rules = random.oneOf(['iec', 'ieee'] as const);
  const nominalV = random.oneOf([400, 480, 690]);
  const max = random.between(30, 300);
  return madeSite({
    rules,
    frequencyHz: random.oneOf([50, 60]),
    bus: { nominalV, highestV: nominalV * random.between(1, 1.06) },
    supply: {
      faultLevelMva: { max, min: max * random.oneOf([0.5, 1]) },
      rOverX: random.between(0.05, 0.5),
      arrangement: 'parallel',
      transformers: Array.from({ length: random.whole(0, 2) }, () => ({
        ratedKva: random.oneOf([630, 1000, 1600]),
        impedancePct: random.between(4, 7),
        loadLossKw: random.between(3, 10),
      })),
    },
    loads: madeLoads(random, []),
    limits: { emcClass: random.oneOf([2, 3] as const) },
    bank: madeBank(random, nominalV),
  });
}

// A row without a level or a corner holds at every one of them: a closing, a resistor.
const EVERYWHERE = ['discharge', 'inrush current', 'inrush current, exact'];
const OF_ONE_ORDER = ['harmonic voltage', 'harmonic voltage at the primary', 'harmonic current'];

function incomplete({ name, value, limit, levelKvar, corner, orderH }: Duty): boolean {
  if (!Number.isFinite(value) || limit === null) return true;
  if (EVERYWHERE.includes(name)) return false;
  return levelKvar === null || corner === null || (OF_ONE_ORDER.includes(name) && orderH === null);
}

/** What speaks against a verdict; empty where nothing does. */
type Objections = { verdict: string; said: string[] };

function slowRows({ site, bank, series, result }: Outcome): SlowRow[] {
  const kva = Math.max(...Array.from(series.busKw, (kw, i) => Math.hypot(kw, series.busKvar[i]!)));
  const basis = { site, groups: bank.groups, loadA: (1000 * kva) / (Math.sqrt(3) * site.nominalV) };
  return slowDuties(basis, result.network.shortCircuitMinMva);
}

function objectionsTo(outcome: Outcome): Objections {
  const { verdict, duties } = outcome.result;
  const avoided = duties.filter((duty) => duty.verdict === 'avoid');
  const said = avoided.filter(incomplete).map(({ name }) => `${name} does not say where`);
  if (verdict === 'avoid') {
    if (avoided.length === 0) said.push('avoid without a number');
    return { verdict, said };
  }
  const over = slowRows(outcome).filter((row) =>
    verdict === 'clear' ? row.ratio! > 1 + 1e-9 : row.verdict === 'avoid',
  );
  return { verdict, said: [...said, ...over.map(({ name, ratio }) => `${verdict}, yet ${name} at ${ratio}`)] };
}

function oneBusObjections(random: Chance): Objections {
  const site = oneBusSite(random);
  const record = madeRecord({ ...driftingLoad(random, 8, random.between(100, 600), 0.8), intervalS: INTERVAL_S });
  return objectionsTo(assessBank(site, record, UTC_TABLE));
}

const combined = (parts: number[], orderH: number): number => {
  const alpha = orderH < 5 ? 1 : orderH <= 10 ? 1.4 : 2;
  return parts.reduce((sum, part) => sum + part ** alpha, 0) ** (1 / alpha);
};

// Every bus's voltages in one standing, every load alone and the background alone.
function busVoltagesPct(site: Site, scene: Omit<Parameters<typeof busesNetlist>[1], 'tag' | 'drive'>): number[][] {
  const phaseV = site.bus.nominalV / Math.sqrt(3);
  const alone = (drive: Drive, orderH: number): number[] => {
    const volts = slowCircuit(busesNetlist(site, { ...scene, tag: 'q', drive }, orderH), orderH * site.frequencyHz);
    return site.network!.buses.map((_, k) => volts.get(`n${k}q`)!);
  };
  return ORDERS_H.map((orderH) => {
    const drives = site.loads!.distorting!.map((load) => ({
      volts: alone({ bus: load.bus! }, orderH),
      by: (load.fundamentalA * load.orders!.find((order) => order.orderH === orderH)!.pct) / 100,
    }));
    const background = site.loads!.backgroundPct!.find((order) => order.orderH === orderH)?.pct ?? 0;
    if (background > 0) drives.push({ volts: alone('background', orderH), by: (background / 100) * phaseV });
    return site.network!.buses.map((_, bus) =>
      combined(
        drives.map(({ volts, by }) => (100 * volts[bus]! * by) / phaseV),
        orderH,
      ),
    );
  });
}

function networkObjections(random: Chance): Objections {
  const made = madeBuses(random);
  const { nominalV } = made.bus;
  const buses = made.network!.buses.map(({ name }) => name);
  const site = { ...made, loads: madeLoads(random, buses), bank: madeBank(random, nominalV) };
  const scene = networkScene(site);
  const { control } = settleControl(site.control, scene.bank, scene.site);
  const { verdict, duties } = firmVerdict(scene.model, scene.bank, basisOf(scene, control));
  const said = duties
    .filter((duty) => duty.verdict === 'avoid' && incomplete(duty))
    .map(({ name }) => `${name} does not say where`);
  if (verdict !== 'clear') return { verdict, said };
  const { corners } = scene.model.corners;
  for (let k = 0; k < 2; k++) {
    const index = random.whole(0, corners.length - 1);
    const toleranceSign = index === 0 ? 0 : index <= (corners.length - 1) / 2 ? -1 : 1;
    const counts = random.oneOf(scene.levels).vectors[0]!;
    const pct = busVoltagesPct(site, { corner: corners[index]!.corner, toleranceSign, counts });
    said.push(
      ...buses.flatMap((name, bus) =>
        passed(
          scene.site,
          name,
          pct.map((ofOrder) => ofOrder[bus]!),
        ),
      ),
      ...overloaded(scene, corners[index]!, pct),
    );
  }
  return { verdict, said };
}

// What the network's own capacitors carry at those voltages, held against their nameplates.
function overloaded({ site, model }: NetworkScene, { corner, network }: CornerCase, pct: number[][]): string[] {
  const { capacitanceFactor, inductanceFactor } = model.corners.networks[network]!.state!.tolerance ?? NAMEPLATE;
  expect([corner.networkCapacitanceFactor ?? 1, corner.networkInductanceFactor ?? 1]).toEqual([
    capacitanceFactor,
    inductanceFactor,
  ]);
  return site.topology!.capacitors.flatMap(({ name, bus, group }, c) => {
    if (model.corners.networks[network]!.state!.capacitorsIn[c] === 0) return [];
    const slow = { exponent: site.supply.resistanceExponent, capacitanceFactor, inductanceFactor };
    const ohm = (h: number): number => group.ratedV ** 2 / (group.ratedKvar * 1000) / capacitanceFactor / h;
    const amperes = ORDERS_H.map(
      (h, i) => ((pct[i]![bus]! / 100) * site.nominalV * admittanceOfStage(slow, group, h).size) / Math.sqrt(3),
    );
    const first = (site.highestV / Math.sqrt(3)) * admittanceOfStage({ ...slow, exponent: 0 }, group, 1).size;
    const volts = ORDERS_H.map((h, i) => Math.sqrt(3) * amperes[i]! * ohm(h));
    const currentLimit = site.rules === 'iec' ? 1.3 * capacitanceFactor : 1.35;
    const found = [
      Math.hypot(first, ...amperes) / ((currentLimit * group.ratedKvar * 1000) / (Math.sqrt(3) * group.ratedV)),
      Math.hypot(Math.sqrt(3) * first * ohm(1), ...volts) / (1.1 * group.ratedV),
    ];
    // the reactor's resistance is in the second method's fundamental, a ten-thousandth of it
    return found.some((ratio) => ratio > 1 + 1e-4) ? [`clear, yet ${name} at ${Math.max(...found)}`] : [];
  });
}

// Limits passed by a bus's voltages, one an order.
function passed(site: SettledSite, bus: string, pct: number[]): string[] {
  const limits = voltageLimits(site.rules, site.nominalV, site.emcClass);
  const over = ORDERS_H.filter((orderH, i) => pct[i]! > limits.orderPct(orderH)! * (1 + 1e-9));
  const distortion = Math.hypot(...pct);
  return [
    ...over.map((orderH) => `clear, yet order ${orderH} at ${bus}`),
    ...(distortion > limits.distortionPct * (1 + 1e-9) ? [`clear, yet ${distortion} % at ${bus}`] : []),
  ];
}

describe(`verdicts on ${SITES} generated sites (seed ${SEED})`, () => {
  const totals = new Map<string, number>();

  it('are never clear where a second method finds a limit passed, and avoid says where and by how much', () => {
    for (let k = 0; k < SITES; k++) {
      const random = chance(SEED + 104_729 * k);
      const isNetwork = k % NETWORK_EVERY === 0;
      const { verdict, said } = isNetwork ? networkObjections(random) : oneBusObjections(random);
      expect(said, `site ${k}`).toEqual([]);
      const key = `${isNetwork ? 'network' : 'one bus'}, ${verdict}`;
      totals.set(key, (totals.get(key) ?? 0) + 1);
    }
  }, 14_400_000);

  it('are of every sort', () => {
    for (const shape of ['one bus', 'network']) {
      for (const verdict of ['clear', 'watch', 'avoid']) {
        expect(
          totals.get(`${shape}, ${verdict}`),
          `${shape}, ${verdict}: ${JSON.stringify([...totals])}`,
        ).toBeGreaterThan(0);
      }
    }
  });

  it('control: a clear verdict on twenty times the load is objected to', () => {
    let objected = 0;
    for (let k = 1; k < 40; k++) {
      const random = chance(SEED + 104_729 * k);
      const site = oneBusSite(random);
      const record = madeRecord({ ...driftingLoad(random, 8, 300, 0.8), intervalS: INTERVAL_S });
      const outcome = assessBank(site, record, UTC_TABLE);
      if (outcome.result.verdict !== 'clear') continue;
      const distorting = outcome.site.loads.distorting!.map((load) => ({
        ...load,
        fundamentalA: 20 * load.fundamentalA,
      }));
      const worse = { ...outcome, site: { ...outcome.site, loads: { ...outcome.site.loads, distorting } } };
      if (objectionsTo(worse).said.length > 0) objected++;
    }
    expect(objected).toBeGreaterThan(0);
  });
});
