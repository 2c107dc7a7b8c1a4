/** A linear circuit solved at one frequency from the lines of its netlist: every element a row, nothing merged. */
interface Element {
  kind: string;
  from: string;
  to: string;
  value: number;
}

function elementOf(line: string): Element {
  const parts = line.split(' ');
  return { kind: line[0]!, from: parts[1]!, to: parts[2]!, value: Number(parts.at(-1)) };
}

/**
 * Node voltages of resistors, coils, capacitors, voltage and current sources.
 * @param lines elements as busesNetlist writes them, the last word being the value or the source's amplitude
 * @param frequencyHz f [Hz]
 * @returns magnitude per node [V]
 */
export function slowCircuit(lines: readonly string[], frequencyHz: number): Map<string, number> {
  return new Map([...slowPhasors(lines, frequencyHz)].map(([node, { re, im }]) => [node, Math.hypot(re, im)]));
}

/**
 * The same with angles.
 * @param lines as for slowCircuit
 * @param frequencyHz f [Hz]
 * @returns phasor per node [V]
 */
export function slowPhasors(lines: readonly string[], frequencyHz: number): Map<string, { re: number; im: number }> {
  const elements = lines.map(elementOf);
  const nodes = new Map<string, number>();
  for (const { from, to } of elements) {
    for (const node of [from, to]) if (node !== '0' && !nodes.has(node)) nodes.set(node, nodes.size);
  }
  const sources = elements.filter(({ kind }) => kind === 'v');
  const system = new System(nodes.size + sources.length);
  const at = (node: string): number => (node === '0' ? -1 : nodes.get(node)!);
  const omega = 2 * Math.PI * frequencyHz;
  for (const { kind, from, to, value } of elements) {
    if (kind === 'i') system.inject(at(from), at(to), value);
    else if (kind !== 'v') system.admit(at(from), at(to), admittanceOf(kind, value, omega));
  }
  for (const [k, { from, to, value }] of sources.entries()) system.hold(nodes.size + k, at(from), at(to), value);
  const { re, im } = system.solve();
  return new Map([...nodes].map(([node, k]) => [node, { re: re[k]!, im: im[k]! }]));
}

function admittanceOf(kind: string, value: number, omega: number): [g: number, s: number] {
  if (kind === 'r') return [1 / value, 0];
  return [0, kind === 'l' ? -1 / (omega * value) : omega * value];
}

class System {
  readonly #n: number;
  readonly #re: Float64Array[];
  readonly #im: Float64Array[];

  // The last column is the right-hand side.
  constructor(n: number) {
    this.#n = n;
    this.#re = Array.from({ length: n }, () => new Float64Array(n + 1));
    this.#im = Array.from({ length: n }, () => new Float64Array(n + 1));
  }

  admit(a: number, b: number, [g, s]: [g: number, s: number]): void {
    for (const [row, column, sign] of [
      [a, a, 1],
      [b, b, 1],
      [a, b, -1],
      [b, a, -1],
    ] as const) {
      if (row < 0 || column < 0) continue;
      this.#re[row]![column]! += sign * g;
      this.#im[row]![column]! += sign * s;
    }
  }

  // Out of the first node, into the second.
  inject(a: number, b: number, amperes: number): void {
    if (a >= 0) this.#re[a]![this.#n]! -= amperes;
    if (b >= 0) this.#re[b]![this.#n]! += amperes;
  }

  hold(row: number, a: number, b: number, volts: number): void {
    for (const [node, sign] of [
      [a, 1],
      [b, -1],
    ] as const) {
      if (node < 0) continue;
      this.#re[node]![row]! += sign;
      this.#re[row]![node]! += sign;
    }
    this.#re[row]![this.#n]! = volts;
  }

  // Gauss and Jordan, the greatest of each column first.
  solve(): { re: number[]; im: number[] } {
    for (let k = 0; k < this.#n; k++) {
      this.#bringGreatest(k);
      for (let row = 0; row < this.#n; row++) if (row !== k) this.#eliminate(k, row);
    }
    const out = { re: new Array<number>(this.#n), im: new Array<number>(this.#n) };
    for (let k = 0; k < this.#n; k++) {
      const [re, im] = this.#over(k, k, this.#n);
      out.re[k] = re;
      out.im[k] = im;
    }
    return out;
  }

  #bringGreatest(k: number): void {
    let best = k;
    const size = (row: number): number => this.#re[row]![k]! ** 2 + this.#im[row]![k]! ** 2;
    for (let row = k + 1; row < this.#n; row++) if (size(row) > size(best)) best = row;
    for (const part of [this.#re, this.#im]) [part[k], part[best]] = [part[best]!, part[k]!];
  }

  // Entry of a row over the pivot of row k.
  #over(k: number, row: number, column: number): [number, number] {
    const [re, im] = [this.#re[row]![column]!, this.#im[row]![column]!];
    const [kr, ki] = [this.#re[k]![k]!, this.#im[k]![k]!];
    const square = kr * kr + ki * ki;
    return [(re * kr + im * ki) / square, (im * kr - re * ki) / square];
  }

  #eliminate(k: number, row: number): void {
    const [fr, fi] = this.#over(k, row, k);
    if (fr === 0 && fi === 0) return;
    const [kr, ki, rr, ri] = [this.#re[k]!, this.#im[k]!, this.#re[row]!, this.#im[row]!];
    for (let c = k; c <= this.#n; c++) {
      rr[c]! -= fr * kr[c]! - fi * ki[c]!;
      ri[c]! -= fr * ki[c]! + fi * kr[c]!;
    }
  }
}
