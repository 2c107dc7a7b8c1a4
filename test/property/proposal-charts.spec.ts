import { describe, expect, it } from 'vitest';
import { type Outcome, scanSite } from '#libs/engine/index.js';
import type { Chart } from '#libs/present/chart.js';
import { durationCurve } from '#libs/present/duration-curve.js';
import { findings } from '#libs/present/findings.js';
import { formatNumber } from '#libs/present/format-number.js';
import { impedanceOverOrder } from '#libs/present/impedance-over-order.js';
import { marginMap } from '#libs/present/margin-map.js';
import { phasors } from '#libs/present/phasors.js';
import { powerFactorByMonth } from '#libs/present/power-factor-by-month.js';
import { singleLine } from '#libs/present/single-line.js';
import { qualityOf } from '#libs/meter-files/record/quality.js';
import { scanReport } from '#libs/present/scan-report.js';
import { recordReport, resultReport } from '#libs/present/terminal-report.js';
import { worstDay } from '#libs/present/worst-day.js';
import { generatedCase } from '../support/generated-site.js';
import { MADE_BANK, MADE_PLAIN_BANK, madeOutcome, madeSite } from '../support/outcome.js';
import { runs } from '../support/soak.js';

const detuned = madeOutcome({ bank: MADE_BANK }, { days: 60 });

/** Everything a chart says in words or cells. */
function textsOf(chart: Chart): string[] {
  return [
    chart.finding,
    chart.caption,
    chart.sentence,
    ...chart.table.rows.flat(),
    ...chart.x.ticks.map(({ text }) => text),
  ];
}

/** No text without a number in it, every value on its axis, every row of the table whole. */
function holdsTogether(chart: Chart): void {
  for (const text of textsOf(chart)) expect(text).not.toMatch(/NaN|undefined|Infinity|null/);
  if (chart.id === 'marginMap') return;
  expect(chart.x.to).toBeGreaterThan(chart.x.from);
  expect(chart.y.to).toBeGreaterThan(chart.y.from);
  const values = chart.series.flatMap(({ y }) => Array.from(y)).filter((value) => !Number.isNaN(value));
  expect(values.filter((value) => value < chart.y.from - 1e-9 || value > chart.y.to + 1e-9)).toEqual([]);
  for (const row of chart.table.rows) expect(row).toHaveLength(chart.table.columns.length);
}

function chartsOf(outcome: Outcome): Chart[] {
  return [
    durationCurve(outcome),
    worstDay(outcome),
    phasors(outcome),
    powerFactorByMonth(outcome),
    impedanceOverOrder(outcome, outcome.bank, 'bank').chart(),
    marginMap(outcome.margins, 'bank'),
  ];
}

describe('every chart of any outcome', () => {
  it.each(Array.from({ length: runs(8, 50) }, (_, at) => at))(
    'holds its values and says no NaN, generated site %i',
    (number) => {
      const { parts, load } = generatedCase(number);
      const outcome = madeOutcome(parts, load);
      for (const chart of chartsOf(outcome)) holdsTogether(chart);
      const told = resultReport({ ...outcome, site: { ...outcome.site, name: 'a name' } });
      expect(told).not.toMatch(/NaN|undefined|[{}]/);
      for (const { what, consequence } of findings(outcome))
        expect(what + consequence).not.toMatch(/NaN|undefined|[{}]|–\./);
    },
  );
});

describe('the duration curve', () => {
  const chart = durationCurve(detuned);
  const line = chart.series.find(({ part }) => part === 'site')!;
  const stair = chart.series.find(({ part }) => part === 'bank')!;

  it('falls from the greatest need to the least', () => {
    const y = Array.from(line.y);
    expect(y[0]).toBe(detuned.result.requirement.maxKvar);
    expect(y.every((value, at) => at === 0 || value <= y[at - 1]!)).toBe(true);
  });

  it('inscribes only levels of the bank, none above the need', () => {
    const levels = new Set(detuned.result.bank.levelsKvar);
    Array.from(stair.y).forEach((kvar, at) => {
      expect(levels.has(kvar)).toBe(true);
      expect(kvar).toBeLessThanOrEqual(line.y[at]! * (1 + 1e-9));
    });
  });
});

describe('the phasors', () => {
  const chart = phasors(detuned);
  const arrows = chart.marks.flatMap((mark) => (mark.kind === 'arrow' ? [mark] : []));
  const [voltage, load, bank, sum] = arrows;

  it('have the voltage to the right and the load’s current lagging, downwards', () => {
    expect(voltage!.to[1]).toBe(0);
    expect(load!.to[0]).toBeGreaterThan(0);
    expect(load!.to[1]).toBeLessThan(0);
  });

  it('have the capacitors’ current leading the voltage by 90°, upwards', () => {
    expect(bank!.to[0]).toBe(bank!.from[0]);
    expect(bank!.to[1]).toBeGreaterThan(bank!.from[1]);
  });

  it('close: load and bank add up to what the supply carries', () => {
    expect(bank!.from).toEqual(load!.to);
    expect(sum!.to).toEqual(bank!.to);
  });

  it('are as long as their apparent power over √3·U', () => {
    const worst = detuned.result.operation.worstIntervals[0]!;
    const ampere = (Math.hypot(worst.activeKw, worst.reactiveKvar) * 1000) / (Math.sqrt(3) * 400);
    expect(Math.hypot(...load!.to)).toBeCloseTo(ampere, 9);
  });
});

