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
  const [own, setOwn] = useState<{ text: string; value: unknown } | null>(null);
  const [isHeld, setHeld] = useState(false);
  // What was typed stays in its own spelling for as long as it is what is kept: another version may have taken its place.
  const stands = own !== null && (isHeld || own.value === null || own.value === kept);
  const shown = (stands ? own.text : undefined) ?? state.typed[path] ?? textOf(kept);
  const read = shown.trim() === '' ? null : readTyped(shown, unit);
  const fault = read !== null && 'fault' in read ? read.fault : null;
  const echo = read !== null && 'echo' in read ? read.echo : null;
  const refusal = fault ?? refusalOf(state.problems, path);
  const type = (typed: string) => {
    const now = readTyped(typed, unit);
    const found = typed.trim() === '' ? { value: undefined } : 'value' in now ? { value: now.value } : null;
    setOwn({ text: typed, value: found === null ? null : found.value });
    onType(typed, found);
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
        onFocus={() => setHeld(true)}
        onBlur={() => {
          setHeld(false);
          if (fault === null && echo === null) setOwn(null);
        }}
      />
    </FieldFrame>
  );
}

function textOf(value: unknown): string {
  if (typeof value === 'number') return formatNumber(value, 'working').replaceAll('\u00a0', ' ');
  return typeof value === 'string' ? value : '';
}
