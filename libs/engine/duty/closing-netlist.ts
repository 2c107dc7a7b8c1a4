import { netlistComment } from '../network/network-netlist.js';
import { type ComplexNumber, cMultiply, cSubtract } from '../quantity/complex-number.js';
import { closingPeak } from './closing-circuit.js';
import type { ClosingCircuit, ClosingNetwork, NetworkBranch, SeriesBranch } from './closing-parts.js';
import { admittance, NetworkLoop } from './network-loop.js';

/**
 * The circuit of a closing as a plain SPICE netlist, for a second opinion: resistances at their fundamental value, the
 * stages that are in start in their steady state at the worst instant, the closing one starts uncharged, so that the
 * greatest current of `vclosing` in the transient is the peak.
 * @param circuit source, connected branches, closing branch
 * @param title first line
 * @returns text, one statement a line
 * @source method-inrush
 */
export function closingNetlist(circuit: ClosingCircuit, title: string): string {
  const peak = closingPeak(circuit);
  const step = stepS(circuit, peak.afterS);
  const lines = [
    netlistComment(title),
    '* Per phase, at nominal voltage: r in ohm, l in henry, c in farad. Resistances are those at the fundamental; damping',
    '* loads and harmonics are left out, the supply is at its strongest.',
    '* Time 0 is the closing, at the worst instant: what is in begins in its steady state (ic: amperes of a coil, volts of a',
    '* capacitor; hence uic), the closing stage uncharged. Read the greatest magnitude of i(vclosing).',
    ...partComments(circuit),
    `* greatest current expected: ${number(peak.peakA)} A, ${number(peak.afterS)} s after closing`,
    `vsource feed 0 sin(0 ${number(circuit.crestV)} ${number(circuit.frequencyHz)} 0 0 ${number((peak.phaseRad * 180) / Math.PI + 90)})`,
    ...standingLines(circuit, peak.phaseRad),
    'vclosing bus closing 0',
    ...branchLines({ name: 'closing', from: 'closing', to: '0' }, circuit.closing, { currentA: 0, voltageV: 0 }),
    `.tran ${number(step)} ${number(peak.afterS + 2 / circuit.frequencyHz)} 0 ${number(step)} uic`,
    '.end',
    '',
  ];
  return lines.join('\n');
}

// What each part stands for.
function partComments({ network, connected }: ClosingCircuit): string[] {
  return [
    ...(network === undefined
      ? ['* source: supply and transformers up to the bus']
      : [
          '* source, net1, net2 …: the network round the bus, with its transformers, cables and other capacitors; n1, n2 … its nodes',
        ]),
    ...(connected.length === 0
      ? []
      : [
          `* in1${connected.length === 1 ? '' : ` to in${connected.length}`}: stages that are in, those of one kind as one branch; other capacitors at the bus`,
        ]),
    '* closing: the stage that is closed, with the inductance between stages where it meets other capacitors',
  ];
}

// Everything but the closing stage, each branch at its steady state.
function standingLines(circuit: ClosingCircuit, phaseRad: number): string[] {
  const omega = 2 * Math.PI * circuit.frequencyHz;
  const source: ComplexNumber = { re: circuit.crestV * Math.cos(phaseRad), im: circuit.crestV * Math.sin(phaseRad) };
  const network = circuit.network ?? asNetwork(circuit);
  const loop = new NetworkLoop(network, circuit.connected, circuit.closing);
  const stages = circuit.connected.map((branch) => ({ ...branch, from: network.bankNode, to: -1, driven: false }));
  const voltage = (node: number): ComplexNumber => cMultiply(loop.nodeVoltage(node, { re: 0, im: omega }, 1), source);
  const nodeName = (node: number): string => (node === network.bankNode ? 'bus' : `n${node + 1}`);
  const lines = (name: string, branch: NetworkBranch): string[] => {
    const { from, to, driven, capacitanceF } = branch;
    const near = driven ? { name: 'feed', volts: source } : { name: nodeName(from), volts: voltage(from) };
    const end = driven ? from : to;
    const far = end < 0 ? { name: '0', volts: { re: 0, im: 0 } } : { name: nodeName(end), volts: voltage(end) };
    const current = cMultiply(cSubtract(near.volts, far.volts), admittance(branch, { re: 0, im: omega }).value);
    const voltageV = capacitanceF > 0 ? current.im / (omega * capacitanceF) : 0;
    return branchLines({ name, from: near.name, to: far.name }, branch, { currentA: current.re, voltageV });
  };
  return [
    ...network.branches.flatMap((branch, k) => lines(k === 0 && branch.driven ? 'source' : `net${k + 1}`, branch)),
    ...stages.flatMap((branch, k) => lines(`in${k + 1}`, branch)),
  ];
}

// One node behind the source.
function asNetwork({ sourceOhm, sourceH }: ClosingCircuit): ClosingNetwork {
  const source = { from: 0, to: -1, driven: true, rOhm: sourceOhm, inductanceH: sourceH, capacitanceF: 0 };
  return { nodes: 1, bankNode: 0, branches: [source] };
}

// Fine enough for the fastest mode of the closing branch on the stiffest of its neighbours.
function stepS(circuit: ClosingCircuit, afterS: number): number {
  if (circuit.network !== undefined) return networkStepS(circuit, circuit.network, afterS);
  const plainF = circuit.connected.filter((b) => b.inductanceH === 0).reduce((sum, b) => sum + b.capacitanceF, 0);
  const { inductanceH, capacitanceF } = circuit.closing;
  const farad = plainF > 0 ? (capacitanceF * plainF) / (capacitanceF + plainF) : capacitanceF;
  const henry = inductanceH > 0 && plainF > 0 ? inductanceH : inductanceH + circuit.sourceH;
  return Math.min((2 * Math.PI * Math.sqrt(henry * farad)) / 400, (afterS + 1 / circuit.frequencyHz) / 400);
}

function networkStepS(circuit: ClosingCircuit, network: ClosingNetwork, afterS: number): number {
  const zeros = new NetworkLoop(network, circuit.connected, circuit.closing).zeros();
  const fastest = zeros.reduce((most, { im }) => Math.max(most, Math.abs(im)), 2 * Math.PI * circuit.frequencyHz);
  return Math.min((2 * Math.PI) / fastest / 200, (afterS + 1 / circuit.frequencyHz) / 400);
}

interface Start {
  currentA: number;
  voltageV: number;
}

function branchLines(
  { name, from, to }: { name: string; from: string; to: string },
  { rOhm, inductanceH, capacitanceF }: SeriesBranch,
  start: Start,
): string[] {
  const parts = [
    ...(rOhm > 0 ? [{ kind: 'r', tail: number(rOhm) }] : []),
    ...(inductanceH > 0 ? [{ kind: 'l', tail: `${number(inductanceH)} ic=${number(start.currentA)}` }] : []),
    ...(capacitanceF > 0 ? [{ kind: 'c', tail: `${number(capacitanceF)} ic=${number(start.voltageV)}` }] : []),
  ];
  const joint = (k: number): string => (k === 0 ? from : k === parts.length ? to : `${name}_n${k}`);
  return parts.map(({ kind, tail }, k) => `${kind}${name} ${joint(k)} ${joint(k + 1)} ${tail}`);
}

function number(value: number): string {
  return value.toExponential(16);
}
