// Reference: ngspice 45 as packed in eecircuit-engine 1.8.0, a general-purpose circuit simulator, fed with the text the
// program itself writes for a reviewer.
import { beforeAll, describe, expect, it } from 'vitest';
import { bankModel, eachFlow, networkScene, type Site, scanSite, siteNetlist } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { CircuitSimulator, type Magnitudes } from '../support/circuit-simulator.js';
import { madeBuses } from '../support/made-buses.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

const simulator = new CircuitSimulator();
beforeAll(() => simulator.start(), 60_000);

/** The stated limit; a coil without resistance is given a hundred-millionth of its reactance. */
const RELATIVE = 1e-6;

// What a reviewer does: one order after the other at the frequency its comment names.
async function readAt(netlist: string, orderH: number): Promise<Magnitudes> {
  const comment = new RegExp(`^\\* order ${`${orderH}`.replace('.', '\\.')}: read at (\\S+) Hz$`, 'm');
  const frequency = comment.exec(netlist)![1]!;
  const [point] = await simulator.sweep(netlist.replace(/^\.ac .*$/m, `.ac lin 1 ${frequency} ${frequency}`));
  return point!.magnitudes;
}

const node = (name: string, orderH: number): string => `v(${name}_${`${orderH}`.replace('.', 'p')})`;

// The bus of each node as the netlist's own comments give it.
function nodesOf(netlist: string, site: Site): string[] {
  const buses = site.network?.buses.map(({ name }) => name) ?? ['main'];
  return buses.map((name) =>
    netlist
      .split('\n')
      .find((line) => line.startsWith(`* ${name}: `))!
      .slice(name.length + 4),
  );
}

const tuned = { count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 };

function sites(): { name: string; site: Site }[] {
  const transformer = { ratedKva: 630, impedancePct: 4 };
  return [
    { name: 'one bus', site: madeSite({ bank: { stages: [tuned, { count: 1, ratedKvar: 25, ratedV: 440 }] } }) },
    {
      name: 'transformers without losses side by side',
      site: madeSite({
        bank: { stages: [tuned] },
        supply: { faultLevelMva: { max: 250 }, arrangement: 'parallel', transformers: [transformer, transformer] },
      }),
    },
    { name: 'no transformer', site: madeSite({ bank: { stages: [tuned] }, supply: { faultLevelMva: { max: 12 } } }) },
    ...Array.from({ length: runs(8, 200) }, (_, k) => ({
      name: `network ${k}`,
      site: madeBuses(chance(SEED + 104_729 * (k + 1))),
    })),
  ];
}

