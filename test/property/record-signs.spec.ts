// Each sign is planted in generated years of plants that work by the clock of Dublin, and must be found in nearly all of
// them, on the day it was planted; the same years without it are the control and must stay silent. Ratios of a lost or
// turned phase follow from three balanced phases: 2/3, and 2/3 − 1/3. Thresholds are common practice.
import { describe, expect, it } from 'vitest';
import { type MeteredColumns, recordSigns, type Remark } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { madePlant, PLANT_FIRST_S, PLANT_STEP_S, PLANT_ZONE, plantHabits, withChange } from '../support/made-plant.js';
import { runs, SEED } from '../support/soak.js';

const seeds = Array.from({ length: runs(20, 400) }, (_, k) => SEED + k);
const plants = new Map<number, MeteredColumns>();

function plant(seed: number): MeteredColumns {
  const known = plants.get(seed) ?? madePlant(chance(seed), plantHabits(chance(seed + 1_000_000)));
  plants.set(seed, known);
  return known;
}

const questions = (columns: MeteredColumns): Remark[] => recordSigns(columns, PLANT_ZONE).questions;

/** Days from 1 January 2025 to a date. */
const dayOf = (date: unknown): number => Math.round((Date.parse(`${date}T00:00:00Z`) / 1000 - PLANT_FIRST_S) / 86_400);

/** Share of the years in which something is found. */
function shareOf(isFound: (seed: number) => boolean): number {
  return seeds.filter(isFound).length / seeds.length;
}

function scaled(columns: MeteredColumns, factor: number, days: { fromDay: number; toDay?: number }): MeteredColumns {
  return withChange(
    columns,
    (copy, i) => {
      copy.activeKw[i]! *= factor;
      copy.laggingKvar[i]! *= factor;
    },
    days,
  );
}

/** The day a sign names lies within two of where it was planted, and no other step is named. */
function namesDay(found: Remark[], code: string, day: number): boolean {
  const steps = found.filter((remark) => /^sign\.(step|phase)/.test(remark.code));
  return steps.length === 1 && steps[0]!.code === code && Math.abs(dayOf(steps[0]!.values.date) - day) <= 2;
}

