// Second methods: a dense scan of |Z| built from the nameplates (test/support/slow-network.ts), and Foster's theorem
// for the lossless circuit, by which exactly one parallel resonance lies between neighbouring tuned orders.
import { describe, expect, it } from 'vitest';
import { type Peak, PeakFinder } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { type MadeNetwork, madeBank, madeGroup, modelOf, randomNetwork, slowNetwork } from '../support/made-network.js';
import { bankAdmittance, busImpedance, type SlowNetwork, sourceImpedance } from '../support/slow-network.js';
import { runs, SEED } from '../support/soak.js';

const HIGHEST_H = 50;

interface Compared {
  found: Peak[];
  greatest: Peak | null;
  network: SlowNetwork;
}

// The engine's peaks with all stages in, in the corners asked for, and the same circuit for the second method.
function peaksOf(made: MadeNetwork, corners: (count: number) => number[]): Compared[] {
  const { model, levels } = modelOf(made);
  const finder = new PeakFinder(model, made.bank);
  const all = model.corners.corners;
  const vector = levels[levels.length - 1]!.vectors[0]!;
  return corners(all.length).map((index) => {
    const corner = all[index]!;
    return {
      found: finder.peaks(vector, corner),
      greatest: finder.greatest(vector, corner),
      network: slowNetwork(made, { corner: corner.corner, index, corners: all.length, vector }),
    };
  });
}

function tunedOrders(network: SlowNetwork): number[] {
  return network.stages
    .filter(({ stage, count }) => stage.reactorPct > 0 && count > 0)
    .map(({ stage }) => 1 / Math.sqrt((stage.reactorPct / 100) * network.capacitanceFactor * network.inductanceFactor))
    .sort((a, b) => a - b);
}

function denseOrders(network: SlowNetwork): number[] {
  const orders = new Set<number>();
  for (let h = 1; h <= HIGHEST_H; h += 0.004) orders.add(h);
  for (const tuned of tunedOrders(network)) for (let k = -400; k <= 400; k++) orders.add(tuned * (1 + k * 1e-5));
  return [...orders].filter((h) => h >= 1 && h <= HIGHEST_H).sort((a, b) => a - b);
}

function densePeaks(network: SlowNetwork): Peak[] {
  const orders = denseOrders(network);
  const ohm = orders.map((h) => busImpedance(network, h).size);
  const peaks: Peak[] = [];
  for (let i = 1; i < orders.length - 1; i++) {
    if (!(ohm[i]! > ohm[i - 1]! && ohm[i]! >= ohm[i + 1]!)) continue;
    peaks.push(climbed(network, orders[i - 1]!, orders[i + 1]!));
  }
  return peaks;
}

// Narrows to the top by thirds.
function climbed(network: SlowNetwork, low: number, high: number): Peak {
  const ohm = (h: number): number => busImpedance(network, h).size;
  let [a, b] = [low, high];
  for (let step = 0; step < 60; step++) {
    const [left, right] = [a + (b - a) / 3, b - (b - a) / 3];
    if (ohm(left) < ohm(right)) a = left;
    else b = right;
  }
  return { orderH: (a + b) / 2, impedanceOhm: ohm((a + b) / 2) };
}

// A peak at the very ends of the range is no interior one.
function interior(peaks: Peak[]): Peak[] {
  return peaks.filter(({ orderH }) => orderH > 1.001 && orderH < HIGHEST_H - 0.001);
}

describe(`peaks of the impedance against a dense scan (seed ${SEED})`, () => {
  const made = Array.from({ length: runs(40, 1500) }, (_, k) => randomNetwork(chance(SEED + k)));

  it('finds every peak of the dense scan, to 1e-4 of an order, and no other', () => {
    for (const network of made) {
      for (const compared of peaksOf(network, (count) => [0, 1, count - 1])) {
        const expected = interior(densePeaks(compared.network));
        const found = interior(compared.found);
        expect(found.length, JSON.stringify(compared)).toBe(expected.length);
        found.forEach((peak, k) => {
          expect(Math.abs(peak.orderH - expected[k]!.orderH), JSON.stringify(compared)).toBeLessThan(1e-4);
          expect(peak.impedanceOhm / expected[k]!.impedanceOhm).toBeCloseTo(1, 7);
        });
      }
    }
  });

  it('calls the peak with the largest impedance the parallel resonance, and says so where there is none', () => {
    for (const network of made) {
      for (const { greatest, network: slow } of peaksOf(network, (count) => [0, count - 1])) {
        const most = interior(densePeaks(slow)).reduce((max, { impedanceOhm }) => Math.max(max, impedanceOhm), 0);
        expect(greatest?.impedanceOhm ?? 0).toBeCloseTo(most, 6);
        if (greatest !== null) expect(busImpedance(slow, greatest.orderH).size).toBeCloseTo(most, 6);
      }
    }
  });
});

