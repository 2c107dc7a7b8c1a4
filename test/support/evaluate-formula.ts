/**
 * Works a printed formula out: numbers, symbols, + − · / ^, parentheses, √() ln() max() min().
 * @param formula right-hand side as printed
 * @param values value of every symbol
 * @returns the number it makes, and the symbols it used
 */
export function evaluateFormula(
  formula: string,
  values: ReadonlyMap<string, number>,
): { value: number; used: ReadonlySet<string> } {
  const tokens = formula.match(/√|[+−\-·/^(),]|\d+(?:\.\d+)?|\p{L}[\p{L}\p{N}_]*/gu) ?? [];
  if (tokens.join('') !== formula.replaceAll(/\s/g, '')) throw new Error(`not read to the end: ${formula}`);
  const reader = new FormulaReader(tokens, values);
  const value = reader.sum();
  if (!reader.done) throw new Error(`something is left of ${formula}`);
  return { value, used: reader.used };
}

const FUNCTIONS: Record<string, (...args: number[]) => number> = {
  '√': Math.sqrt,
  ln: Math.log,
  max: Math.max,
  min: Math.min,
};

class FormulaReader {
  readonly used = new Set<string>();
  readonly #tokens: string[];
  readonly #values: ReadonlyMap<string, number>;
  #at = 0;

  constructor(tokens: string[], values: ReadonlyMap<string, number>) {
    this.#tokens = tokens;
    this.#values = values;
  }

  get done(): boolean {
    return this.#at === this.#tokens.length;
  }

  sum(): number {
    let value = this.#product();
    for (;;) {
      if (this.#take('+')) value += this.#product();
      else if (this.#take('−') || this.#take('-')) value -= this.#product();
      else return value;
    }
  }

  #product(): number {
    let value = this.#power();
    for (;;) {
      if (this.#take('·')) value *= this.#power();
      else if (this.#take('/')) value /= this.#power();
      else return value;
    }
  }

  #power(): number {
    if (this.#take('−') || this.#take('-')) return -this.#power();
    const base = this.#atom();
    return this.#take('^') ? base ** this.#power() : base;
  }

  #atom(): number {
    const token = this.#tokens[this.#at++];
    if (token === undefined) throw new Error('a formula that stops in the middle');
    if (token === '(') return this.#closed([])[0]!;
    const apply = FUNCTIONS[token];
    if (apply !== undefined && this.#take('(')) return apply(...this.#closed([]));
    if (token === 'π') return Math.PI;
    if (/^\d/.test(token)) return Number(token);
    const value = this.#values.get(token);
    if (value === undefined) throw new Error(`no value for ${token}`);
    this.used.add(token);
    return value;
  }

  #closed(args: number[]): number[] {
    args.push(this.sum());
    if (this.#take(',')) return this.#closed(args);
    if (!this.#take(')')) throw new Error('a parenthesis that stays open');
    return args;
  }

  #take(token: string): boolean {
    if (this.#tokens[this.#at] !== token) return false;
    this.#at++;
    return true;
  }
}
