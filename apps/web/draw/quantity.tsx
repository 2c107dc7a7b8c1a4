import { type Digits, formatNumber } from '#libs/present/format-number.js';

/** A number with its unit, never broken between the two; the number is what the eye looks for. */
export function Quantity({ value, unit = '', digits }: { value: number | null; unit?: string; digits?: Digits }) {
  if (value === null) return <span className="num">–</span>;
  return (
    <span className="num nowrap">
      <b>{formatNumber(value, digits)}</b>
      {unit === '' ? null : (
        <span className="unit">
          {'\u00a0'}
          {unit}
        </span>
      )}
    </span>
  );
}
