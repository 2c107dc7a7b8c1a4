import { all, create, type MathJsInstance } from 'mathjs';

let math: MathJsInstance | null = null;

// A general library's parser and arithmetic, with the two functions it lacks or rounds otherwise.
function library(): MathJsInstance {
  if (math !== null) return math;
  math = create(all!, { predictable: true, relTol: 1e-15, absTol: 1e-300 }) as MathJsInstance;
  const round = (x: number, d = 0): number => (Math.sign(x) * Math.floor(Math.abs(x) * 10 ** d + 0.5 + 1e-6)) / 10 ** d;
  // floor and ceil of a general library take what is nearly whole for whole; the formula's don't
  const { floor, ceil } = Math;
  const choose = (condition: unknown, a: unknown, b: unknown): unknown => (Number(condition) !== 0 ? a : b);
  math.import({ round, floor, ceil, if: choose }, { override: true });
  return math;
}

/**
 * A formula by a general mathematics library.
 * @param expression the formula
 * @param valueAt value of each name it uses, windows included
 * @returns the value
 */
export function slowFormula(expression: string, valueAt: (name: string) => number): number {
  const scope = new Map<string, number>();
  const plain = expression
    .replaceAll('×', '*')
    .replaceAll('−', '-')
    .replace(/(?<![\w.])[A-Za-z_]\w*(\.\w+)?/g, (name) => {
      if (/^(min|max|abs|round|floor|ceil|sqrt|if)$/.test(name)) return name;
      const symbol = `q_${name.replace('.', '_of_')}`;
      scope.set(symbol, valueAt(name));
      return symbol;
    });
  return Number(library().evaluate(plain, scope));
}

/** A working is printed to twelve digits: what comes this near to a whole unit with them was one. */
const PRINTED_WIDTH = 1e-9;

/**
 * A printed working by a general mathematics library.
 * @param working arithmetic with the values put in
 * @returns the value
 */
export function slowWorking(working: string): number {
  const wholeUnits = {
    ceil: (x: number): number => Math.ceil(x - PRINTED_WIDTH),
    floor: (x: number): number => Math.floor(x + PRINTED_WIDTH),
  };
  return Number(library().evaluate(working.replaceAll('·', '*').replaceAll('−', '-'), wholeUnits));
}
