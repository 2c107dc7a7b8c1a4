// The right choice follows from physics alone: leading kvar that a file holds must reach the record or be named as left out,
// since over-correction shows in nothing else, and nothing may count twice. Codes are those of IEC 61968-9.
import { describe, expect, it } from 'vitest';
import { chooseSeries, leadingLeftOut, type Series } from './choose-series.js';
import { describeType, type ReadingType, UNSTATED } from './reading-type.js';
import { TimedReadings } from './timed-readings.js';

const WH = 72;
const VARH = 73;
const W = 38;
const VAR = 63;
const FORWARD = 1;
const LAGGING = 2;
const LEADING = 3;
const NET = 4;
const REVERSE = 19;

function series(unit: number, flowDirection: number, more: Partial<ReadingType> = {}, intervalS = 900): Series {
  const readings = new TimedReadings();
  readings.add({ stampS: 0, spanS: intervalS, value: 1, row: 1 });
  return { type: { ...UNSTATED, unit, flowDirection, ...more }, readings, intervalS };
}

const SAMPLE = { accumulation: 12 };
const REGISTER = { accumulation: 3 };

/** What is chosen, each as its quantity, its series and the length of its interval. */
function chosenOf(...all: Series[]): string[] {
  return chooseSeries(all).map(
    ({ quantity, series: { type, intervalS } }) => `${quantity}: ${describeType(type)} ${intervalS}`,
  );
}

describe('the series of a record', () => {
  it('keep a leading channel in var beside a lagging one in varh, in whatever order they stand', () => {
    const all = [series(WH, FORWARD), series(VARH, LAGGING), series(VAR, LEADING)];
    const expected = ['active: Wh forward 900', 'lagging: varh lagging 900', 'leading: var leading 900'];
    expect(chosenOf(...all)).toEqual(expected);
    expect(chosenOf(...all.toReversed())).toEqual(expected);
    expect(leadingLeftOut(chooseSeries(all), all)).toEqual([]);
  });

  it('keep a leading register beside lagging energies, each read in its own form', () => {
    const chosen = chooseSeries([series(WH, FORWARD), series(VARH, LAGGING), series(VARH, LEADING, REGISTER)]);
    expect(chosen.map(({ quantity, form }) => [quantity, form])).toEqual([
      ['active', 'energy'],
      ['lagging', 'energy'],
      ['leading', 'register'],
    ]);
  });

  it('are of one form where one tells both directions, and of no direction twice', () => {
    expect(
      chosenOf(series(WH, FORWARD), series(VARH, LAGGING), series(VAR, LAGGING), series(VAR, LEADING), series(W, NET)),
    ).toEqual(['active: W net 900', 'lagging: var lagging 900', 'leading: var leading 900']);
    expect(chosenOf(series(WH, FORWARD), series(W, FORWARD), series(VARH, LAGGING), series(VARH, LEADING))).toEqual([
      'active: Wh forward 900',
      'lagging: varh lagging 900',
      'leading: varh leading 900',
    ]);
  });

  it('take a net channel before a lagging one by itself', () => {
    expect(chosenOf(series(WH, FORWARD), series(VARH, LAGGING), series(VAR, NET))).toEqual([
      'active: Wh forward 900',
      'reactive: var net 900',
    ]);
  });

  it('add the three phases up where their sum does not tell leading kvar', () => {
    const phases = [128, 64, 32].flatMap((phase) => [
      series(VARH, LAGGING, { phase }),
      series(VAR, LEADING, { phase }),
    ]);
    expect(chosenOf(series(WH, FORWARD), series(VARH, LAGGING), ...phases)).toHaveLength(7);
  });

  it('are of one length: that at which leading kvar are told, up to an hour, else the shortest', () => {
    const hour = [WH, VARH].map((unit) => series(unit, unit === WH ? FORWARD : LAGGING, {}, 3600));
    const quarter = [series(W, FORWARD), series(VAR, LAGGING)];
    expect(chosenOf(...quarter, ...hour)).toEqual(['active: W forward 900', 'lagging: var lagging 900']);
    expect(chosenOf(...quarter, ...hour, series(VARH, LEADING, {}, 3600))).toEqual([
      'active: Wh forward 3600',
      'lagging: varh lagging 3600',
      'leading: varh leading 3600',
    ]);
    const day = [series(WH, FORWARD, {}, 86_400), series(VARH, LAGGING, {}, 86_400)];
    expect(chosenOf(...quarter, ...day, series(VARH, LEADING, {}, 86_400))).toHaveLength(2);
  });

  it('leave out leading kvar of another length, and tell which', () => {
    const all = [series(WH, FORWARD), series(VARH, LAGGING), series(VARH, LEADING, {}, 3600)];
    const chosen = chooseSeries(all);
    expect(chosen.map(({ quantity }) => quantity)).toEqual(['active', 'lagging']);
    expect(leadingLeftOut(chosen, all)).toEqual([all[2]]);
    expect(leadingLeftOut(chosen, all.slice(0, 2))).toEqual([]);
  });

  it('hold no value of a moment where there are means, and such values throughout where there are none', () => {
    const samples = [
      series(W, FORWARD, SAMPLE),
      series(W, REVERSE, SAMPLE),
      series(VAR, LAGGING, SAMPLE),
      series(VAR, LEADING, SAMPLE),
    ];
    const means = [series(WH, FORWARD), series(VARH, LAGGING)];
    expect(chosenOf(...samples, ...means)).toEqual(['active: Wh forward 900', 'lagging: varh lagging 900']);
    expect(leadingLeftOut(chooseSeries([...samples, ...means]), samples)).toEqual([samples[3]]);
    expect(chosenOf(...samples)).toHaveLength(4);
  });
});
