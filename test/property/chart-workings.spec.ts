// What a chart shows of one moment, level or order is its formula with the values put in, worked out here by the
// evaluator of the tests; and it is the number that the chart itself prints or that its columns hold.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  type Figure,
  needFigure,
  type Outcome,
  type Site,
  studySite,
  UTC_TABLE,
} from '#libs/engine/index.js';
import {
  hoursWorkings,
  marginWorkings,
  momentWorkings,
  practiceWorking,
  rivalWorkings,
} from '#libs/present/chart-workings.js';
import { dayReplay } from '#libs/present/day-replay.js';
import { capitalWorking, recordWorkings, setPointWorking } from '#libs/present/headline-workings.js';
import { hoursAtLevel } from '#libs/present/hours-at-level.js';
import { phasors } from '#libs/present/phasors.js';
import { formatQuantity } from '#libs/present/format-number.js';
import { stageSwitchings } from '#libs/present/stage-switchings.js';
import { workedInterval } from '#libs/present/worst-interval.js';
import { chance } from '../support/chance.js';
import { evaluateFormula } from '../support/evaluate-formula.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { SEED } from '../support/soak.js';

const bank = {
  stages: [
    { count: 2, ratedKvar: 25, ratedV: 480, reactorPct: 7 },
    { count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 },
  ],
};
const loads = {
  distorting: [{ name: 'drives', fundamentalA: 200, spectrum: 'six-pulse' as const }],
  backgroundPct: [],
};
const prices = { perKvar: 40, perStage: 55, contingencyPct: 5 };

const SITES: [string, Partial<Site>][] = [
  ['metered at the bus', { bank, loads }],
  ['metered at the primary', { bank, loads, meteredAt: 'primary' }],
  ['that exports', { bank, loads, target: { onExport: 'absolute' } }],
];

function studied(parts: Partial<Site>) {
  const columns = driftingLoad(chance(SEED), 300, 400, 0.9);
  const record = madeRecord({ ...columns, activeKw: columns.activeKw.map((kw, i) => (i % 9 === 0 ? -kw / 4 : kw)) });
  const site = madeSite(parts);
  return { outcome: assessBank(site, record, UTC_TABLE), study: studySite(site, record, UTC_TABLE), record };
}

/** Holds the formula with its inputs against the value. */
function expectWorked(figures: readonly Figure[]): void {
  expect(new Set(figures.map(({ id }) => id)).size).toBe(figures.length);
  for (const figure of figures) {
    const values = new Map(figure.inputs.map(({ symbol, value }) => [symbol, value]));
    const { value, used } = evaluateFormula(figure.formula, values);
    expect(Math.abs(value - figure.value), `${figure.id}: ${value}`).toBeLessThanOrEqual(
      1e-9 * Math.max(1, Math.abs(figure.value)),
    );
    expect([...used].sort(), figure.id).toEqual([...values.keys()].sort());
    expect(figure.label.length * figure.working.length * figure.source.length, figure.id).toBeGreaterThan(0);
    expect(figure.label, figure.id).not.toContain('undefined');
  }
}

function numberOf(figures: readonly Figure[], name: string): number {
  return figures.find(({ id }) => id.endsWith(name))!.value;
}

