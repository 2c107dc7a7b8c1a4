import { FormulaFault, formulaTokens, type Token } from './formula-tokens.js';

/** A formula as a tree. */
export type FormulaPart =
  | { kind: 'number'; value: number }
  | { kind: 'name'; name: string }
  | { kind: 'minus'; of: FormulaPart }
  | { kind: 'operation'; sign: Operation; left: FormulaPart; right: FormulaPart }
  | { kind: 'call'; name: FormulaFunction; terms: FormulaPart[] };

/** A sign between two parts. */
export type Operation = '+' | '-' | '*' | '/' | '^' | '<' | '<=' | '>' | '>=' | '==' | '!=';

/** Functions with the least and the most terms they take. */
const FUNCTIONS = {
  min: [1, 20],
  max: [1, 20],
  abs: [1, 1],
  round: [1, 2],
  floor: [1, 1],
  ceil: [1, 1],
  sqrt: [1, 1],
  if: [3, 3],
} as const;

/** Name of a function a formula may call. */
export type FormulaFunction = keyof typeof FUNCTIONS;

const MOST_CHARACTERS = 1000;
const MOST_PARTS = 200;
const DEEPEST = 40;
const COMPARISONS = ['<', '<=', '>', '>=', '==', '!='];

/**
 * Reads a formula: comparisons weakest and unchained, then + −, then * /, then minus, then ^ from the right.
 * @param text the formula, at most 1 000 characters, 200 parts, 40 deep
 * @param names what it may use; a name with a window has the window's name after a point
 * @param windows names of the tariff's windows
 * @returns its tree
 * @throws FormulaFault where it can't be read or uses an unknown name
 * @source method-money
 */
export function readFormula(text: string, names: ReadonlySet<string>, windows: readonly string[]): FormulaPart {
  if (text.length > MOST_CHARACTERS) {
    throw new FormulaFault('too-large', `at most ${MOST_CHARACTERS} characters`, `${text.length}`);
  }
  return new Reader(formulaTokens(text, windows), names).whole();
}

class Reader {
  readonly #tokens: Token[];
  readonly #names: ReadonlySet<string>;
  #next = 0;
  #parts = 0;
  #depth = 0;

  constructor(tokens: Token[], names: ReadonlySet<string>) {
    this.#tokens = tokens;
    this.#names = names;
  }

  whole(): FormulaPart {
    const part = this.#comparison();
    if (this.#peek().kind !== 'end') throw this.#unexpected('a sign or the end');
    return part;
  }

  #peek(): Token {
    return this.#tokens[this.#next]!;
  }

  #take(...signs: string[]): string | null {
    const token = this.#peek();
    if (token.kind !== 'sign' || !signs.includes(token.text)) return null;
    this.#next++;
    return token.text;
  }

  #require(sign: string): void {
    if (this.#take(sign) === null) throw this.#unexpected(`"${sign}"`);
  }

  #unexpected(expected: string): FormulaFault {
    const { kind, text, at } = this.#peek();
    return new FormulaFault('unreadable', expected, kind === 'end' ? 'the end' : `${JSON.stringify(text)} at ${at}`);
  }

  #made<T extends FormulaPart>(part: T): T {
    this.#parts++;
    if (this.#parts > MOST_PARTS) throw new FormulaFault('too-large', `at most ${MOST_PARTS} parts`, 'more');
    return part;
  }

  #deeper<T>(read: () => T): T {
    this.#depth++;
    if (this.#depth > DEEPEST) throw new FormulaFault('too-large', `at most ${DEEPEST} brackets in each other`, 'more');
    const part = read();
    this.#depth--;
    return part;
  }

  #comparison(): FormulaPart {
    const left = this.#sum();
    const sign = this.#take(...COMPARISONS) as Operation | null;
    if (sign === null) return left;
    return this.#made({ kind: 'operation', sign, left, right: this.#sum() });
  }

  #sum(): FormulaPart {
    let left = this.#product();
    for (let sign = this.#take('+', '-'); sign !== null; sign = this.#take('+', '-')) {
      left = this.#made({ kind: 'operation', sign: sign as Operation, left, right: this.#product() });
    }
    return left;
  }

  #product(): FormulaPart {
    let left = this.#signed();
    for (let sign = this.#take('*', '/'); sign !== null; sign = this.#take('*', '/')) {
      left = this.#made({ kind: 'operation', sign: sign as Operation, left, right: this.#signed() });
    }
    return left;
  }

  // The part is counted before what follows is read, so that a thousand signs are refused at the 201st.
  #signed(): FormulaPart {
    if (this.#take('-') === null) return this.#power();
    const minus = this.#made({ kind: 'minus' as const, of: { kind: 'number', value: 0 } as FormulaPart });
    minus.of = this.#signed();
    return minus;
  }

  #power(): FormulaPart {
    const base = this.#single();
    if (this.#take('^') === null) return base;
    const power = this.#made({ kind: 'operation' as const, sign: '^' as const, left: base, right: base });
    power.right = this.#signed();
    return power;
  }

  #single(): FormulaPart {
    const token = this.#peek();
    if (token.kind === 'number') {
      this.#next++;
      return this.#made({ kind: 'number', value: Number(token.text) });
    }
    if (token.kind === 'name') {
      this.#next++;
      return this.#take('(') === null ? this.#named(token) : this.#call(token);
    }
    if (this.#take('(') === null) throw this.#unexpected('a number, a name or "("');
    return this.#deeper(() => {
      const part = this.#comparison();
      this.#require(')');
      return part;
    });
  }

  #named(token: Token): FormulaPart {
    if (!this.#names.has(token.text)) {
      const known = [...this.#names].filter((name) => !name.includes('.')).join(', ');
      throw new FormulaFault('unknown-name', `one of ${known}`, `${JSON.stringify(token.text)} at ${token.at}`);
    }
    return this.#made({ kind: 'name', name: token.text });
  }

  #call(token: Token): FormulaPart {
    if (!Object.hasOwn(FUNCTIONS, token.text)) {
      const known = Object.keys(FUNCTIONS).join(', ');
      throw new FormulaFault('unknown-name', `one of ${known}`, `${JSON.stringify(token.text)} at ${token.at}`);
    }
    const name = token.text as FormulaFunction;
    const call = this.#made({ kind: 'call' as const, name, terms: [] as FormulaPart[] });
    const [least, most] = FUNCTIONS[name];
    this.#deeper(() => {
      do call.terms.push(this.#comparison());
      while (this.#take(',') !== null);
      this.#require(')');
    });
    if (call.terms.length < least || call.terms.length > most) {
      const count = least === most ? `${least}` : `${least} to ${most}`;
      throw new FormulaFault('unreadable', `${count} terms of ${name}`, `${call.terms.length} at ${token.at}`);
    }
    return call;
  }
}
