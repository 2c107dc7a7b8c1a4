// Second method: the circuit of the site file, every element a row, solved by elimination (test/support/slow-circuit.ts);
// the response to each source by itself is turned by its angle and added, as superposition has it.
import { describe, expect, it } from 'vitest';
import { bankModel, type DistortingLoad, eachFlow, networkScene, type Site } from '#libs/engine/index.js';
import { busesNetlist } from '../support/buses-netlist.js';
import { chance } from '../support/chance.js';
import { madeBuses } from '../support/made-buses.js';
import { runs, SEED } from '../support/soak.js';
import { slowPhasors } from '../support/slow-circuit.js';

const LOAD_A = 100;

interface Angled {
  bus: string;
  angleDeg?: number;
}

// Harmonic voltages of every bus and the supply's current, nominal corner, all stages in.
function flowed(site: Site, orderH: number, sources: readonly Angled[]): { busesV: number[]; sourceA: number } {
  const distorting = sources.map(({ bus, angleDeg }, k): DistortingLoad => {
    const order = {
      orderH,
      pct: 100,
      ...(angleDeg === undefined ? {} : { angleDeg }),
    };
    return { name: `load ${k}`, bus, fundamentalA: LOAD_A, orders: [order] };
  });
  const { model, bank, levels } = networkScene({
    ...site,
    loads: { ...site.loads, distorting, backgroundPct: [] },
  });
  const nominal = {
    ...model,
    corners: { ...model.corners, corners: [model.corners.corners[0]!] },
  };
  const found: { busesV: number[]; sourceA: number }[] = [];
  eachFlow(nominal, bankModel(nominal, bank, [allIn(levels)]), ({ buses, sourceA }) => {
    found.push({
      busesV: buses.map(({ voltageV }) => voltageV[0]!),
      sourceA: sourceA[0]!,
    });
  });
  return found[0]!;
}

function allIn<L extends { vectors: Int32Array[] }>(levels: readonly L[]): L {
  const last = levels.at(-1)!;
  return { ...last, vectors: [last.vectors[0]!] };
}

// The same voltages by superposition of the circuit's own phasors.
function superposed(site: Site, orderH: number, sources: readonly Angled[]): number[] {
  const { model, levels } = networkScene(site);
  const buses = site.network!.buses;
  const sum = buses.map(() => ({ re: 0, im: 0 }));
  for (const { bus, angleDeg = 0 } of sources) {
    const circuit = {
      tag: 'q',
      toleranceSign: 0,
      counts: allIn(levels).vectors[0]!,
      drive: { bus },
    };
    const lines = busesNetlist(site, { ...circuit, corner: model.corners.corners[0]!.corner }, orderH);
    const phasors = slowPhasors(lines, orderH * site.frequencyHz);
    const [cos, sin] = [Math.cos((angleDeg * Math.PI) / 180), Math.sin((angleDeg * Math.PI) / 180)];
    for (const [k, v] of sum.entries()) {
      const { re, im } = phasors.get(`n${k}q`)!;
      v.re += LOAD_A * (re * cos - im * sin);
      v.im += LOAD_A * (re * sin + im * cos);
    }
  }
  return sum.map(({ re, im }) => Math.hypot(re, im));
}

const cases = Array.from({ length: runs(8, 60) }, (_, number) => {
  const random = chance(SEED + 104_729 * number);
  const site = madeBuses(random);
  const names = site.network!.buses.map(({ name }) => name);
  const orderH = random.oneOf([5, 7, 11, 13, 23.5]);
  const sources = Array.from({ length: 4 }, () => ({
    bus: names[random.whole(0, names.length - 1)]!,
    angleDeg: random.whole(-180, 180),
  }));
  return { number, site, orderH, sources };
});

describe(`sources with angles on networks of several buses (seed ${SEED})`, () => {
  it.each(cases)('network $number: the voltages are those of the circuit', ({ site, orderH, sources }) => {
    const { busesV } = flowed(site, orderH, sources);
    const most = Math.max(...busesV);
    for (const [k, expected] of superposed(site, orderH, sources).entries()) {
      expect(Math.abs(busesV[k]! - expected) / most).toBeLessThan(1e-9);
    }
  });

  it.each(cases)('network $number: turning every angle alike changes nothing', ({ site, orderH, sources }) => {
    const turned = sources.map(({ bus, angleDeg }) => ({ bus, angleDeg: ((angleDeg + 77 + 540) % 360) - 180 }));
    const { busesV, sourceA } = flowed(site, orderH, sources);
    const again = flowed(site, orderH, turned);
    for (const [k, v] of busesV.entries())
      expect(Math.abs(again.busesV[k]! - v)).toBeLessThan(1e-9 * Math.max(...busesV));
    expect(again.sourceA / sourceA).toBeCloseTo(1, 9);
  });

  it('control: equal angles at two buses come to more than the exponent gives, and opposed ones at one bus to nothing', () => {
    const { site } = cases.find(({ site: { network } }) => network!.buses.length > 1)!;
    const [a, b] = site.network!.buses.map(({ name }) => name) as [string, string];
    const unknown = flowed(site, 11, [{ bus: a }, { bus: b }]);
    const alike = flowed(site, 11, [
      { bus: a, angleDeg: 30 },
      { bus: b, angleDeg: 30 },
    ]);
    const opposed = flowed(site, 11, [
      { bus: a, angleDeg: 30 },
      { bus: a, angleDeg: -150 },
    ]);
    expect(alike.busesV[0]!).toBeGreaterThan(1.05 * unknown.busesV[0]!);
    expect(opposed.busesV[0]!).toBeLessThan(1e-9 * unknown.busesV[0]!);
  });
});