// Susceptance of source and bank without any resistance; rises everywhere between its poles.
function susceptance(network: SlowNetwork, h: number): number {
  const lossless: SlowNetwork = {
    ...network,
    rOverX: 0,
    transformers: network.transformers.map((transformer) => ({ ...transformer, loadLossKw: 0 })),
    stages: network.stages.map(({ stage, count }) => ({ stage: { ...stage, reactorQuality: 1e300 }, count })),
  };
  return sourceImpedance(lossless, h).inverse().plus(bankAdmittance(lossless, h)).im;
}

// One zero between neighbouring poles, found by halving; the last piece has one only where a plain stage is in.
function fosterOrders(network: SlowNetwork): number[] {
  const plain = network.stages.some(({ stage, count }) => count > 0 && stage.reactorPct === 0);
  const poles = [0, ...tunedOrders(network), ...(plain ? [1e4] : [])];
  return poles.slice(1).map((high, k) => {
    let [a, b] = [poles[k]!, high];
    for (let step = 0; step < 200; step++) {
      const middle = (a + b) / 2;
      if (middle <= a || middle >= b) break;
      if (susceptance(network, middle) < 0) a = middle;
      else b = middle;
    }
    return (a + b) / 2;
  });
}

// Two or three groups, the tuned orders of two of them as near to each other as their quality lets them be apart.
function plantedNetwork(seed: number): MadeNetwork {
  const random = chance(seed);
  const quality = random.oneOf([1e3, 1e4, 1e5]);
  const apart = random.between(30, 300) / quality;
  const reactorPct = random.oneOf([5.67, 7, 12.5, 14]);
  const nominalV = 400;
  const tuned = (pct: number): ReturnType<typeof madeGroup> =>
    madeGroup({
      count: random.whole(1, 3),
      ratedKvar: random.oneOf([1, 5, 25, 50]),
      ratedV: 525,
      reactorPct: pct,
      reactorQuality: quality,
    });
  const groups = [tuned(reactorPct), tuned(reactorPct * (1 + apart))];
  if (random.next() < 0.5) groups.push(madeGroup({ ratedKvar: random.oneOf([1, 25, 200]), ratedV: 440 }));
  if (random.next() < 0.3) groups.push(tuned(random.oneOf([2, 4, 20])));
  return {
    nominalV,
    supply: {
      faultLevelMva: { max: random.between(10, 100), min: 8 },
      rOverX: 1e-4,
      resistanceExponent: 0.5,
      rippleHz: null,
      transformers: [],
    },
    loads: {
      motorSharePct: 60,
      distorting: [],
      backgroundPct: [],
      dampingKw: { min: 0, max: 0 },
      summation: 'exponent',
    },
    bank: madeBank(groups),
  };
}

describe(`narrow peaks planted between nearly equal tuned orders (seed ${SEED})`, () => {
  const made = Array.from({ length: runs(150, 5000) }, (_, k) => plantedNetwork(SEED + k));

  it('misses none: one at every order at which the lossless circuit resonates', () => {
    let between = 0;
    for (const network of made) {
      for (const { found, network: slow } of peaksOf(network, (count) => [0, 1, count - 1])) {
        const expected = fosterOrders(slow).filter((h) => h > 1.05 && h < 49.5);
        between += expected.length;
        for (const orderH of expected) {
          // Resistances move a peak by no more than a few of its own widths.
          const width = (20 * orderH) / Math.min(...slow.stages.map(({ stage }) => stage.reactorQuality));
          const near = found.filter((peak) => Math.abs(peak.orderH - orderH) < width);
          expect(near.length, `${orderH} in ${JSON.stringify({ found, slow })}`).toBeGreaterThan(0);
        }
      }
    }
    expect(between).toBeGreaterThan(2 * made.length);
  });

  it('control: an even grid of a fiftieth of an order misses some of them', () => {
    let missed = 0;
    for (const network of made) {
      const [compared] = peaksOf(network, () => [0]);
      const ohm = Array.from({ length: 2451 }, (_, i) => busImpedance(compared!.network, 1 + i * 0.02).size);
      const seen = ohm.filter((z, i) => i > 0 && i < 2450 && z > ohm[i - 1]! && z >= ohm[i + 1]!).length;
      if (seen < compared!.found.length) missed++;
    }
    expect(missed).toBeGreaterThan(made.length / 4);
  });
});
