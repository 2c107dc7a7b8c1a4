import { useState } from 'react';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from './document-path.js';
import { FieldFrame, refusalOf } from './field-frame.js';

/** How a list is typed on one line. */
export interface ListForm<T> {
  read: (text: string) => T[] | null;
  write: (list: readonly T[]) => string;
  /** what is needed, where the text is no list */
  needs: string;
  /** what an empty field means */
  otherwise: string;
}

/** A list of the site file, typed on one line; what is no list yet is kept as text and refused at its field. */
export function ListField<T>({ path, label, form }: { path: string; label: string; form: ListForm<T> }) {
  const { desk, state } = useDesk();
  const [text, setText] = useState<string | null>(null);
  const kept = valueAt(state.document, path);
  const shown = text ?? state.typed[path] ?? (Array.isArray(kept) ? form.write(kept) : '');
  const isRead = shown.trim() === '' || form.read(shown) !== null;
  // a list is refused as a whole, or at one of its entries
  const at = state.problems.find((problem) => problem.path?.startsWith(`${path}[`))?.path ?? path;
  const refusal = isRead ? refusalOf(state.problems, at) : `Needs ${form.needs}.`;
  const type = (typed: string) => {
    setText(typed);
    const list = form.read(typed);
    if (typed.trim() === '') desk.type(path, typed, { value: undefined });
    else desk.type(path, typed, list === null ? null : { value: list });
  };
  return (
    <FieldFrame path={path} label={label} refusal={refusal}>
      <input
        id={`field:${path}`}
        value={shown}
        placeholder={form.otherwise}
        autoComplete="off"
        aria-invalid={refusal !== null}
        onChange={({ target }) => type(target.value)}
        onBlur={() => isRead && setText(null)}
      />
    </FieldFrame>
  );
}
