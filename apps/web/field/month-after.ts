/** The month after one that is typed already, so that a year of bills is quickly entered. */
export function monthAfter(month: unknown): string | undefined {
  const parts = typeof month === 'string' ? /^(\d{4})-(0[1-9]|1[0-2])$/.exec(month) : null;
  if (parts === null) return undefined;
  const next = 12 * Number(parts[1]) + Number(parts[2]);
  return `${Math.floor(next / 12)}-${String((next % 12) + 1).padStart(2, '0')}`;
}
