/**
 * How the energy of an interval becomes its mean power: energy × times ÷ over. Where an hour is a whole number of intervals
 * that is one multiplication, so that a quarter of an hour's kWh and its kW give each other back to the last place.
 * @param intervalS length of the interval [s]
 */
export function intervalsAnHour(intervalS: number): { times: number; over: number } {
  return 3600 % intervalS === 0 ? { times: 3600 / intervalS, over: 1 } : { times: 3600, over: intervalS };
}
