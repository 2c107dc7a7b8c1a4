/** A value put into a formula. */
export interface FigureInput {
  symbol: string;
  value: number;
  unit: string;
}

/** A number with the formula and the values it came from. */
export interface Figure {
  id: string;
  /** empty in the engine; filled from the message catalogue */
  label: string;
  value: number;
  unit: string;
  /** right-hand side in symbols, in the arithmetic of + − · / ^ √() ln() max() min() and parentheses */
  formula: string;
  /** the same with the values put in; empty in the engine */
  working: string;
  source: string;
  inputs: FigureInput[];
}

/**
 * A figure without words.
 * @param id stable name, for example `requirement.maxKvar`
 * @param value the number with its unit
 * @param formula right-hand side in symbols
 * @param inputs values of the symbols, as [symbol, value, unit]
 * @param source line of SOURCES.md or a standard's name
 * @returns the figure, label and working empty
 */
export function figure(
  id: string,
  { value, unit }: { value: number; unit: string },
  { formula, source }: { formula: string; source: string },
  inputs: readonly (readonly [string, number, string])[],
): Figure {
  return {
    id,
    label: '',
    value,
    unit,
    formula,
    working: '',
    source,
    inputs: inputs.map(([symbol, input, inputUnit]) => ({ symbol, value: input, unit: inputUnit })),
  };
}

/** Energy factor, as every figure of one is written. */
export const PF = { formula: 'E_p / √(E_p^2 + E_q^2)', source: 'IEC 60050-131' };
