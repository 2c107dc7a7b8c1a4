import { describe, expect, it } from 'vitest';
import { createLoadRecord } from '../record/load-record.js';
import { UTC_TABLE } from '../record/zone-table.js';
import type { Site } from './site.js';
import { type Study, studySite } from './study.js';
import { leastTotalKvar } from './total-bound.js';

const site: Site = {
  name: 'bound',
  timeZone: 'UTC',
  rules: 'iec',
  frequencyHz: 50,
  bus: { nominalV: 400 },
  target: { powerFactor: 0.8 },
  supply: { faultLevelMva: { max: 100 } },
};

function study(kw: number[], kvar: number[], volts?: number[]): Study {
  const record = createLoadRecord({
    intervalS: 900,
    beginS: Float64Array.from(kw, (_, i) => i * 900),
    activeKw: Float64Array.from(kw),
    laggingKvar: Float64Array.from(kvar, (q) => Math.max(q, 0)),
    leadingKvar: Float64Array.from(kvar, (q) => Math.max(-q, 0)),
    voltageV: volts === undefined ? null : Float64Array.from(volts),
  });
  return studySite(site, record, UTC_TABLE);
}

const rows: [study: Study, mostKvar: number, bound: number | null, why: string][] = [
  [study([80, 80], [100, 100]), 500, 40, '80 kW may have 60 kvar'],
  [study([80, 80], [100, 60]), 500, 20, 'the month counts: 40 kvarh too many, and both intervals can give 20'],
  [study([80, 80], [100, -500]), 500, 0, 'leading is not netted off, and none is needed for the month’s 120'],
  [study([80, 80], [60, 60]), 500, 0, 'met already'],
  [study([80, 80], [100, 100]), 30, null, 'no bank of 30 could'],
  [study([80, 80], [100, 100], [440, 440]), 500, 40 / 1.21, 'each kvar is worth 1.21 at 10 % above nominal'],
  [study([80, 80], [100, 100], [360, 360]), 500, 40 / 0.81, 'and 0.81 at 10 % below'],
  [study([0, 0], [100, 100]), 500, 0, 'a month without energy meets every target'],
];

describe('the least total a bank could have', () => {
  it.each(rows)('%#: %s of %d', (of, mostKvar, bound, _why) => {
    const found = leastTotalKvar(of, mostKvar);
    if (bound === null) expect(found).toBeNull();
    else expect(Math.abs(found! - bound)).toBeLessThan(2e-3);
  });
});
