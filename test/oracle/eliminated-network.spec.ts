// Reference: the complex inverse of mathjs 15.2.0, a general matrix library, of the admittance matrix put together here
// branch by branch. Near a resonance the last places of that matrix's own entries move its inverse by more than 1e-12; what
// they are worth is then the limit, for the library is off by as much.
import { complex, inv, type Matrix, matrix } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { EliminatedNetwork, type NodalCase, networkScene } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { Complex } from '../support/complex.js';
import { madeBuses } from '../support/made-buses.js';
import { roundingRoom } from '../support/rounding-room.js';
import { runs, SEED } from '../support/soak.js';

function libraryImpedance(network: NodalCase, orderH: number): { y: Complex[][]; z: Complex[][] } {
  const y = Array.from({ length: network.nodes }, (_, r) =>
    Array.from({ length: network.nodes }, (_, c) => new Complex(r === c ? network.conductance[r]! : 0)),
  );
  const growth = orderH ** network.resistanceExponent;
  const source = { from: network.sourceNode, to: -1, steadyOhm: 0, ...network.source, capacitiveOhm: 0 };
  for (const { from, to, steadyOhm, rOhm, xOhm, capacitiveOhm } of [...network.branches, source]) {
    const admittance = new Complex(steadyOhm + rOhm * growth, xOhm * orderH - capacitiveOhm / orderH).inverse();
    y[from]![from] = y[from]![from]!.plus(admittance);
    if (to < 0) continue;
    y[to]![to] = y[to]![to]!.plus(admittance);
    y[from]![to] = y[from]![to]!.minus(admittance);
    y[to]![from] = y[to]![from]!.minus(admittance);
  }
  const found = inv(matrix(y.map((row) => row.map(({ re, im }) => complex(re, im))))) as Matrix;
  const z = (found.toArray() as { re: number; im: number }[][]).map((row) =>
    row.map(({ re, im }) => new Complex(re, im)),
  );
  return { y, z };
}

const sizes = (m: Complex[][]): Float64Array => Float64Array.from(m.flat(), ({ size }) => size);

/** Our own branches and their sums are rounded too, and an admittance at the bank is held against the library's impedance. */
const ROOMS = 4;

// Furthest off, against the two own impedances an entry lies between; as a share of `limit`, or of what rounding the matrix
// is worth at that order where that is more.
function furthest(network: NodalCase, bankNode: number, ordersH: Float64Array, limit: number): number {
  const eliminated = new EliminatedNetwork(network, bankNode);
  const { bank, nodes } = eliminated.columns(ordersH);
  const alone = eliminated.bankAdmittance(ordersH);
  const at = (column: typeof bank, i: number): Complex => new Complex(column.re[i]!, column.im[i]!);
  let worst = 0;
  for (const [i, orderH] of ordersH.entries()) {
    const { y, z } = libraryImpedance(network, orderH);
    const allowed = Math.max(limit, ROOMS * roundingRoom(sizes(y), sizes(z), network.nodes));
    const take = (off: number): void => {
      worst = Math.max(worst, off / allowed);
    };
    const own = z[bankNode]![bankNode]!;
    for (const column of [bank, alone]) {
      take(at(column, i).times(own).minus(new Complex(1)).size);
    }
    for (const [k, { self, toBank }] of nodes.entries()) {
      const expected = z[k]!;
      take(at(self, i).minus(expected[k]!).size / expected[k]!.size);
      const between = Math.sqrt(expected[k]!.size * own.size);
      take(at(toBank, i).minus(expected[bankNode]!).size / between);
    }
  }
  return worst;
}

/** Order at which a node's own admittance all but vanishes, where there is one: found on a grid, then narrowed. */
function ownResonance(network: NodalCase, node: number): number[] {
  const susceptance = (h: number): number =>
    network.branches.reduce((sum, { from, to, steadyOhm, rOhm, xOhm, capacitiveOhm }) => {
      if (from !== node && to !== node) return sum;
      const r = steadyOhm + rOhm * h ** network.resistanceExponent;
      const x = xOhm * h - capacitiveOhm / h;
      return sum - x / (r * r + x * x);
    }, 0);
  const found: number[] = [];
  for (let h = 1; h < 50; h += 0.25) {
    let [low, high] = [h, h + 0.25];
    if (susceptance(low) * susceptance(high) >= 0) continue;
    for (let step = 0; step < 60; step++) {
      const middle = (low + high) / 2;
      if (susceptance(low) * susceptance(middle) <= 0) high = middle;
      else low = middle;
    }
    found.push(low);
  }
  return found;
}

describe(`a network eliminated down to the bank's node, against a matrix library (seed ${SEED})`, () => {
  it('agrees to 1e-12 at every node, on generated networks', () => {
    for (let k = 0; k < runs(40, 800); k++) {
      const random = chance(SEED + 7 * k);
      const { model } = networkScene(madeBuses(random));
      const ordersH = Float64Array.from([1, 5, 7, 50, random.between(1, 50), random.between(1, 50)]);
      for (const nodal of model.nodal!.cases.slice(0, 3)) {
        const share = furthest(nodal, nodal.busNode[model.bankBus]!, ordersH, 1e-12);
        expect(share, JSON.stringify({ k, nodes: nodal.nodes })).toBeLessThan(1);
      }
    }
  });

  // Without rows exchanged such an order loses as many digits as the pivot is small.
  it('agrees there too where a node is in resonance with itself, to what the sum of its branches leaves', () => {
    let resonances = 0;
    for (let k = 0; k < runs(60, 1200); k++) {
      const { model } = networkScene(madeBuses(chance(SEED + 7 * k)));
      const nodal = model.nodal!.cases[0]!;
      for (let node = 0; node < nodal.nodes; node++) {
        const ordersH = Float64Array.from(ownResonance(nodal, node));
        resonances += ordersH.length;
        const share = furthest(nodal, nodal.busNode[model.bankBus]!, ordersH, 1e-11);
        expect(share, JSON.stringify({ k, node, ordersH: [...ordersH] })).toBeLessThan(1);
      }
    }
    expect(resonances).toBeGreaterThan(20);
  });

  it('meets a coil and a capacitor without loss that cancel exactly', () => {
    const coil = (from: number, to: number, xOhm: number) => ({
      from,
      to,
      steadyOhm: 0,
      rOhm: 0,
      xOhm,
      capacitiveOhm: 0,
    });
    const network: NodalCase = {
      nodes: 3,
      busNode: Int32Array.of(0, 1, 2),
      sourceNode: 0,
      source: { rOhm: 0, xOhm: 1 },
      // At the first order node 1 has −1 − 1 + 2 = 0 of its own.
      branches: [coil(0, 1, 1), coil(1, 2, 1), { from: 1, to: -1, steadyOhm: 0, rOhm: 0, xOhm: 0, capacitiveOhm: 0.5 }],
      conductance: Float64Array.of(0, 0, 0.1),
      resistanceExponent: 0.5,
    };
    expect(furthest(network, 2, Float64Array.of(1), 1e-14)).toBeLessThan(1);
  });
});
