import { useState } from 'react';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from '../field/document-path.js';
import { FieldFrame, refusalOf } from '../field/field-frame.js';

/** Whole numbers as a list with ranges: "1–5, 8". */
export function NumberListField({ path, label, most }: { path: string; label: string; most: number }) {
  const { desk, state } = useDesk();
  const [text, setText] = useState<string | null>(null);
  const kept = valueAt(state.document, path);
  const shown = text ?? state.typed[path] ?? (Array.isArray(kept) ? listText(kept) : '');
  const isRead = shown.trim() === '' || readList(shown, most) !== null;
  const refusal = isRead ? refusalOf(state.problems, path) : `Needs numbers 1 to ${most}, such as 1–5, 7.`;
  const type = (typed: string) => {
    setText(typed);
    const list = readList(typed, most);
    if (typed.trim() === '') desk.type(path, typed, { value: undefined });
    else desk.type(path, typed, list === null ? null : { value: list });
  };
  return (
    <FieldFrame path={path} label={label} refusal={refusal}>
      <input
        id={`field:${path}`}
        value={shown}
        placeholder="all"
        autoComplete="off"
        aria-invalid={refusal !== null}
        onChange={({ target }) => type(target.value)}
        onBlur={() => isRead && setText(null)}
      />
    </FieldFrame>
  );
}

function readList(text: string, most: number): number[] | null {
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
function listText(list: readonly number[]): string {
  const runs: number[][] = [];
  for (const value of list) {
    const run = runs.at(-1);
    if (run !== undefined && run.at(-1) === value - 1) run.push(value);
    else runs.push([value]);
  }
  return runs.map((run) => (run.length > 2 ? `${run[0]}–${run.at(-1)}` : run.join(', '))).join(', ');
}
