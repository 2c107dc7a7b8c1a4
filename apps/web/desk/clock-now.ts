/** The time of day by the reader's own clock, "14:02". */
export function clockNow(): string {
  const now = new Date();
  const two = (value: number) => String(value).padStart(2, '0');
  return `${two(now.getHours())}:${two(now.getMinutes())}`;
}
