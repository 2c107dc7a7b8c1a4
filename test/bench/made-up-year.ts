/** A made-up works' year of quarter hours: shifts, seasons and motors starting, the same on every run. */
export interface MadeUpYear {
  beginS: Float64Array;
  activeKw: Float64Array;
  laggingKvar: Float64Array;
}

const FIRST_S = Date.UTC(2025, 0, 1) / 1000;

/**
 * The year as columns, in whole tenths so that a file of it reads back to the same numbers.
 * @param intervals how many quarter hours
 * @returns times [s], active power [kW] and lagging reactive power [kvar]
 */
export function madeUpYear(intervals = 35_040): MadeUpYear {
  const beginS = Float64Array.from({ length: intervals }, (_, i) => FIRST_S + i * 900);
  const activeKw = new Float64Array(intervals);
  const laggingKvar = new Float64Array(intervals);
  let seed = 20_250_101;
  const chance = () => {
    seed = (Math.imul(seed, 1_664_525) + 1_013_904_223) >>> 0;
    return seed / 4_294_967_296;
  };
  let drift = 0;
  for (let i = 0; i < intervals; i++) {
    const hour = (i % 96) / 4;
    const weekday = Math.floor(i / 96) % 7 < 5;
    const shift = weekday && hour >= 6 && hour < 22 ? 1 : 0.25;
    const season = 1 + 0.12 * Math.cos((2 * Math.PI * i) / 35_040);
    drift = 0.96 * drift + 0.08 * (chance() - 0.5);
    activeKw[i] = Math.round(10 * 620 * shift * season * (1 + drift + 0.05 * chance())) / 10;
    laggingKvar[i] = Math.round(10 * (60 + 0.72 * activeKw[i]! * (1 + 0.3 * drift + 0.06 * chance()))) / 10;
  }
  return { beginS, activeKw, laggingKvar };
}

/** The year as a meter file. */
export function madeUpYearCsv(year: MadeUpYear): string {
  const lines = ['begin UTC,active power (kW),reactive power (kvar)'];
  for (let i = 0; i < year.beginS.length; i++) {
    const stamp = new Date(year.beginS[i]! * 1000).toISOString().slice(0, 16).replace('T', ' ');
    lines.push(`${stamp},${year.activeKw[i]},${year.laggingKvar[i]}`);
  }
  return `${lines.join('\n')}\n`;
}
