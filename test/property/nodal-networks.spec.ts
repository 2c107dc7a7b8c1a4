// Relations that hold whatever the network: no figure here is known beforehand.
import { describe, expect, it } from 'vitest';
import {
  bankModel,
  eachFlow,
  type NetworkInput,
  networkScene,
  nodalTable,
  type ScannedLevel,
  type Site,
  scanSite,
  tableAt,
} from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { madeBuses } from '../support/made-buses.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

const ordersH = Float64Array.of(1, 2.5, 4.7, 5, 7, 11, 13.3, 25, 49);
const made = Array.from({ length: runs(20, 400) }, (_, k) => ({ k, site: madeBuses(chance(SEED + 31 * k)) }));

function nominal(site: Site, level?: number): ScannedLevel[] {
  return scanSite(site, { corner: 0, ordersH, ...(level === undefined ? {} : { levelKvar: level }) }).levels;
}

function expectAlike(found: ScannedLevel, expected: ScannedLevel, scale = 1, digits = 10): void {
  for (const [i, ohm] of found.impedanceOhm.entries()) {
    expect((ohm * scale) / expected.impedanceOhm[i]!).toBeCloseTo(1, digits);
  }
  expect(found.parallelOrderH === null).toBe(expected.parallelOrderH === null);
  if (found.parallelOrderH !== null) expect(found.parallelOrderH).toBeCloseTo(expected.parallelOrderH!, 4);
}

// Every rating k times as large, every impedance k times as small.
function scaled(site: Site, k: number): Site {
  const network = site.network!;
  return {
    ...site,
    supply: {
      ...site.supply,
      faultLevelMva: { max: k * site.supply.faultLevelMva.max, min: k * site.supply.faultLevelMva.min! },
      transformers: site.supply.transformers!.map((t) => ({
        ...t,
        ratedKva: k * t.ratedKva,
        loadLossKw: k * t.loadLossKw!,
      })),
    },
    loads: { ...site.loads, dampingKw: { max: k * site.loads!.dampingKw!.max!, min: k * site.loads!.dampingKw!.min! } },
    bank: { ...site.bank!, stages: site.bank!.stages.map((s) => ({ ...s, ratedKvar: k * s.ratedKvar })) },
    network: {
      ...network,
      cables: network.cables!.map((cable) => ({ ...cable, lengthM: cable.lengthM / k })),
      generators: network.generators!.map((g) => ({ ...g, ratedKva: k * g.ratedKva })),
      motors: network.motors!.map((m) => ({ ...m, kw: k * m.kw })),
      resistive: network.resistive!.map((r) => ({ ...r, kw: k * r.kw })),
      capacitors: network.capacitors!.map((c) => ({ ...c, ratedKvar: k * c.ratedKvar })),
      banks: (network.banks ?? []).map((bank) => ({
        ...bank,
        stages: bank.stages.map((stage) => ({ ...stage, ratedKvar: k * stage.ratedKvar })),
      })),
    },
  };
}

