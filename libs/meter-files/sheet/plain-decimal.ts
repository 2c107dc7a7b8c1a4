const EXPONENT = /^(\d)(?:\.(\d+))?e([+-]\d+)$/;

/**
 * A number in digits alone, without an exponent: the shortest that is read back as the same double.
 * @param value finite
 */
export function plainDecimal(value: number): string {
  if (value === 0 || (Math.abs(value) >= 1e-6 && Math.abs(value) < 1e21)) return String(value);
  const text = String(Math.abs(value));
  const sign = value < 0 ? '-' : '';
  const parts = EXPONENT.exec(text)!;
  const digits = parts[1]! + (parts[2] ?? '');
  const point = 1 + Number(parts[3]);
  if (point <= 0) return `${sign}0.${'0'.repeat(-point)}${digits}`;
  return sign + digits.padEnd(point, '0');
}

/**
 * A number without a decimal mark, such as 12345e-2: it says nothing about the mark that texts beside it are written with.
 * @param value finite
 */
export function marklessNumber(value: number): string {
  const plain = plainDecimal(value);
  const mark = plain.indexOf('.');
  if (mark < 0) return plain;
  return `${plain.slice(0, mark)}${plain.slice(mark + 1)}e-${plain.length - mark - 1}`;
}
