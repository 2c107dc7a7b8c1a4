// References: the transient of ngspice 45 as packed in eecircuit-engine 1.8.0, and a fixed-step Runge-Kutta integration
// of the circuit's own differential equations written here.
import { beforeAll, describe, expect, it } from 'vitest';
import { type ClosingCircuit, closingNetlist, closingPeak, type SeriesBranch } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { CircuitSimulator } from '../support/circuit-simulator.js';
import { beforeClosing, CLOSING_KINDS, closingAt, madeClosing } from '../support/made-closing.js';
import { runs, SEED } from '../support/soak.js';

const simulator = new CircuitSimulator();
beforeAll(() => simulator.start(), 60_000);

/** The stated limit: a tenth of a per cent of the simulator's transient. */
const RELATIVE = 1e-3;

const cases = CLOSING_KINDS.flatMap((kind, k) =>
  Array.from({ length: runs(2, 40) }, (_, n) => {
    const circuit = madeClosing(chance(SEED + 1000 * k + n), kind);
    return { kind, n, circuit };
  }),
);

// Fastest the closing branch can ring: its own coil, or the source's, against all capacitors in series with it.
function fastestS({ sourceH, connected, closing }: ClosingCircuit): number {
  const plainF = connected.reduce(
    (sum, { inductanceH, capacitanceF }) => sum + (inductanceH === 0 ? capacitanceF : 0),
    0,
  );
  const farad = plainF > 0 ? 1 / (1 / closing.capacitanceF + 1 / plainF) : closing.capacitanceF;
  const henry = plainF > 0 ? closing.inductanceH : Math.min(sourceH, closing.inductanceH || sourceH);
  return 2 * Math.PI * Math.sqrt(henry * farad);
}

function spanOf(circuit: ClosingCircuit, afterS: number): { stopS: number; stepS: number } {
  return { stopS: afterS + 0.5 / circuit.frequencyHz, stepS: Math.min(fastestS(circuit) / 150, 2e-5) };
}

describe(`the exact inrush peak against a circuit simulator (seed ${SEED})`, () => {
  it.each(cases)(
    '$kind $n: is what the simulator reaches at the worst instant',
    async ({ circuit }) => {
      const { peakA, afterS, phaseRad } = closingPeak(circuit);
      const { value } = await simulator.greatest(closingAt(circuit, phaseRad, spanOf(circuit, afterS)), 'i(vc)');
      expect(Math.abs(value / peakA - 1), JSON.stringify({ peakA, value, afterS, phaseRad, circuit })).toBeLessThan(
        RELATIVE,
      );
    },
    120_000,
  );

  it.each(cases)(
    '$kind $n: no other instant goes beyond it',
    async ({ circuit, n }) => {
      const { peakA, afterS } = closingPeak(circuit);
      const random = chance(SEED + n);
      for (let k = 0; k < 3; k++) {
        const phaseRad = random.between(0, 2 * Math.PI);
        const { value } = await simulator.greatest(closingAt(circuit, phaseRad, spanOf(circuit, afterS)), 'i(vc)');
        expect(value / peakA, JSON.stringify({ phaseRad, circuit })).toBeLessThan(1 + RELATIVE);
      }
    },
    120_000,
  );

  it.each(cases.filter(({ n }) => n === 0))(
    '$kind: the netlist a reviewer gets repeats the peak it names',
    async ({ circuit }) => {
      const netlist = closingNetlist(circuit, 'a stage is closed');
      const said = Number(/greatest current expected: (\S+) A/.exec(netlist)![1]);
      const { value } = await simulator.greatest(netlist.replace('.end\n', '.save i(vclosing)\n.end\n'), 'i(vclosing)');
      expect(said).toBe(closingPeak(circuit).peakA);
      expect(Math.abs(value / said - 1)).toBeLessThan(RELATIVE);
    },
    120_000,
  );
});

interface State {
  sourceA: number;
  /** of the plain capacitors at the bus; unused where there are none */
  busV: number;
  branches: { currentA: number; voltageV: number }[];
}