describe(`the netlist a reviewer gets, in a circuit simulator (seed ${SEED})`, () => {
  it.each(sites())('$name: repeats impedance and transfer impedance of the scan', async ({ site }) => {
    const ordersH = Float64Array.of(5, 11.5, 23);
    const place = bankPlace(site);
    const { model } = networkScene(site);
    for (const corner of [0, model.corners.corners.length - 1]) {
      const { network: netlist } = siteNetlist(site, { corner, ordersH });
      const { levels } = scanSite(site, { corner, ordersH });
      const transferOhm = transfers(site, corner, ordersH);
      const nodes = nodesOf(netlist, site);
      for (const [i, orderH] of ordersH.entries()) {
        const found = await readAt(netlist, orderH);
        const own = found.get(node(nodes[place]!, orderH))!;
        expect(Math.abs(own / levels[place]!.impedanceOhm[i]! - 1)).toBeLessThan(RELATIVE);
        for (const [k, ohm] of transferOhm.entries()) {
          const off = Math.abs(found.get(node(nodes[k]!, orderH))! / ohm[i]! - 1);
          expect(off, `corner ${corner}, order ${orderH}, bus ${k}`).toBeLessThan(RELATIVE);
        }
      }
    }
  });

  // A reviewer who reads nothing but the file has to know what each part of it is.
  it('says in its head what every part stands for', () => {
    for (const { site } of sites().slice(0, 40)) {
      const lines = siteNetlist(site, { ordersH: Float64Array.of(5) }).network.split('\n');
      const told = lines.flatMap((line) => line.match(/^\* (\S+?)(?: to \S+)?: /)?.[1] ?? []);
      const parts = lines.flatMap((line) => line.match(/^[rlc]([a-z]+\d*)(?:x\d+)?_/)?.[1] ?? []);
      expect(parts.length).toBeGreaterThan(0);
      expect(new Set(told.map((name) => name.replace(/x\d+$/, '')))).toEqual(
        new Set([...told.map((name) => name.replace(/x\d+$/, '')), ...parts]),
      );
    }
  });

  it('sweeps evenly spaced orders in one go, each read at its own frequency', async () => {
    const { site } = sites()[0]!;
    const ordersH = Float64Array.of(5, 7, 9, 11, 13);
    const points = await simulator.sweep(siteNetlist(site, { ordersH }).network);
    const [scanned] = scanSite(site, { corner: 0, ordersH }).levels;
    expect(points).toHaveLength(ordersH.length);
    for (const [i, { frequencyHz, magnitudes }] of points.entries()) {
      expect(frequencyHz).toBeCloseTo(50 * ordersH[i]!, 6);
      const ohm = magnitudes.get(node('main', ordersH[i]!))!;
      expect(Math.abs(ohm / scanned!.impedanceOhm[i]! - 1)).toBeLessThan(RELATIVE);
    }
  });

  it('control: a copy read at another order than its own is told apart', async () => {
    const { site } = sites()[0]!;
    const ordersH = Float64Array.of(5, 7, 9);
    const [, second] = await simulator.sweep(siteNetlist(site, { ordersH }).network);
    const [scanned] = scanSite(site, { corner: 0, ordersH }).levels;
    const off = second!.magnitudes.get(node('main', 5))! / scanned!.impedanceOhm[1]! - 1;
    expect(Math.abs(off)).toBeGreaterThan(1e2 * RELATIVE);
  });

  it('takes the orders present, or 5, 7, 11 and 13 where none are', () => {
    const orders = (site: Site): string[] => siteNetlist(site, {}).network.match(/(?<=^\* order )\S+(?=:)/gm)!;
    const { site } = sites()[0]!;
    expect(orders(site)).toEqual(['5', '7', '11', '13']);
    expect(orders({ ...site, loads: { distorting: [], backgroundPct: [{ orderH: 3, pct: 1 }] } })).toEqual(['3']);
  });

  // A line break in a name would make its rest a statement of the netlist, a file to be read among them.
  it.each([
    'Works\n.include /etc/passwd',
    'Works\r\nr1 main_5 0 1u',
    'Works\u2028.end',
    'Works\u0085.end "quoted" \'too\' $ ; `x`',
    '.control\nshell ls\n.endc',
  ])('holds nothing of a name but comment: %j', async (name) => {
    const bus = `board\n.end ${name}`;
    const plain = { buses: [{ name: 'a' }, { name: 'b' }], couplers: [], cables: [cable('a', 'b')] };
    const evil = { buses: [{ name: bus }, { name: 'b' }], couplers: [], cables: [{ ...cable(bus, 'b'), name }] };
    const bank = { stages: [tuned] };
    const supply = { faultLevelMva: { max: 12 } };
    const statements = (text: string): string[] =>
      text.split(/[\r\n\u0085\u2028\u2029]+/).filter((line) => !line.startsWith('*'));
    const expected = siteNetlist(madeSite({ bank, supply, network: plain }), {});
    const found = siteNetlist(madeSite({ name, bank, supply, network: evil }), {});
    expect(statements(found.network)).toEqual(statements(expected.network));
    expect(statements(found.inrush!)).toEqual(statements(expected.inrush!));
    expect(found.network.startsWith('* ')).toBe(true);
    expect(await readAt(found.network, 5)).toEqual(await readAt(expected.network, 5));
  });
});

const cable = (from: string, to: string) => ({
  between: [from, to] as [string, string],
  lengthM: 60,
  resistanceOhmPerKm: 0.1,
  reactanceOhmPerKm: 0.08,
});

function bankPlace({ network }: Site): number {
  if (network?.bankBus === undefined) return 0;
  return network.buses.findIndex(({ name }) => name === network.bankBus);
}

// |Z| from the bank's bus to every bus: the voltages 100 A at the bank's bus make, all stages in.
function transfers(site: Site, corner: number, ordersH: Float64Array): Float64Array[] {
  const bus = site.network?.buses[bankPlace(site)]?.name;
  const orders = Array.from(ordersH, (orderH) => ({ orderH, pct: 100 }));
  const load = { name: 'one', fundamentalA: 100, orders, ...(bus === undefined ? {} : { bus }) };
  const { model, bank, levels } = networkScene({ ...site, loads: { ...site.loads, distorting: [load] } });
  const here = { ...model, corners: { ...model.corners, corners: [model.corners.corners[corner]!] } };
  const top = { ...levels.at(-1)!, vectors: levels.at(-1)!.vectors.slice(0, 1) };
  const found: Float64Array[] = [];
  eachFlow(here, bankModel(here, bank, [top]), ({ buses }) => {
    found.push(...buses.map(({ voltageV }) => voltageV.map((v) => v / 100)));
  });
  return found;
}
