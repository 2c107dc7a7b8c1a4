import type { ClosingCircuit, SeriesBranch } from '#libs/engine/index.js';
import type { Chance } from './chance.js';
import { Complex } from './complex.js';

const NOMINAL_V = 400;

/**
 * A stage as a series branch.
 * @param frequencyHz f [Hz]
 * @param stage nameplate at 400 V; 0 % is plain
 * @returns the branch
 */
export function madeBranch(
  frequencyHz: number,
  { kvar, reactorPct, quality }: { kvar: number; reactorPct: number; quality: number },
): SeriesBranch {
  const omega = 2 * Math.PI * frequencyHz;
  const capacitiveOhm = NOMINAL_V ** 2 / (kvar * 1000);
  const inductiveOhm = (reactorPct / 100) * capacitiveOhm;
  return {
    rOhm: inductiveOhm / quality,
    inductanceH: inductiveOhm / omega,
    capacitanceF: 1 / (omega * capacitiveOhm),
  };
}

/** What a closing is like. */
export const CLOSING_KINDS = ['plain alone', 'tuned alone', 'plain onto plain', 'tuned onto tuned', 'mixed'] as const;

/**
 * A closing of chance: weak and strong supplies, of much and of little resistance, 50 and 60 Hz.
 * @param random where the numbers come from
 * @param kind what is closed onto what
 * @returns the circuit per phase
 */
export function madeClosing(random: Chance, kind: (typeof CLOSING_KINDS)[number]): ClosingCircuit {
  const frequencyHz = random.oneOf([50, 60]);
  const omega = 2 * Math.PI * frequencyHz;
  const zOhm = NOMINAL_V ** 2 / (random.between(4, 60) * 1e6);
  const xOverR = random.oneOf([1, 4, 10, 40]);
  const xOhm = zOhm / Math.sqrt(1 + xOverR ** -2);
  const tunedPct = random.oneOf([5.67, 7, 12.5, 14]);
  const branch = (tuned: boolean): SeriesBranch =>
    madeBranch(frequencyHz, {
      kvar: random.oneOf([5, 12.5, 25, 50, 100]),
      reactorPct: tuned ? random.oneOf([tunedPct, random.oneOf([5.67, 7, 12.5, 14])]) : 0,
      quality: random.oneOf([10, 30, 80]),
    });
  const alone = kind.endsWith('alone');
  const connected = alone
    ? []
    : Array.from({ length: random.whole(1, 3) }, (_, k) =>
        branch(kind === 'tuned onto tuned' || (kind === 'mixed' && (k > 0 || random.next() < 0.5))),
      );
  const closing = branch(kind.startsWith('tuned') || (kind === 'mixed' && random.next() < 0.5));
  return {
    sourceOhm: xOhm / xOverR,
    sourceH: xOhm / omega,
    connected,
    closing: alone ? closing : { ...closing, inductanceH: closing.inductanceH + random.oneOf([1, 2, 10]) * 1e-6 },
    crestV: (Math.SQRT2 * NOMINAL_V) / Math.sqrt(3),
    frequencyHz,
  };
}

/** The circuit just before the closing. */
export interface BeforeClosing {
  sourceA: number;
  busV: number;
  connected: { currentA: number; voltageV: number }[];
}

/**
 * The steady state before the closing, by plain complex arithmetic.
 * @param circuit the circuit
 * @param phaseRad φ of the source Ê·cos(ωt + φ)
 * @returns currents and voltages at t = 0
 */
export function beforeClosing(circuit: ClosingCircuit, phaseRad: number): BeforeClosing {
  const omega = 2 * Math.PI * circuit.frequencyHz;
  const source = new Complex(circuit.crestV * Math.cos(phaseRad), circuit.crestV * Math.sin(phaseRad));
  const sourceZ = new Complex(circuit.sourceOhm, omega * circuit.sourceH);
  const z = circuit.connected.map(
    (branch) => new Complex(branch.rOhm, omega * branch.inductanceH - 1 / (omega * branch.capacitanceF)),
  );
  const y = z.reduce((sum, each) => sum.plus(each.inverse()), new Complex(0));
  const bus = source.over(sourceZ).over(sourceZ.inverse().plus(y));
  return {
    sourceA: bus.times(y).re,
    busV: bus.re,
    connected: z.map((each, k) => {
      const current = bus.over(each);
      const voltage = current.times(new Complex(0, -1 / (omega * circuit.connected[k]!.capacitanceF)));
      return { currentA: current.re, voltageV: voltage.re };
    }),
  };
}

/**
 * The closing as a netlist from its steady state.
 * @param circuit the circuit
 * @param phaseRad φ of the source
 * @param span length and greatest step [s]
 * @returns text; the closing branch's current is that of `vc`
 */
export function closingAt(circuit: ClosingCircuit, phaseRad: number, span: { stopS: number; stepS: number }): string {
  const before = beforeClosing(circuit, phaseRad);
  const branch = (
    name: string,
    top: string,
    of: SeriesBranch,
    start: { currentA: number; voltageV: number },
  ): string[] => [
    ...(of.rOhm > 0 ? [`r${name} ${top} ${name}r ${of.rOhm}`] : [`v${name} ${top} ${name}r 0`]),
    ...(of.inductanceH > 0
      ? [`l${name} ${name}r ${name}l ${of.inductanceH} ic=${start.currentA}`]
      : [`v${name}l ${name}r ${name}l 0`]),
    `c${name} ${name}l 0 ${of.capacitanceF} ic=${start.voltageV}`,
  ];
  const degrees = (phaseRad * 180) / Math.PI + 90;
  return [
    '* a stage is closed',
    `vs e 0 sin(0 ${circuit.crestV} ${circuit.frequencyHz} 0 0 ${degrees})`,
    `rs e m ${circuit.sourceOhm}`,
    `ls m bus ${circuit.sourceH} ic=${before.sourceA}`,
    ...circuit.connected.flatMap((each, k) => branch(`k${k}`, 'bus', each, before.connected[k]!)),
    'vc bus c 0',
    ...branch('x', 'c', circuit.closing, { currentA: 0, voltageV: 0 }),
    '.save i(vc)',
    `.tran ${span.stepS} ${span.stopS} 0 ${span.stepS} uic`,
    '.end',
  ].join('\n');
}