// The worst of the closing branch's current, by Runge and Kutta's fixed steps.
function slowPeak(circuit: ClosingCircuit, phaseRad: number, span: { stopS: number; stepS: number }): number {
  const before = beforeClosing(circuit, phaseRad);
  const isCoil = (branch: SeriesBranch): boolean => branch.inductanceH > 0;
  const plainF = [...circuit.connected, circuit.closing].reduce((sum, b) => sum + (isCoil(b) ? 0 : b.capacitanceF), 0);
  const coils = [...circuit.connected, circuit.closing].filter(isCoil);
  const starts = [...before.connected.filter((_, k) => isCoil(circuit.connected[k]!)), { currentA: 0, voltageV: 0 }];
  const busStartV = circuit.connected.some((b) => !isCoil(b)) ? before.busV : 0;
  let y = flat({ sourceA: before.sourceA, busV: busStartV, branches: starts.slice(0, coils.length) });
  const slope = (t: number, now: number[]): number[] => slopes({ circuit, coils, plainF }, phaseRad, t, now);
  let worst = 0;
  for (let t = 0; t < span.stopS; t += span.stepS) {
    const h = span.stepS;
    const k1 = slope(t, y);
    const k2 = slope(t + h / 2, along(y, k1, h / 2));
    const k3 = slope(t + h / 2, along(y, k2, h / 2));
    const k4 = slope(t + h, along(y, k3, h));
    y = y.map((v, i) => v + (h / 6) * (k1[i]! + 2 * k2[i]! + 2 * k3[i]! + k4[i]!));
    // A plain stage alone is the whole bus: its current is the source's.
    worst = Math.max(worst, Math.abs(isCoil(circuit.closing) ? y[y.length - 2]! : y[0]!));
  }
  return worst;
}

const flat = ({ sourceA, busV, branches }: State): number[] => [
  sourceA,
  busV,
  ...branches.flatMap(({ currentA, voltageV }) => [currentA, voltageV]),
];
const along = (y: number[], slope: number[], h: number): number[] => y.map((v, i) => v + h * slope[i]!);

function slopes(
  parts: { circuit: ClosingCircuit; coils: SeriesBranch[]; plainF: number },
  phaseRad: number,
  t: number,
  [sourceA, busV, ...rest]: number[],
): number[] {
  const { circuit, coils, plainF } = parts;
  const e = circuit.crestV * Math.cos(2 * Math.PI * circuit.frequencyHz * t + phaseRad);
  const behindV = e - circuit.sourceOhm * sourceA!;
  const dropV = coils.map(({ rOhm }, k) => rOhm * rest[2 * k]! + rest[2 * k + 1]!);
  // Without a capacitor at the bus the coils share its voltage: the currents' slopes must add up.
  const shared =
    coils.reduce((sum, { inductanceH }, k) => sum + dropV[k]! / inductanceH, behindV / circuit.sourceH) /
    coils.reduce((sum, { inductanceH }) => sum + 1 / inductanceH, 1 / circuit.sourceH);
  const v = plainF > 0 ? busV! : shared;
  const drawnA = coils.reduce((sum, _, k) => sum + rest[2 * k]!, 0);
  return [
    (behindV - v) / circuit.sourceH,
    plainF > 0 ? (sourceA! - drawnA) / plainF : 0,
    ...coils.flatMap(({ inductanceH, capacitanceF }, k) => [
      (v - dropV[k]!) / inductanceH,
      rest[2 * k]! / capacitanceF,
    ]),
  ];
}

describe('the exact inrush peak against a slow integration', () => {
  it.each(cases.filter(({ n }) => n < runs(1, 10)))('$kind $n: agrees at the worst instant', ({ circuit }) => {
    const { peakA, afterS, phaseRad } = closingPeak(circuit);
    const stepS = Math.min(fastestS(circuit) / 600, 1e-5);
    const found = slowPeak(circuit, phaseRad, { stopS: afterS + 20 * stepS, stepS });
    // Samples beside the top lose (π/600)²/2.
    expect(Math.abs(found / peakA - 1)).toBeLessThan(3e-5);
  });

  it('control: at a quarter period from the worst instant it is another current', () => {
    for (const { circuit } of cases.filter(({ n }) => n === 0)) {
      const { peakA, afterS, phaseRad } = closingPeak(circuit);
      const stepS = Math.min(fastestS(circuit) / 600, 1e-5);
      const found = slowPeak(circuit, phaseRad + Math.PI / 2, { stopS: afterS + 20 * stepS, stepS });
      expect(found / peakA).toBeLessThan(0.97);
    }
  });
});
