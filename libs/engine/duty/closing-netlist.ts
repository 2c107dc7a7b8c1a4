import { netlistComment } from '../network/network-netlist.js';
import { type ComplexNumber, cAdd, cDivide, cMultiply } from '../quantity/complex-number.js';
import { closingPeak } from './closing-circuit.js';
import type { ClosingCircuit, SeriesBranch } from './loop-impedance.js';

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
  const { peakA, afterS, phaseRad } = closingPeak(circuit);
  const omega = 2 * Math.PI * circuit.frequencyHz;
  const source: ComplexNumber = { re: circuit.crestV * Math.cos(phaseRad), im: circuit.crestV * Math.sin(phaseRad) };
  const z = circuit.connected.map((branch) => impedance(branch, omega));
  const sourceZ: ComplexNumber = { re: circuit.sourceOhm, im: omega * circuit.sourceH };
  const one: ComplexNumber = { re: 1, im: 0 };
  const total = z.reduce((sum, each) => cAdd(sum, cDivide(one, each)), cDivide(one, sourceZ));
  const busV = cDivide(source, cMultiply(sourceZ, total));
  const sourceA = z.reduce((sum, each) => cAdd(sum, cDivide(busV, each)), { re: 0, im: 0 });
  const lines = [
    netlistComment(title),
    `* greatest current expected: ${number(peakA)} A, ${number(afterS)} s after closing`,
    `vsource feed 0 sin(0 ${number(circuit.crestV)} ${number(circuit.frequencyHz)} 0 0 ${number((phaseRad * 180) / Math.PI + 90)})`,
    ...(circuit.sourceOhm > 0 ? [`rsource feed inner ${number(circuit.sourceOhm)}`] : []),
    `lsource ${circuit.sourceOhm > 0 ? 'inner' : 'feed'} bus ${number(circuit.sourceH)} ic=${number(sourceA.re)}`,
    ...circuit.connected.flatMap((branch, k) => branchLines(`in${k + 1}`, branch, startOf(branch, busV, omega))),
    'vclosing bus closing 0',
    ...branchLines('closing', circuit.closing, { currentA: 0, voltageV: 0 }),
    `.tran ${number(stepS(circuit, afterS))} ${number(afterS + 2 / circuit.frequencyHz)} 0 ${number(stepS(circuit, afterS))} uic`,
    '.end',
    '',
  ];
  return lines.join('\n');
}

// Fine enough for the fastest mode of the closing branch on the stiffest of its neighbours.
function stepS(circuit: ClosingCircuit, afterS: number): number {
  const plainF = circuit.connected.filter((b) => b.inductanceH === 0).reduce((sum, b) => sum + b.capacitanceF, 0);
  const { inductanceH, capacitanceF } = circuit.closing;
  const farad = plainF > 0 ? (capacitanceF * plainF) / (capacitanceF + plainF) : capacitanceF;
  const henry = inductanceH > 0 && plainF > 0 ? inductanceH : inductanceH + circuit.sourceH;
  return Math.min((2 * Math.PI * Math.sqrt(henry * farad)) / 400, (afterS + 1 / circuit.frequencyHz) / 400);
}

interface Start {
  currentA: number;
  voltageV: number;
}

function startOf(branch: SeriesBranch, busV: ComplexNumber, omega: number): Start {
  const current = cDivide(busV, impedance(branch, omega));
  const voltage = cMultiply(current, { re: 0, im: -1 / (omega * branch.capacitanceF) });
  return { currentA: current.re, voltageV: voltage.re };
}

function impedance(branch: SeriesBranch, omega: number): ComplexNumber {
  return { re: branch.rOhm, im: omega * branch.inductanceH - 1 / (omega * branch.capacitanceF) };
}

function branchLines(name: string, branch: SeriesBranch, start: Start): string[] {
  const top = name === 'closing' ? 'closing' : 'bus';
  const lines: string[] = [];
  let at = top;
  if (branch.rOhm > 0) {
    lines.push(`r${name} ${at} ${name}_n1 ${number(branch.rOhm)}`);
    at = `${name}_n1`;
  }
  if (branch.inductanceH > 0) {
    lines.push(`l${name} ${at} ${name}_n2 ${number(branch.inductanceH)} ic=${number(start.currentA)}`);
    at = `${name}_n2`;
  }
  lines.push(`c${name} ${at} 0 ${number(branch.capacitanceF)} ic=${number(start.voltageV)}`);
  return lines;
}

function number(value: number): string {
  return value.toExponential(16);
}