describe(`a network of several buses (seed ${SEED})`, () => {
  it.each(made)('$k: keeps its resonances where MVA, kW and kvar grow alike', ({ site }) => {
    const found = nominal(scaled(site, 3));
    for (const [k, expected] of nominal(site).entries()) expectAlike(found[k]!, expected, 3);
  });

  it.each(made)('$k: takes two equal transformers side by side for one of twice the rating', ({ site }) => {
    const [first, ...others] = site.supply.transformers!;
    const twin = first ?? { ratedKva: 800, impedancePct: 5, loadLossKw: 7, bus: site.network!.buses[0]!.name };
    const whole = { ...twin, ratedKva: 2 * twin.ratedKva, loadLossKw: 2 * twin.loadLossKw! };
    const withThese = (transformers: (typeof twin)[]): Site => ({ ...site, supply: { ...site.supply, transformers } });
    const found = nominal(withThese([twin, twin, ...others]));
    for (const [k, expected] of nominal(withThese([whole, ...others])).entries()) expectAlike(found[k]!, expected);
  });

  it.each(made)('$k: sees no difference in a stage split in halves, at the levels both have', ({ site }) => {
    const [first, ...others] = site.bank!.stages;
    const bank = {
      ...site.bank!,
      stages: [{ ...first!, count: 2 * first!.count, ratedKvar: first!.ratedKvar / 2 }, ...others],
    };
    const [whole, halved] = [networkScene(site).levels, networkScene({ ...site, bank }).levels];
    const both = whole.filter(({ levelKvar }) => halved.some((level) => Math.abs(level.levelKvar - levelKvar) < 1e-6));
    expect(both.length).toBe(whole.length);
    for (const { levelKvar } of [both[1]!, both.at(-1)!]) {
      const found = nominal({ ...site, bank }, levelKvar);
      for (const [k, expected] of nominal(site, levelKvar).entries()) {
        for (const [i, ohm] of found[k]!.impedanceOhm.entries())
          expect(ohm / expected.impedanceOhm[i]!).toBeCloseTo(1, 10);
      }
    }
  });

  it.each(made)('$k: answers at bus i for a current at j as at j for one at i, with the bank in', ({ site }) => {
    const buses = site.network!.buses.map(({ name }) => name);
    const ohm = buses.map((bus) => voltages(site, bus));
    for (const i of buses.keys()) {
      for (const j of buses.keys()) {
        for (const [h, v] of ohm[i]![j]!.entries()) expect(v / ohm[j]![i]![h]!).toBeCloseTo(1, 9);
      }
    }
  });

  it.each(made)('$k: takes power in and gives none out, at every bus, standing and order', ({ site }) => {
    const { model } = networkScene(site);
    for (const [network, nodal] of model.nodal!.cases.entries()) {
      const { z, nodes } = nodalTable(nodal, ordersH);
      for (const i of ordersH.keys()) {
        for (let k = 0; k < nodes; k++) expect(z[2 * (i * nodes * nodes + k * nodes + k)]!).toBeGreaterThanOrEqual(0);
      }
      for (const g of tableAt(model, network, ordersH).bus.re) expect(g).toBeGreaterThan(0);
    }
  });

  it.each(made)('$k: never sees more at a bus that is given a resistance', ({ site, k }) => {
    const buses = site.network!.buses.map(({ name }) => name);
    const at = k % buses.length;
    const before = nominal(site)[at]!;
    for (const kw of [1, 100, 3000]) {
      const network = { ...site.network!, resistive: [...site.network!.resistive!, { bus: buses[at]!, kw }] };
      const after = nominal({ ...site, network })[at]!;
      for (const [i, ohm] of after.impedanceOhm.entries()) {
        expect(ohm).toBeLessThanOrEqual(before.impedanceOhm[i]! * (1 + 1e-12));
      }
    }
  });

  it('control: a capacitor in that place does raise it at some order', () => {
    const raised = made.filter(({ site }) => {
      const bus = site.network!.buses[0]!.name;
      const capacitors = [...site.network!.capacitors!, { bus, count: 1, ratedKvar: 100, ratedV: site.bus.nominalV }];
      const after = nominal({ ...site, network: { ...site.network!, capacitors } })[0]!;
      const before = nominal(site)[0]!;
      return after.impedanceOhm.some((ohm, i) => ohm > before.impedanceOhm[i]! * 1.01);
    });
    expect(raised.length).toBeGreaterThan(made.length / 2);
  });

  it.each(made)('$k: takes buses joined by closed couplers for one', ({ site }) => {
    const network = site.network!;
    const joined = network.couplers!.filter(({ state }) => state === 'closed').map(({ between }) => between);
    const names = new Map(network.buses.map(({ name }) => [name, name]));
    for (const [from, to] of joined) {
      const merged = names.get(to)!;
      for (const [name, of] of names) if (of === merged) names.set(name, names.get(from)!);
    }
    const apart = nominal(site);
    const one = nominal(renamed(site, names));
    const kept = [...new Set(names.values())];
    expect(one).toHaveLength(kept.length);
    for (const found of apart) expectAlike(found, one.find(({ bus }) => bus === names.get(found.bus))!);
  });
});

