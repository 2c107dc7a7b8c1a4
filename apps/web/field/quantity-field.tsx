import { useState } from 'react';
import { formatNumber } from '#libs/present/format-number.js';
import { useDesk } from '../desk/use-desk.js';
import { valueAt } from './document-path.js';
import { FieldFrame, refusalOf } from './field-frame.js';
import { readTyped } from './read-typed.js';

/** A quantity of the site file, typed as people type it and shown as understood. */
export function QuantityField(place: QuantityPlace) {
  const { desk, state } = useDesk();
  return (
    <TypedQuantity
      {...place}
      kept={valueAt(state.document, place.path)}
      onType={(text, read) => desk.type(place.path, text, read)}
    />
  );
}

/** Where a quantity stands and how it is asked for. */
export interface QuantityPlace {
  path: string;
  label: string;
  unit?: string;
  /** what is taken where nothing is typed */
  otherwise?: string | undefined;
}

/** The field itself, wherever its value is kept. */
export function TypedQuantity({
  path,
  label,
  unit = '',
  otherwise,
  kept,
  onType,
}: QuantityPlace & {
  kept: unknown;
  /** a value, undefined for an emptied field, or null for a text that is none yet */
  onType: (text: string, read: { value: number | undefined } | null) => void;
}) {
  const { state } = useDesk();
  const [text, setText] = useState<string | null>(null);
  const shown = text ?? state.typed[path] ?? textOf(kept);
  const read = shown.trim() === '' ? null : readTyped(shown, unit);
  const fault = read !== null && 'fault' in read ? read.fault : null;
  const echo = read !== null && 'echo' in read ? read.echo : null;
  const refusal = fault ?? refusalOf(state.problems, path);
  const type = (typed: string) => {
    setText(typed);
    const now = readTyped(typed, unit);
    if (typed.trim() === '') onType(typed, { value: undefined });
    else onType(typed, 'value' in now ? { value: now.value } : null);
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
