import { zoneTable } from '#libs/contract/time-zone.js';
import { localTime } from '#libs/engine/index.js';

const INTERVAL_S = 900;
const FIRST_S = Date.UTC(2025, 0, 1) / 1000;
const LAST_S = Date.UTC(2026, 0, 1) / 1000;

/** Days without work beside Sundays, "month-day". */
const HOLIDAYS = new Set(['1-1', '3-17', '4-21', '5-5', '6-2', '8-4', '10-27', '12-24', '12-25', '12-26', '12-31']);
/** The hall stands still for two weeks in August, day of the year. */
const SHUTDOWN = { from: 215, to: 229 };

/**
 * A year of quarter hours of the example site, the same at every run: three shifts of extruders on weekdays, one on
 * Saturdays, base load otherwise.
 * @returns lines of CSV: beginning with its offset, kW, kvar
 */
export function* demoLoad(): Generator<string> {
  const zone = zoneTable('Europe/Dublin', FIRST_S, LAST_S);
  const chance = lcg(20_250_101);
  let wander = 0;
  yield 'begin,active (kW),reactive (kvar)\n';
  for (let beginS = FIRST_S; beginS < LAST_S; beginS += INTERVAL_S) {
    const { month, day, weekday, secondOfDay } = localTime(zone, beginS);
    const dayOfYear = Math.floor((beginS - FIRST_S) / 86_400);
    const isOff = HOLIDAYS.has(`${month}-${day}`) || (dayOfYear >= SHUTDOWN.from && dayOfYear < SHUTDOWN.to);
    wander = 0.92 * wander + 0.08 * (chance() - 0.5);
    const running = isOff ? 0 : runningShare(weekday, secondOfDay / 3600);
    const season = 1 + 0.05 * Math.cos((2 * Math.PI * (dayOfYear - 20)) / 365);
    const activeKw = (36 + 330 * running * season) * (1 + 0.6 * wander) + 6 * chance();
    // Half-loaded motors draw the worse power factor.
    const tangent = 1.02 - 0.16 * running - 0.05 * (season - 1) * 20 * 0.8 + 0.05 * (chance() - 0.5);
    yield `${stamp(beginS)},${activeKw.toFixed(1)},${(activeKw * tangent).toFixed(1)}\n`;
  }
}

/** Share of the hall's machines that run, 0 … 1, ramped over the changes of shift. */
function runningShare(weekday: number, hour: number): number {
  if (weekday === 7) return 0;
  const shift = (from: number, to: number) => Math.max(0, Math.min(1, (hour - from) / 0.75, (to - hour) / 0.75));
  if (weekday === 6) return 0.7 * shift(6, 14);
  const lunch = hour >= 12 && hour < 12.5 ? 0.75 : 1;
  return Math.max(shift(5.5, 14.25), 0.95 * shift(13.5, 22.25), 0.45 * shift(21.5, 24), 0.45 * shift(0, 6.25)) * lunch;
}

function stamp(epochS: number): string {
  return new Date(epochS * 1000).toISOString().replace(':00.000Z', 'Z');
}

/** Numbers from 0 to 1 that look like chance: x ← 1 664 525 x + 1 013 904 223 mod 2³². */
function lcg(seed: number): () => number {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 2 ** 32;
  };
}
