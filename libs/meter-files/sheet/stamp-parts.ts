const DAY_MS = 86_400_000;

const two = (part: number): string => (part < 10 ? `0${part}` : String(part));

/**
 * A clock time with its seconds; 24:00:00 for a whole day.
 * @param clockS seconds since midnight, 0 … 86 400, thousandths kept [s]
 */
export function clockText(clockS: number): string {
  const wholeS = Math.floor(clockS);
  const thousandths = Math.round((clockS - wholeS) * 1000);
  const text = `${two(Math.floor(wholeS / 3600))}:${two(Math.floor(wholeS / 60) % 60)}:${two(wholeS % 60)}`;
  return thousandths === 0 ? text : `${text}.${String(thousandths).padStart(3, '0')}`;
}

let knownDay = 0;
let knownDate = '1970-01-01';

/**
 * A date, year first. The one before is kept: rows of a day come one after the other.
 * @param day days since 1970-01-01
 */
export function dateText(day: number): string {
  if (day === knownDay) return knownDate;
  knownDate = new Date(day * DAY_MS).toISOString().replace(/T.*$/, '');
  knownDay = day;
  return knownDate;
}