describe(`signs in a record, seeds from ${SEED}`, () => {
  it('are silent on ordinary years: shifts, weekends, seasons, holidays, a shutdown of two or three weeks', () => {
    expect(shareOf((seed) => questions(plant(seed)).length > 0)).toBeLessThanOrEqual(0.01);
  });

  it('find a step in the level of kW, its day and its size', () => {
    expect(
      shareOf((seed) => namesDay(questions(scaled(plant(seed), 2, { fromDay: 150 })), 'sign.stepKw', 150)),
    ).toBeGreaterThanOrEqual(0.9);
    const [step] = questions(scaled(plant(SEED), 2, { fromDay: 150 }));
    expect(Number(step!.values.afterKw) / Number(step!.values.beforeKw)).toBeGreaterThan(1.7);
    expect(Number(step!.values.afterKw) / Number(step!.values.beforeKw)).toBeLessThan(2.4);
  });

  it('stay silent on a step of a tenth and on one that is back within three weeks', () => {
    expect(shareOf((seed) => questions(scaled(plant(seed), 1.1, { fromDay: 150 })).length > 0)).toBe(0);
    const passing = { fromDay: 100, toDay: 121 };
    expect(shareOf((seed) => questions(scaled(plant(seed), 2, passing)).length > 0)).toBeLessThanOrEqual(0.02);
  });

  it('find a bank that was put in, from kvar that step while kW do not', () => {
    const banked = (seed: number) =>
      withChange(
        plant(seed),
        (copy, i) => {
          copy.laggingKvar[i] = 0.4 * copy.laggingKvar[i]!;
        },
        { fromDay: 130 },
      );
    expect(shareOf((seed) => namesDay(questions(banked(seed)), 'sign.stepKvar', 130))).toBeGreaterThanOrEqual(0.9);
  });

  it('tell a lost phase from a step, from the day it begins or until the day it ends', () => {
    const lost = (seed: number) => questions(scaled(plant(seed), 2 / 3, { fromDay: 120 }));
    const until = (seed: number) => questions(scaled(plant(seed), 2 / 3, { fromDay: 0, toDay: 290 }));
    expect(shareOf((seed) => namesDay(lost(seed), 'sign.phaseLost', 120))).toBeGreaterThanOrEqual(0.9);
    expect(shareOf((seed) => namesDay(until(seed), 'sign.phaseLostUntil', 290))).toBeGreaterThanOrEqual(0.9);
    // a third of the work goes, its base load stays: no phase
    const slack = (seed: number) =>
      withChange(
        plant(seed),
        (copy, i) => {
          if (copy.activeKw[i]! > 75) copy.activeKw[i]! *= 0.6;
        },
        { fromDay: 120 },
      );
    expect(shareOf((seed) => questions(slack(seed)).some(({ code }) => code.startsWith('sign.phase')))).toBe(0);
  });

  it('tell a phase that is turned round', () => {
    const turned = (seed: number) => questions(scaled(plant(seed), 1 / 3, { fromDay: 120 }));
    const until = (seed: number) => questions(scaled(plant(seed), 1 / 3, { fromDay: 0, toDay: 120 }));
    expect(shareOf((seed) => namesDay(turned(seed), 'sign.phaseTurned', 120))).toBeGreaterThanOrEqual(0.9);
    expect(shareOf((seed) => namesDay(until(seed), 'sign.phaseTurnedUntil', 120))).toBeGreaterThanOrEqual(0.9);
  });

  it('find a voltage that is gone from the mean of three for a day, and not for an hour', () => {
    const measured = { ...plant(SEED), voltageV: Float64Array.from(plant(SEED).beginS, (_, i) => 400 + (i % 7)) };
    const dip = (fromDay: number, toDay: number) =>
      questions(withChange(measured, (copy, i) => (copy.voltageV![i]! *= 2 / 3), { fromDay, toDay }));
    expect(questions(measured)).toEqual([]);
    expect(dip(200, 202)).toMatchObject([{ code: 'sign.voltageLost', values: { date: '2025-07-20', hours: 48 } }]);
    expect(dip(200, 200 + 1 / 24)).toEqual([]);
  });

  it('find kvar that lead at night and lag by day, and kvar that lead under load', () => {
    const fixedBank = (seed: number) => {
      const { activeKw, laggingKvar } = plant(seed);
      const bankKvar = 0.5 * Math.max(...laggingKvar);
      return withChange(
        plant(seed),
        (copy, i) => {
          const kvar = laggingKvar[i]! - bankKvar;
          copy.laggingKvar[i] = Math.max(kvar, 0);
          copy.leadingKvar[i] = Math.max(-kvar, 0) * (activeKw[i]! > 0 ? 1 : 0);
        },
        { fromDay: 0 },
      );
    };
    const swapped = (seed: number) => {
      const columns = plant(seed);
      return { ...columns, laggingKvar: columns.leadingKvar, leadingKvar: columns.laggingKvar };
    };
    const has = (columns: MeteredColumns, code: string) => questions(columns).some((remark) => remark.code === code);
    expect(shareOf((seed) => has(fixedBank(seed), 'sign.leadsAtNight'))).toBeGreaterThanOrEqual(0.9);
    expect(shareOf((seed) => has(swapped(seed), 'sign.leadsByDay'))).toBe(1);
  });

  it('find a register that stands still for two days, and the meter that reads 0 for nine hours', () => {
    const held = withChange(plant(SEED), (copy, i) => (copy.laggingKvar[i] = 41.3), { fromDay: 80, toDay: 82 });
    expect(questions(held)).toMatchObject([
      { code: 'sign.still', values: { register: 'kvar', date: '2025-03-22', hours: 48 } },
    ]);
    const off = withChange(
      plant(SEED),
      (copy, i) => {
        copy.activeKw[i] = 0;
        copy.laggingKvar[i] = 0;
      },
      { fromDay: 80.25, toDay: 80.625 },
    );
    expect(recordSigns(off, PLANT_ZONE)).toMatchObject({
      questions: [{ code: 'sign.zeros', values: { register: 'kW and kvar', date: '2025-03-22', hours: 9 } }],
      suspectZeros: [{ at: 'kW and kvar', intervals: 36, beginS: PLANT_FIRST_S + 80.25 * 86_400 }],
    });
  });

  it('take zeros for a habit where a site has them every night', () => {
    const nightly = withChange(
      plant(SEED),
      (copy, i) => {
        const hour = ((i * PLANT_STEP_S) / 3600) % 24;
        if (hour >= 20 || hour < 5) copy.activeKw[i] = 0;
      },
      { fromDay: 0 },
    );
    expect(recordSigns(nightly, PLANT_ZONE).suspectZeros).toEqual([]);
  });

  it('find stamps that stay on winter time, in nearly every year and at both changes of the clock', () => {
    // the plant works by the clock; its file's stamps do not follow it and are read as if they did
    const winterStamps = (seed: number) => {
      const columns = plant(seed);
      const [summerS, winterS] = [Date.UTC(2025, 2, 30, 1) / 1000, Date.UTC(2025, 9, 26, 1) / 1000];
      const isSummer = (beginS: number) => beginS >= summerS && beginS < winterS;
      const source = columns.beginS.map((beginS, i) =>
        Math.min(columns.beginS.length - 1, i + (isSummer(beginS) ? 4 : 0)),
      );
      return {
        ...columns,
        activeKw: source.map((i) => columns.activeKw[i]!),
        laggingKvar: source.map((i) => columns.laggingKvar[i]!),
      };
    };
    const clock = (seed: number) => questions(winterStamps(seed)).filter(({ code }) => code.startsWith('sign.day'));
    expect(
      shareOf((seed) => {
        const [found] = clock(seed);
        return found?.code === 'sign.dayEarlier' && found.values.date === '2025-03-30' && found.values.shifted === 2;
      }),
    ).toBeGreaterThanOrEqual(0.95);
  });

  it('need no more of a record than it has: one interval, one day, days of one value each', () => {
    const cut = (intervals: number): MeteredColumns => {
      const { intervalS, beginS, activeKw, laggingKvar, leadingKvar } = plant(SEED);
      const of = (values: Float64Array) => values.slice(0, intervals);
      return {
        intervalS,
        beginS: of(beginS),
        activeKw: of(activeKw),
        laggingKvar: of(laggingKvar),
        leadingKvar: of(leadingKvar),
        voltageV: null,
      };
    };
    expect(questions(cut(1))).toEqual([]);
    expect(questions(cut(96))).toEqual([]);
    const daily = { ...cut(300), intervalS: 86_400, beginS: cut(300).beginS.map((_, i) => PLANT_FIRST_S + i * 86_400) };
    expect(questions(daily).filter(({ code }) => /leads|day/.test(code))).toEqual([]);
  });
});
