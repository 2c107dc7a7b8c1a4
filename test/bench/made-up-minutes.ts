import { createLoadRecord, type LoadRecord } from '#libs/engine/index.js';

const INTERVALS = 525_600;
const FIRST_S = Date.UTC(2025, 0, 1) / 1000;

/** A made-up works' year of minutes, three decimals a number, the same on every run. */
export interface MadeUpMinutes {
  activeKw: Float64Array;
  /** leading < 0: a fixed capacitor over-corrects on some nights */
  reactiveKvar: Float64Array;
}

/** The year as columns: shifts, seasons, a drift of minutes and what motors add from one minute to the next. */
export function madeUpMinutes(): MadeUpMinutes {
  const activeKw = new Float64Array(INTERVALS);
  const reactiveKvar = new Float64Array(INTERVALS);
  let seed = 20_250_101;
  const chance = () => {
    seed = (Math.imul(seed, 1_664_525) + 1_013_904_223) >>> 0;
    return seed / 4_294_967_296;
  };
  let drift = 0;
  for (let i = 0; i < INTERVALS; i++) {
    const hour = (i % 1440) / 60;
    const weekday = Math.floor(i / 1440) % 7 < 5;
    const shift = weekday && hour >= 6 && hour < 22 ? 1 : 0.25;
    const season = 1 + 0.12 * Math.cos((2 * Math.PI * i) / INTERVALS);
    drift = 0.995 * drift + 0.03 * (chance() - 0.5);
    const kw = 620 * shift * season * (1 + drift + 0.02 * chance());
    activeKw[i] = Math.round(1000 * kw) / 1000;
    reactiveKvar[i] = Math.round(1000 * (-105 + 0.78 * kw * (1 + 0.3 * drift + 0.02 * chance()))) / 1000;
  }
  return { activeKw, reactiveKvar };
}

/** The year as a meter file. */
export function madeUpMinutesCsv({ activeKw, reactiveKvar }: MadeUpMinutes): string {
  const lines = ['begin UTC,active power (kW),reactive power (kvar)'];
  for (let i = 0; i < INTERVALS; i++) {
    const stamp = new Date((FIRST_S + i * 60) * 1000).toISOString().slice(0, 19).replace('T', ' ');
    lines.push(`${stamp},${activeKw[i]!.toFixed(3)},${reactiveKvar[i]!.toFixed(3)}`);
  }
  return `${lines.join('\n')}\n`;
}

/** The year as a record. */
export function madeUpMinutesRecord({ activeKw, reactiveKvar }: MadeUpMinutes): LoadRecord {
  return createLoadRecord({
    intervalS: 60,
    beginS: Float64Array.from({ length: INTERVALS }, (_, i) => FIRST_S + i * 60),
    activeKw,
    laggingKvar: reactiveKvar.map((kvar) => Math.max(kvar, 0)),
    leadingKvar: reactiveKvar.map((kvar) => Math.max(-kvar, 0)),
  });
}
