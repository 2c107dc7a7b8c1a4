import { zoneTable } from '#libs/contract/time-zone.js';
import { localTime, type MeteredColumns, type ZoneTable } from '#libs/engine/index.js';
import type { Chance } from './chance.js';

/** Quarter hours of a year from 1 January 2025, local time in Dublin. */
export const PLANT_FIRST_S = Date.UTC(2025, 0, 1) / 1000;
export const PLANT_STEP_S = 900;
const DAYS = 365;

export const PLANT_ZONE: ZoneTable = zoneTable(
  'Europe/Dublin',
  PLANT_FIRST_S - 40 * 86_400,
  PLANT_FIRST_S + (DAYS + 40) * 86_400,
);

/** How a plant works. */
export interface PlantHabits {
  /** hours of the working day by the local clock; one, two or three shifts */
  fromH: number;
  toH: number;
  /** share of the load on Saturdays */
  saturday: number;
  baseKw: number;
  workKw: number;
  /** kvar over kW of machines, and kvar that stay in */
  tangent: number;
  baseKvar: number;
  /** share of the load that rises in summer or winter, negative for winter */
  season: number;
  /** first day and length of the yearly shutdown [days] */
  shutdown: { day: number; days: number };
  /** decimals the meter gives */
  decimals: number;
}

/** Habits as plants have them, by chance. */
export function plantHabits(random: Chance): PlantHabits {
  const fromH = random.oneOf([5, 6, 7, 8]);
  return {
    fromH,
    toH: fromH + random.oneOf([8, 9, 14, 16]),
    saturday: random.oneOf([0, 0, 0.4, 0.7]),
    baseKw: random.between(10, 60),
    workKw: random.between(80, 500),
    tangent: random.between(0.4, 1.1),
    baseKvar: random.between(2, 15),
    season: random.between(-0.25, 0.25),
    shutdown: { day: random.whole(180, 230), days: random.oneOf([0, 14, 21]) },
    decimals: random.oneOf([1, 2, 3]),
  };
}

/**
 * A year of a plant's quarter hours, as its meter gives them.
 * @param random where the scatter comes from
 * @param habits how it works
 * @returns columns, one entry an interval
 */
export function madePlant(random: Chance, habits: PlantHabits): MeteredColumns {
  const n = (DAYS * 86_400) / PLANT_STEP_S;
  const columns = {
    intervalS: PLANT_STEP_S,
    beginS: Float64Array.from({ length: n }, (_, i) => PLANT_FIRST_S + i * PLANT_STEP_S),
    activeKw: new Float64Array(n),
    laggingKvar: new Float64Array(n),
    leadingKvar: new Float64Array(n),
    voltageV: null,
  };
  const scale = 10 ** habits.decimals;
  let wander = 0;
  for (let i = 0; i < n; i++) {
    const { weekday, secondOfDay } = localTime(PLANT_ZONE, columns.beginS[i]!);
    const day = Math.floor((i * PLANT_STEP_S) / 86_400);
    wander = 0.95 * wander + 0.05 * (random.next() - 0.5);
    const season = 1 + habits.season * Math.sin((2 * Math.PI * (day - 110)) / 365);
    const share = workShare(habits, { day, weekday, hour: secondOfDay / 3600 });
    const kw = (habits.baseKw + habits.workKw * share) * season * (1 + wander) + random.next();
    const kvar = habits.baseKvar + kw * habits.tangent * (0.95 + 0.1 * random.next());
    columns.activeKw[i] = Math.round(kw * scale) / scale;
    columns.laggingKvar[i] = Math.round(kvar * scale) / scale;
  }
  return columns;
}

function workShare(habits: PlantHabits, at: { day: number; weekday: number; hour: number }): number {
  const { shutdown, fromH, toH, saturday } = habits;
  const stands = (at.day >= shutdown.day && at.day < shutdown.day + shutdown.days) || at.day < 2 || at.day > 357;
  if (stands || at.weekday === 7) return 0;
  const ramp = Math.max(0, Math.min(1, 2 * (at.hour - fromH), 2 * (toH - at.hour)));
  // a last shift that ends past midnight
  const late = Math.max(0, Math.min(1, 2 * (toH - 24 - at.hour)));
  return Math.max(ramp, late) * (at.weekday === 6 ? saturday : 1);
}

/**
 * The same columns with some of their intervals changed.
 * @param columns stay as they are
 * @param change gets the columns of the copy and an index
 * @param from first and last day that is changed
 */
export function withChange(
  columns: MeteredColumns,
  change: (copy: MeteredColumns, i: number) => void,
  { fromDay, toDay = DAYS }: { fromDay: number; toDay?: number },
): MeteredColumns {
  const copy = {
    ...columns,
    activeKw: columns.activeKw.slice(),
    laggingKvar: columns.laggingKvar.slice(),
    leadingKvar: columns.leadingKvar.slice(),
    voltageV: columns.voltageV?.slice() ?? null,
  };
  const from = columns.beginS.findIndex((beginS) => beginS >= PLANT_FIRST_S + fromDay * 86_400);
  for (let i = from; i < copy.beginS.length && copy.beginS[i]! < PLANT_FIRST_S + toDay * 86_400; i++) change(copy, i);
  return copy;
}
