import { useState } from 'react';
import { formatNumber } from '#libs/present/format-number.js';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from './document-path.js';
import { FieldFrame, refusalOf } from './field-frame.js';
import { readTyped } from './read-typed.js';

/** A quantity of the site file, typed as people type it and shown as understood. */
export function QuantityField({
  path,
  label,
  unit = '',
  otherwise,
}: {
  path: string;
  label: string;
  unit?: string;
  /** what is taken where nothing is typed */
  otherwise?: string;
}) {
  const { desk, state } = useDesk();
  const kept = valueAt(state.document, path);
  const [text, setText] = useState<string | null>(null);
  const shown = text ?? state.typed[path] ?? textOf(kept);
  const read = shown.trim() === '' ? null : readTyped(shown, unit);
  const fault = read !== null && 'fault' in read ? read.fault : null;
  const echo = read !== null && 'echo' in read ? read.echo : null;
  const refusal = fault ?? refusalOf(state.problems, path);
  const type = (typed: string) => {
    setText(typed);
    const now = readTyped(typed, unit);
    if (typed.trim() === '') desk.type(path, typed, { value: undefined });
    else desk.type(path, typed, 'value' in now ? { value: now.value } : null);
  };
  return (
    <FieldFrame path={path} label={label} unit={unit} echo={echo} refusal={refusal}>
      <input
        id={`field:${path}`}
        value={shown}
        placeholder={otherwise}
        inputMode="decimal"
        autoComplete="off"
        aria-invalid={refusal !== null}
        aria-describedby={refusal === null ? undefined : `refusal:${path}`}
        onChange={({ target }) => type(target.value)}
        onBlur={() => fault === null && echo === null && setText(null)}
      />
    </FieldFrame>
  );
}

function textOf(value: unknown): string {
  if (typeof value === 'number') return formatNumber(value, 'working').replaceAll('\u00a0', ' ');
  return typeof value === 'string' ? value : '';
}
