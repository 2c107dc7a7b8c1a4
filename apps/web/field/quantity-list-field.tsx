import { formatNumber } from '#libs/present/format-number.js';
import { ListField } from './list-field.js';
import { readTyped } from './read-typed.js';

/** Quantities of one unit as a list: "25; 50", "6,25 12,5". */
export function QuantityListField({
  path,
  label,
  unit,
  otherwise,
}: {
  path: string;
  label: string;
  unit: string;
  otherwise: string;
}) {
  const form = {
    read: (text: string) => readQuantities(text, unit),
    write: (list: readonly number[]) => list.map((value) => formatNumber(value, 'working')).join('; '),
    needs: `numbers in ${unit} with semicolons between`,
    otherwise,
  };
  return <ListField path={path} label={`${label}, ${unit}`} form={form} />;
}

// A comma may be a decimal mark, so that only a semicolon, or a comma before a gap, stands between two numbers.
function readQuantities(text: string, unit: string): number[] | null {
  const parts = text.split(/;|,(?=\s)/).filter((part) => part.trim() !== '');
  const read = parts.map((part) => readTyped(part, unit));
  const values = read.flatMap((one) => ('value' in one ? [one.value] : []));
  return values.length === parts.length ? values : null;
}
