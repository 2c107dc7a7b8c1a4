import { ListField } from '../field/list-field.js';

/** Whole numbers as a list with ranges: "1–5, 8". */
export function NumberListField({ path, label, most }: { path: string; label: string; most: number }) {
  const form = {
    read: (text: string) => readNumbers(text, most),
    write: numbersText,
    needs: `numbers 1 to ${most}, such as 1–5, 7`,
    otherwise: 'all',
  };
  return <ListField path={path} label={label} form={form} />;
}

function readNumbers(text: string, most: number): number[] | null {
  const found = new Set<number>();
  for (const part of text.split(/[,;\s]+/).filter((one) => one !== '')) {
    const [, first, last = first] = /^(\d{1,2})(?:[-–](\d{1,2}))?$/.exec(part) ?? [];
    if (first === undefined) return null;
    const from = Number(first);
    const to = Number(last);
    if (from < 1 || to > most || from > to) return null;
    for (let value = from; value <= to; value++) found.add(value);
  }
  return [...found].sort((a, b) => a - b);
}

/** Runs of three and more are written as a range. */
function numbersText(list: readonly number[]): string {
  const runs: number[][] = [];
  for (const value of list) {
    const run = runs.at(-1);
    if (run !== undefined && run.at(-1) === value - 1) run.push(value);
    else runs.push([value]);
  }
  return runs.map((run) => (run.length > 2 ? `${run[0]}–${run.at(-1)}` : run.join(', '))).join(', ');
}
