/**
 * The mean power of an interval by its energy: energy times the intervals of an hour, where those are a whole number.
 * @param energy kWh or kvarh
 * @param intervalS length of the interval [s]
 */
export function slowMean(energy: number, intervalS: number): number {
  const anHour = 3600 / intervalS;
  return Number.isInteger(anHour) ? energy * anHour : (energy * 3600) / intervalS;
}