describe.each(SITES)('the workings of the charts of a site %s', (_, parts) => {
  const { outcome, study } = studied(parts);

  it('are those of the interval under the cursor, in every interval of a day', () => {
    const replay = dayReplay(outcome, study, outcome.series.beginS[100]!);
    const first = outcome.series.beginS.indexOf(replay.beginS + replay.atS[0]!);
    expect(replay.atS.length).toBeGreaterThan(20);
    for (const i of replay.atS.keys()) {
      const { day, currents } = momentWorkings(outcome, replay, first + i);
      expectWorked([...day, ...currents]);
      expect(numberOf(day, 'neededKvar')).toBe(replay.needKvar[i]);
      expect(numberOf(day, 'leftKvar')).toBe(replay.loadKvar[i]! - replay.connectedKvar[i]!);
      const connected = day.find(({ id }) => id.endsWith('connectedKvar'));
      expect(connected?.value ?? 0).toBeCloseTo(replay.connectedKvar[i]!, 9);
    }
  });

  it('agree with the need that meets the target, and with no other (control)', () => {
    const { busKw, busKvar, needKvar } = outcome.series;
    const at = needKvar.indexOf(Math.max(...needKvar));
    const worked = (kvar: number) => {
      const load = { activeKw: busKw[at]!, reactiveKvar: busKvar[at]!, needKvar: kvar };
      const { formula, inputs } = needFigure('n', outcome.site, load);
      return evaluateFormula(formula, new Map(inputs.map(({ symbol, value }) => [symbol, value]))).value;
    };
    expect(worked(needKvar[at]!)).toBeCloseTo(needKvar[at]!, 8);
    // what the transformers take up hardly moves with the need, so a wrong one is off by nearly all of its error
    expect(Math.abs(worked(needKvar[at]! + 10) - (needKvar[at]! + 10))).toBeGreaterThan(9);
  });

  it('are in the worked interval of the paper the need that the plan rests on', () => {
    const { beginS, steps } = workedInterval(outcome);
    const step = steps.find(({ label }) => label === 'needed at the bus for the target');
    expect(step?.value).toBe(outcome.series.needKvar[outcome.series.beginS.indexOf(beginS)]);
  });

  it('give the currents that the phasors print', () => {
    const replay = dayReplay(outcome, study, outcome.series.beginS[100]!);
    const { beginS, busKw, busKvar, connectedKvar } = outcome.series;
    const { currents } = momentWorkings(outcome, replay, 100);
    const moment = { beginS: beginS[100]!, kw: busKw[100]!, loadKvar: busKvar[100]!, bankKvar: connectedKvar[100]! };
    const row = phasors(outcome, moment).table.rows.find(([name]) => name === 'A')!;
    expect(row.slice(1)).toEqual(
      ['loadA', 'bankA', 'supplyA'].map((name) => formatQuantity(numberOf(currents, name), '')),
    );
  });

  it('give the hours of each bar, and the line that practice draws', () => {
    const drawn = hoursAtLevel(outcome);
    const [share, ...hours] = hoursWorkings(outcome, new Set(drawn.bars.map(({ name }) => name)));
    expectWorked([share!, ...hours, practiceWorking(outcome)]);
    expect(hours.map(({ value }) => value)).toEqual(drawn.bars.map(({ value }) => value));
    expect(drawn.finding).toContain(formatQuantity(share!.value, '%'));
    expect(practiceWorking(outcome).value).toBe(stageSwitchings(outcome).limit!.at);
  });

  it('give each cell of a row of the margin map, and the greatest where none is picked', () => {
    const { levelsKvar, sharePct } = outcome.margins;
    for (const [level, kvar] of levelsKvar.entries()) {
      const row = marginWorkings(outcome.margins, kvar);
      expectWorked(row);
      expect(row.map(({ value }) => value)).toEqual(sharePct[level]);
    }
    expect(marginWorkings(outcome.margins, null)).toEqual(marginWorkings(outcome.margins, levelsKvar.at(-1)!));
  });

  it('give the other bank its own resonance and the row nearest to a limit', () => {
    const { impedance, margins } = rivalWorkings(outcome, outcome.rival!);
    expectWorked([...impedance, ...margins]);
    const all = outcome.rival!.margins.sharePct.flat();
    expect(Math.max(...margins.map(({ value }) => value))).toBe(Math.max(...all));
  });
});

describe('the workings beside a headline', () => {
  it('count the record, name the set point, and add up what a bank costs', () => {
    const { outcome } = studied({
      bank,
      loads,
      currency: 'EUR',
      prices,
      tariff: { clauses: [{ name: 'kvarh', kind: 'kvarhBeyondRatio', freeRatio: 0.3, pricePerUnit: 0.01 }] },
    });
    const { record, money } = outcome.result;
    const counts = recordWorkings(record);
    const capital = (money as Extract<Outcome['result']['money'], { capital: object }>).capital;
    expectWorked([...counts, setPointWorking(0.96, 'typed'), capitalWorking(capital, 'EUR')]);
    expect(counts.map(({ value }) => value)).toEqual([record.intervals, record.missing, record.maxKw]);
    expect(capitalWorking(capital, 'EUR').value).toBe(capital.total);
  });
});
