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
    const [a, b] = [at(from), at(to)];
    if (kind === 'r') system.admit(a, b, 1 / value, 0);
    else if (kind === 'l') system.admit(a, b, 0, -1 / (omega * value));
    else if (kind === 'c') system.admit(a, b, 0, omega * value);
    else if (kind === 'i') system.inject(a, b, value);
  }
  for (const [k, { from, to, value }] of sources.entries()) system.hold(nodes.size + k, at(from), at(to), value);
  const { re, im } = system.solve();
  return new Map([...nodes].map(([node, k]) => [node, Math.hypot(re[k]!, im[k]!)]));
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

  admit(a: number, b: number, g: number, s: number): void {
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
    const [re, im, n] = [this.#re, this.#im, this.#n];
    for (let k = 0; k < n; k++) {
      let best = k;
      const size = (row: number): number => re[row]![k]! ** 2 + im[row]![k]! ** 2;
      for (let row = k + 1; row < n; row++) if (size(row) > size(best)) best = row;
      [re[k], re[best]] = [re[best]!, re[k]!];
      [im[k], im[best]] = [im[best]!, im[k]!];
      const [kr, ki, square] = [re[k]!, im[k]!, size(k)];
      for (let row = 0; row < n; row++) {
        if (row === k || (re[row]![k] === 0 && im[row]![k] === 0)) continue;
        const [rr, ri] = [re[row]!, im[row]!];
        const fr = (rr[k]! * kr[k]! + ri[k]! * ki[k]!) / square;
        const fi = (ri[k]! * kr[k]! - rr[k]! * ki[k]!) / square;
        for (let c = k; c <= n; c++) {
          rr[c]! -= fr * kr[c]! - fi * ki[c]!;
          ri[c]! -= fr * ki[c]! + fi * kr[c]!;
        }
      }
    }
    const out = { re: new Array<number>(n), im: new Array<number>(n) };
    for (let k = 0; k < n; k++) {
      const square = re[k]![k]! ** 2 + im[k]![k]! ** 2;
      out.re[k] = (re[k]![n]! * re[k]![k]! + im[k]![n]! * im[k]![k]!) / square;
      out.im[k] = (im[k]![n]! * re[k]![k]! - re[k]![n]! * im[k]![k]!) / square;
    }
    return out;
  }
}
