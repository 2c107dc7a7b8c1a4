import { readQuantity } from '#libs/contract/quantity.js';
import { formatNumber, GAP } from '#libs/present/format-number.js';

/** What a person's typing was understood as, or what to do about it. */
export type Typed = { value: number; echo: string | null } | { fault: string };

/**
 * Reads a quantity as people type it: "1.25 MVA", "0,4 kV", "1 250", a bare number in the field's own unit.
 * @param text as typed
 * @param unit the field's unit, empty for a pure number
 */
export function readTyped(text: string, unit: string): Typed {
  const plain = pointed(text.trim().replace(/(?<=\d)[\s\u00a0\u2009](?=\d{3}(\D|$))/g, ''));
  if (/^[+\-−]?(\d+\.?\d*|\.\d+)$/.test(plain)) {
    const value = Number(plain.replace('−', '-'));
    const isOwnForm = spaced(text) === spaced(formatNumber(value, 'working'));
    return { value, echo: text.includes(',') && !isOwnForm ? shown(text, value, unit) : null };
  }
  if (unit === '') return { fault: 'Type a number.' };
  const reading = readQuantity(plain, quantityUnit(unit));
  if ('value' in reading) return { value: reading.value, echo: shown(text, reading.value, unit) };
  if (reading.fault === 'other-dimension') return { fault: `This is measured in ${unit}.` };
  if (reading.fault === 'unknown-unit') return { fault: `The unit is not known here. Type it in ${unit}.` };
  return { fault: `Type a number, with or without ${unit}.` };
}

function spaced(text: string): string {
  return text.trim().replace(/[\u00a0\u2009]/g, ' ');
}

function quantityUnit(unit: string): string {
  return unit === 'Ω' ? 'ohm' : unit;
}

function shown(text: string, value: number, unit: string): string {
  return `${text.trim()}: ${formatNumber(value, 'given')}${unit === '' ? '' : GAP}${unit}`;
}

/** The last of several marks is the decimal one; a lone comma is one as well. */
function pointed(text: string): string {
  const comma = text.lastIndexOf(',');
  const point = text.lastIndexOf('.');
  if (comma < 0) return text;
  return comma > point ? text.replaceAll('.', '').replace(/,(?=[^,]*$)/, '.') : text.replaceAll(',', '');
}
