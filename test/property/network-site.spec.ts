// A site of several buses as the site file gives it, assessed whole.
import { evaluate } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { readSite } from '#libs/contract/read-site.js';
import { assessBank, type Figure, InputProblem, UTC_TABLE } from '#libs/engine/index.js';
import { workingOf } from '#libs/present/figure-words.js';
import { chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { SEED } from '../support/soak.js';

const record = madeRecord(driftingLoad(chance(SEED), 96, 250, 0.9));
const transformer = { ratedKva: 1000, impedancePct: 6, impedanceTolerancePct: 0, loadLossKw: 10 };

/** Two boards with a coupler, a cable to a third, a generator on the first; invented. */
function siteFile(network: Record<string, unknown> = {}, rest: Record<string, unknown> = {}) {
  return {
    name: 'Invented Mill',
    timeZone: 'UTC',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400, highestV: 420 },
    meteredAt: 'bus',
    supply: {
      faultLevelMva: { max: 250, min: 180 },
      transformers: [
        { ...transformer, bus: 'A' },
        { ...transformer, bus: 'B' },
      ],
    },
    loads: {
      distorting: [{ name: 'drives', bus: 'C', fundamentalA: 200, spectrum: 'six-pulse-choke' }],
      backgroundPct: [],
    },
    network: {
      buses: [{ name: 'A' }, { name: 'B' }, { name: 'C' }],
      couplers: [{ between: ['A', 'B'], state: 'open' }],
      cables: [{ between: ['B', 'C'], lengthM: 60, crossSectionMm2: 240, parallel: 2 }],
      bankBus: 'B',
      ...network,
    },
    bank: { stages: [{ count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 }] },
    ...rest,
  };
}

const assessed = (network = {}, rest = {}) => assessBank(readSite(siteFile(network, rest)), record, UTC_TABLE).result;
const device = (result: ReturnType<typeof assessed>, name: string) =>
  result.devices.find((row) => row.device === name)!;

function evaluated(figure: Figure): number {
  const plain = workingOf(figure)
    .replaceAll('−', '-')
    .replaceAll('·', '*')
    .replaceAll('√', 'sqrt')
    .replaceAll('ln(', 'log(')
    .replaceAll('π', 'pi');
  return evaluate(plain) as number;
}

describe('a site of several buses', () => {
  const plain = assessed();

  it('is judged at every bus, and says which', () => {
    expect(plain.limits).toMatchObject({ points: ['A', 'B', 'C'], couplingPoint: 'B' });
    const row = plain.duties.find(({ name }) => name === 'voltage distortion')!;
    expect(row.bus).toBe('C'); // the loads stand at the end of the cable
    expect(new Set(plain.network.levels.map(({ bus }) => bus))).toEqual(new Set(['A', 'B', 'C']));
  });

  it('is judged at the transformers’ primary too where its point of coupling is there', () => {
    const result = assessed({ couplingPoint: 'primary' });
    expect(result.limits).toMatchObject({ points: ['A', 'B', 'C', 'primary'], couplingPoint: 'primary' });
  });

  it('has more fault current with the coupler closed or a generator running, never less', () => {
    const open = Number(device(plain, 'mainDevice.breaking').value);
    const closed = assessed({ couplers: [{ between: ['A', 'B'], state: 'either' }] });
    const generator = { bus: 'B', ratedKva: 400, subtransientPct: 12, state: 'either' };
    const running = assessed({ generators: [generator] });
    // two equal transformers side by side: nearly twice as much, less the network's share
    expect(Number(device(closed, 'mainDevice.breaking').value) / open).toBeGreaterThan(1.6);
    // 1.05 · 400 V / (√3 · 48 mΩ · √(1 + 0.15²)) is 5.0 kA
    expect(Number(device(running, 'mainDevice.breaking').value) - open).toBeGreaterThan(4);
    expect(device(running, 'generator.holdOff').state).toBe('open');
    expect(plain.devices.some((row) => row.device === 'generator.holdOff')).toBe(false);
  });

  it('counts its motors in the fault current', () => {
    const motors = assessed({ motors: [{ bus: 'C', kw: '200 hp' }] });
    const added =
      Number(device(motors, 'mainDevice.breaking').value) - Number(device(plain, 'mainDevice.breaking').value);
    // the listed motors stand for the damping load of the record, which counted before
    const listed = (1.05 * 5 * 200 * 0.745_699_87) / (Math.sqrt(3) * 400 * 0.8);
    const meanKw = record.activeKw.reduce((sum, kw) => sum + kw, 0) / record.activeKw.length;
    const before = (1.05 * 5 * 0.6 * meanKw) / (Math.sqrt(3) * 400 * 0.8);
    expect(added).toBeCloseTo(listed - before, 6);
  });

  it('has a working for every figure that gives the figure', () => {
    for (const figure of plain.figures) {
      expect(Math.abs(evaluated(figure) - figure.value), figure.id).toBeLessThanOrEqual(
        1e-7 * Math.abs(figure.value) + 1e-9,
      );
    }
  });

  it('on one named bus is the site without a network', () => {
    const one = siteFile();
    const supply = { faultLevelMva: { max: 250, min: 180 }, transformers: [transformer] };
    const loads = {
      distorting: [{ name: 'drives', fundamentalA: 200, spectrum: 'six-pulse-choke' }],
      backgroundPct: [],
    };
    const { network: _, ...without } = { ...one, supply, loads };
    const named = { ...without, network: { buses: [{ name: 'main' }] } };
    const [a, b] = [without, named].map((json) => assessBank(readSite(json), record, UTC_TABLE).result);
    expect(b!.verdict).toBe(a!.verdict);
    for (const [k, duty] of a!.duties.entries()) expect(b!.duties[k]!.value / duty.value).toBeCloseTo(1, 9);
    for (const [k, row] of a!.devices.entries()) {
      expect(b!.devices[k]!.state).toBe(row.state);
      if (row.device === 'mainDevice.breaking') {
        // several buses leave the network's own voltage factor out: an upper bound
        expect(Number(b!.devices[k]!.value)).toBeGreaterThanOrEqual(Number(row.value));
      }
    }
  });

  it('with an island is refused by its bus', () => {
    const json = siteFile({ cables: [] });
    expect(() => assessBank(readSite(json), record, UTC_TABLE)).toThrow(InputProblem);
    expect(() => assessBank(readSite(json), record, UTC_TABLE)).toThrow(/network\.buses\[2\]/);
  });
});