describe('the worst day', () => {
  it('holds the worst interval, and what is left is the load less the bank', () => {
    const chart = worstDay(detuned);
    const worst = detuned.result.operation.worstIntervals[0]!;
    const load = Array.from(chart.series.find(({ part }) => part === 'site')!.y);
    const after = Array.from(chart.series.find(({ part }) => part === 'after')!.y);
    const connected = Array.from(chart.series.find(({ part }) => part === 'bank')!.y);
    expect(load).toContain(worst.reactiveKvar);
    expect(after).toContain(worst.residualKvar);
    load.forEach((kvar, at) => {
      expect(kvar - connected[at]!).toBe(after[at]);
    });
    expect(load.length).toBe(96 + 1);
  });
});

describe('the impedance', () => {
  it('has the closed-form resonance near its peak, damping left out', () => {
    const { chart } = impedanceOverOrder(detuned, detuned.bank, '7 %');
    const ring = chart().marks.find((mark) => mark.kind === 'ring')!;
    const closed = detuned.result.figures.find(({ id }) => id === 'network.parallelOrderClosedFormH')!;
    expect(ring.kind === 'ring' && Math.abs(ring.x - closed.value)).toBeLessThan(0.15);
  });

  it('draws two banks on one scale where it is shared', () => {
    const plain = madeOutcome({ bank: MADE_PLAIN_BANK }, { days: 20 });
    const own = impedanceOverOrder(plain, plain.bank, 'a');
    const rival = impedanceOverOrder(plain, plain.rival!.bank, 'b');
    const shared = {
      leastOhm: Math.min(own.scale.leastOhm, rival.scale.leastOhm),
      mostOhm: Math.max(own.scale.mostOhm, rival.scale.mostOhm),
    };
    expect(own.chart(shared).y).toEqual(rival.chart(shared).y);
  });
});

describe('the map of margins', () => {
  it('fills each cell by what its number says', () => {
    const chart = marginMap(
      {
        levelsKvar: [0, 50],
        ordersH: [5, 7],
        sharePct: [
          [50, 80.5],
          [100.2, 12],
        ],
      },
      'bank',
    );
    const fills = chart.marks.map((mark) =>
      mark.kind === 'cell' ? [mark.row, mark.column, mark.text, mark.fill] : [],
    );
    expect(fills).toEqual([
      [0, 0, '100.2', 'solid'],
      [0, 1, '12', 'blank'],
      [1, 0, '50', 'blank'],
      [1, 1, '81', 'hatch'],
    ]);
    expect(chart.finding).toContain('1 of 1 levels over a limit');
  });
});

describe('the single-line diagram', () => {
  it('names grid, transformer, bus, feeders and every stage with both ratings', () => {
    const diagram = singleLine(detuned);
    expect(diagram.grid).toBe('grid 180–250\u00a0MVA');
    expect(diagram.transformers).toEqual([{ name: '1\u00a0000\u00a0kVA', detail: 'impedance 6\u00a0%' }]);
    expect(diagram.stages).toHaveLength(8);
    expect(diagram.bank[1]).toContain('50\u00a0kvar at\u00a0480\u00a0V, 37.3\u00a0kvar at\u00a0400\u00a0V');
    expect(diagram.feeders.map(({ symbol }) => symbol)).toEqual(['motor', 'converter', 'load']);
  });

  it('draws a group once where there are too many stages to draw each', () => {
    const many = madeOutcome({ bank: { stages: [{ count: 30, ratedKvar: 12.5, ratedV: 440 }] } }, { days: 10 });
    expect(singleLine(many).stages).toEqual([{ text: '12.5', detuned: false, switched: true, times: 30 }]);
  });
});

describe('the report for a terminal', () => {
  it('says what is proposed, the verdict in words and every duty', () => {
    const text = resultReport(detuned);
    expect(text).toContain('Judged: the site’s own bank, eight stages, 261\u00a0kvar');
    expect(text).toContain('Verdict: within limits.');
    expect(text).toContain('not judged');
    for (const { name } of detuned.result.duties) expect(text).toContain(name);
    expect(text.endsWith('\n')).toBe(true);
  });

  it('lets no control character of a name through to the terminal', () => {
    const named = { ...detuned, site: { ...detuned.site, name: 'evil\u001b]0;title\u0007 works' } };
    // biome-ignore lint/suspicious/noControlCharactersInRegex: what must not be there
    expect(resultReport(named)).not.toMatch(/[\u0000-\u0009\u000b-\u001f]/);
  });

  it('reports a record by itself', () => {
    const { record, zone } = detuned;
    const counts = { format: 'csv', rowsRead: record.beginS.length, rejectedRows: 0 };
    const basis = { measured: record, repair: { method: 'none', upToS: null } as const, suspectZeros: [] };
    const report = recordReport(detuned.result.record, qualityOf(record, counts, zone, basis));
    expect(report).toContain('5\u00a0760 of 15\u00a0min, 0 missing');
    expect(report).toContain('limited: it says little of the rest of the year');
    expect(report).toMatch(/60\sdays\sare\smeasured;\s+usable\sasks\sfor\s85\sdays/);
    expect(report).toMatch(/month +expected +valid +repaired +covered/);
  });
});

describe('the report of a scan', () => {
  it('has a row a corner, the nominal case first, and each corner’s peak', () => {
    const site = madeSite({ bank: MADE_BANK });
    const { levels } = scanSite(site, { ordersH: Float64Array.from([1, 5, 7]) });
    const lines = scanReport(levels).trimEnd().split('\n');
    expect(lines).toHaveLength(2 + levels.length);
    expect(lines[0]).toContain('261\u00a0kvar');
    expect(lines[2]).toContain('250\u00a0MVA');
    expect(lines[2]).toContain(formatNumber(levels[0]!.parallelOrderH!));
    expect(new Set(lines.slice(1).map((line) => line.length)).size).toBe(1);
  });
});
