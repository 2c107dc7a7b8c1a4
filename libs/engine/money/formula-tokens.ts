/** A piece of a formula's text. */
export interface Token {
  kind: 'number' | 'name' | 'sign' | 'end';
  /** as written; signs in their plain form */
  text: string;
  /** place in the formula, counted from 1 */
  at: number;
}

/** Why a formula can't be used; `at` is a place in its text counted from 1, or null where the whole is meant. */
export class FormulaFault extends Error {
  override readonly name = 'FormulaFault';
  readonly kind: 'unreadable' | 'unknown-name' | 'too-large';
  readonly expected: string;
  readonly found: string;

  constructor(kind: FormulaFault['kind'], expected: string, found: string) {
    super(`expected ${expected}, found ${found}`);
    this.kind = kind;
    this.expected = expected;
    this.found = found;
  }
}

const NUMBER = /^(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?/;
const NAME = /^[A-Za-z_]\w*/;
const SIGN = /^(?:<=|>=|==|!=|[+\-*/^<>(),]|×|−)/;
const PLAIN: Record<string, string> = { '×': '*', '−': '-' };

/**
 * Cuts a formula into numbers, names and signs.
 * @param text the formula
 * @param windows names a quantity may be followed by, as in `maxKw.peak`
 * @returns tokens, an end last
 * @throws FormulaFault at the first character that begins none of them
 * @source method-money
 */
export function formulaTokens(text: string, windows: readonly string[]): Token[] {
  const longestFirst = [...windows].sort((a, b) => b.length - a.length);
  const tokens: Token[] = [];
  let at = 0;
  while (at < text.length) {
    const rest = text.slice(at);
    const space = /^\s+/.exec(rest);
    if (space !== null) {
      at += space[0].length;
      continue;
    }
    const token = tokenAt(rest, at + 1, longestFirst);
    tokens.push(token.token);
    at += token.length;
  }
  tokens.push({ kind: 'end', text: 'the end', at: text.length + 1 });
  return tokens;
}

function tokenAt(rest: string, at: number, windows: readonly string[]): { token: Token; length: number } {
  const number = NUMBER.exec(rest)?.[0];
  if (number !== undefined) return { token: { kind: 'number', text: number, at }, length: number.length };
  const name = NAME.exec(rest)?.[0];
  if (name !== undefined) {
    const whole = rest[name.length] === '.' ? name + windowAfter(rest.slice(name.length), windows) : name;
    return { token: { kind: 'name', text: whole, at }, length: whole.length };
  }
  const sign = SIGN.exec(rest)?.[0];
  if (sign !== undefined) return { token: { kind: 'sign', text: PLAIN[sign] ?? sign, at }, length: sign.length };
  const found = JSON.stringify(String.fromCodePoint(rest.codePointAt(0)!));
  throw new FormulaFault('unreadable', 'a number, a name or a sign', `${found} at ${at}`);
}

// A window's name may hold spaces or signs, so the longest that fits is taken, and must end where a name may end.
function windowAfter(dotted: string, windows: readonly string[]): string {
  const after = dotted.slice(1);
  const window = windows.find(
    (name) => after.startsWith(name) && !/^\w\w/.test(name.slice(-1) + after.slice(name.length)),
  );
  return window === undefined ? (/^\.\w*/.exec(dotted)?.[0] ?? '.') : `.${window}`;
}
