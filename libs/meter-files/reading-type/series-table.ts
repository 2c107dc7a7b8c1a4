import type { Series } from './choose-series.js';
import type { ReadingType } from './reading-type.js';
import { intervalOf } from './series-moments.js';
import type { TimedReadings } from './timed-readings.js';

/** The series of a meter, those of one type and one interval length as one. */
export class SeriesTable {
  readonly series: Series[] = [];
  readonly #byMeaning = new Map<string, Series>();

  /**
   * Adds readings; a type that comes again, a month at a time for example, goes on.
   * @param type of the readings
   * @param readings in file order
   * @param statedS length of their intervals by their type, NaN where it is silent [s]
   */
  add(type: ReadingType, readings: TimedReadings, statedS: number): void {
    const intervalS = intervalOf(readings, statedS);
    const meaning = JSON.stringify([type, intervalS]);
    const known = this.#byMeaning.get(meaning);
    if (known !== undefined) {
      known.readings.append(readings);
      return;
    }
    const series = { type, readings, intervalS };
    this.#byMeaning.set(meaning, series);
    this.series.push(series);
  }
}