// The same site with every bus called by the name of the one it is joined to.
function renamed(site: Site, names: ReadonlyMap<string, string>): Site {
  const network = site.network!;
  const at = <T extends { bus: string }>(part: T): T => ({ ...part, bus: names.get(part.bus)! });
  const ends = <T extends { between: [string, string] }>(part: T): T => ({
    ...part,
    between: [names.get(part.between[0])!, names.get(part.between[1])!],
  });
  const linked = <T extends { between: [string, string] }>(parts: T[]): T[] =>
    parts.map(ends).filter(({ between: [from, to] }) => from !== to);
  const kept = new Set(names.values());
  // The first bus stands first: a source without transformer stands there, and a bank where none is named.
  const first = names.get(network.buses[0]!.name)!;
  const merged: NetworkInput = {
    ...network,
    buses: [first, ...[...kept].filter((name) => name !== first)].map((name) => ({ name })),
    couplers: linked(network.couplers!),
    cables: linked(network.cables!),
    generators: network.generators!.map(at),
    motors: network.motors!.map(at),
    resistive: network.resistive!.map(at),
    capacitors: network.capacitors!.map(at),
    banks: (network.banks ?? []).map(at),
    bankBus: names.get(network.bankBus ?? network.buses[0]!.name)!,
  };
  const transformers = site.supply.transformers!.map((t) => ({ ...t, bus: names.get(t.bus!)! }));
  return { ...site, supply: { ...site.supply, transformers }, network: merged };
}

// Volts at every bus for 1 A at one of them, all stages in, nominal.
function voltages(site: Site, bus: string): Float64Array[] {
  const orders = Array.from(ordersH, (orderH) => ({ orderH, pct: 100 }));
  const loads = { ...site.loads, distorting: [{ name: 'one', bus, fundamentalA: 1, orders }] };
  const { model, bank, levels } = networkScene({ ...site, loads });
  const here = { ...model, corners: { ...model.corners, corners: model.corners.corners.slice(0, 1) } };
  const top = { ...levels.at(-1)!, vectors: levels.at(-1)!.vectors.slice(0, 1) };
  const found: Float64Array[] = [];
  eachFlow(here, bankModel(here, bank, [top]), ({ buses }) =>
    found.push(...buses.map(({ voltageV }) => voltageV.slice())),
  );
  return found;
}

describe('a site with one bus', () => {
  const site = (network?: NetworkInput): Site =>
    madeSite({
      ...(network === undefined ? {} : { network }),
      supply: {
        faultLevelMva: { max: 250, min: 120 },
        arrangement: 'parallel',
        transformers: [
          { ratedKva: 1000, impedancePct: 6, loadLossKw: 10.5 },
          { ratedKva: 630, impedancePct: 4, loadLossKw: 6 },
        ],
      },
      loads: {
        distorting: [
          { name: 'drives', fundamentalA: 400, spectrum: 'six-pulse' },
          { name: 'rectifier', fundamentalA: 150, spectrum: 'twelve-pulse' },
        ],
        backgroundPct: [{ orderH: 5, pct: 2 }],
        dampingKw: { max: 300, min: 50 },
      },
      bank: {
        stages: [
          { count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 },
          { count: 1, ratedKvar: 25, ratedV: 440 },
        ],
      },
    });
  const alone = site();
  const named = site({ buses: [{ name: 'main' }] });

  it('is the same whether its network is written out or not: scan and peaks', () => {
    const grid = Float64Array.from({ length: 246 }, (_, i) => 1 + i / 5);
    const [a, b] = [alone, named].map((each) => scanSite(each, { ordersH: grid }).levels);
    expect(b!.length).toBe(a!.length);
    for (const [k, level] of a!.entries()) {
      expect(b![k]!.corner).toEqual(level.corner);
      for (const [i, ohm] of level.impedanceOhm.entries()) {
        expect(Math.abs(b![k]!.impedanceOhm[i]! / ohm - 1)).toBeLessThan(1e-12);
      }
      expect(b![k]!.parallelOrderH).toBeCloseTo(level.parallelOrderH!, 5);
    }
  });

  it('and the flow of every level, corner and order', () => {
    const flows = [alone, named].map((each) => {
      const { model, bank, levels } = networkScene(each);
      const all: number[] = [];
      eachFlow(model, bankModel(model, bank, levels), (flow) =>
        all.push(
          flow.voltageDistortionPct,
          ...flow.voltageV,
          ...flow.sourceA,
          ...flow.bankA,
          ...flow.stageA.flatMap((a) => [...a]),
        ),
      );
      return all;
    });
    expect(flows[0]!.length).toBeGreaterThan(1000);
    expect(flows[1]!.length).toBe(flows[0]!.length);
    for (const [i, value] of flows[0]!.entries()) {
      expect(Math.abs(flows[1]![i]! - value)).toBeLessThanOrEqual(1e-12 * Math.abs(value));
    }
  });
});
