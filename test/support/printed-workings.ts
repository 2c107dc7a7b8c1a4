import { evaluate } from 'mathjs';
import { type PlacedWord, printedNumber, wordsOf } from './pdf-text.js';

/** A working as it stands on paper, and what it is printed to give. */
export interface PrintedWorking {
  working: string;
  gives: string;
}

/** Words of one line differ in height by no more [pt]. */
const LINE_PT = 2;
/** The narrow column at the right that holds what a working gives [pt]. */
const GIVES_PT = 84;

/** How the columns of workings are headed. */
const HEADS = { en: { formula: 'formula,', gives: 'gives' }, de: { formula: 'Formel,', gives: 'ergibt' } } as const;

/**
 * Reads every working off a paper: its words and where they stand are all that is known.
 * @param bytes of the paper
 * @param language it is written in; German has the decimal comma, and semicolons between arguments
 * @returns workings in their order, with decimal points
 */
export function printedWorkings(bytes: Uint8Array, language: keyof typeof HEADS = 'en'): PrintedWorking[] {
  const found = wordsOf(bytes).flatMap(({ words }) => {
    const heads = words.filter(({ text }) => text === HEADS[language].formula);
    return heads.flatMap((head) => tableBelow(words, head, HEADS[language]));
  });
  if (language === 'en') return found;
  return found.map(({ working, gives }) => ({ working: withPoints(working), gives: withPoints(gives) }));
}

function withPoints(text: string): string {
  return text.replace(/(?<=\d),(?=\d)/g, '.').replaceAll(';', ',');
}

function tableBelow(
  words: readonly PlacedWord[],
  head: PlacedWord,
  named: { formula: string; gives: string },
): PrintedWorking[] {
  const gives = words.find(({ text, yMin }) => text === named.gives && Math.abs(yMin - head.yMin) < LINE_PT)!;
  const below = words.filter(({ yMin }) => yMin > head.yMax);
  const foot = Math.min(
    Infinity,
    ...below
      .filter(({ text, xMin }) => text === named.formula && Math.abs(xMin - head.xMin) < 1)
      .map(({ yMin }) => yMin),
  );
  const inside = below.filter(({ yMin }) => yMin < foot);
  const values = linesOf(inside.filter(({ xMin, xMax }) => xMin > gives.xMax - GIVES_PT && xMax <= gives.xMax + 1));
  return values.flatMap(({ y, text }, at) => {
    const end = values[at + 1]?.y ?? foot;
    const column = inside.filter(
      ({ xMin, xMax, yMin }) =>
        xMin >= head.xMin - 1 && xMax <= gives.xMax - GIVES_PT + 2 && yMin > y - LINE_PT && yMin < end - LINE_PT,
    );
    const said = linesOf(column)
      .map((line) => line.text)
      .join(' ');
    const equals = said.indexOf(' = ');
    return equals < 0 ? [] : [{ working: arithmeticOf(said.slice(equals + 3)), gives: text }];
  });
}

/** What follows the table on its last page is prose. */
function arithmeticOf(text: string): string {
  return /^(?:[\d.+−·/^√(),;π\s]|ln|max|min)+/u.exec(text)?.[0].trim() ?? '';
}

function linesOf(words: readonly PlacedWord[]): { y: number; text: string }[] {
  const lines: { y: number; words: PlacedWord[] }[] = [];
  for (const word of [...words].sort((a, b) => a.yMin - b.yMin)) {
    const last = lines.at(-1);
    if (last !== undefined && Math.abs(word.yMin - last.y) < LINE_PT) last.words.push(word);
    else lines.push({ y: word.yMin, words: [word] });
  }
  return lines.map(({ y, words: line }) => ({
    y,
    text: line
      .sort((a, b) => a.xMin - b.xMin)
      .map(({ text }) => text)
      .join(' '),
  }));
}

/**
 * Workings whose arithmetic does not give what is printed beside them, within the rounding of what is printed.
 * @param printed workings read off a paper
 * @returns those that are wrong, with what a general reader of formulas makes of them
 */
export function wrongWorkings(printed: readonly PrintedWorking[]): string[] {
  return printed.flatMap(({ working, gives }) => {
    const number = /^−?[\d\s\u00a0]+(?:\.\d+)?/u.exec(gives);
    if (number === null) return [`${working}: gives no number, "${gives}"`];
    const { value, half } = printedNumber(number[0]);
    const evaluated = evaluate(forOracle(working)) as number;
    // the working is rounded too, in the ninth digit
    return Math.abs(evaluated - value) <= half * (1 + 1e-9) + 1e-7 * Math.abs(value)
      ? []
      : [`${working} = ${evaluated}, printed ${gives}`];
  });
}

function forOracle(working: string): string {
  return working
    .replaceAll('−', '-')
    .replaceAll('·', '*')
    .replaceAll('√', 'sqrt')
    .replace(/\bln\(/g, 'log(')
    .replaceAll('π', 'pi');
}
