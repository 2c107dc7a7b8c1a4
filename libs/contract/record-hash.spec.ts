import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { createLoadRecord, type LoadRecordParts } from '#libs/engine/index.js';
import { canonicalJson } from './canonical-json.js';
import { planContent } from './plan-content.js';
import { recordBytes } from './record-hash.js';

function hashOf(changes: Partial<LoadRecordParts> = {}): string {
  const record = createLoadRecord({
    intervalS: 900,
    beginS: Float64Array.of(0, 900, 2700),
    activeKw: Float64Array.of(1, 2, 3),
    laggingKvar: Float64Array.of(0.5, 0.25, 0),
    leadingKvar: Float64Array.of(0, 0, 0.125),
    ...changes,
  });
  const hash = createHash('sha256');
  for (const chunk of recordBytes(record)) hash.update(chunk);
  return hash.digest('hex');
}

describe('the bytes a record is known by', () => {
  it('are the same for the same record', () => {
    expect(hashOf()).toBe(hashOf());
  });

  it('do not tell 0 from −0, which are one value', () => {
    expect(hashOf({ leadingKvar: Float64Array.of(-0, 0, 0.125) })).toBe(hashOf());
  });

  it.each<[string, Partial<LoadRecordParts>]>([
    ['a value in its last bit', { activeKw: Float64Array.of(1, 2, 3 + 2 ** -51) }],
    ['a time', { beginS: Float64Array.of(0, 900, 3600) }],
    ['the length of the interval', { intervalS: 450 }],
    [
      'columns that changed places',
      { laggingKvar: Float64Array.of(0, 0, 0.125), leadingKvar: Float64Array.of(0.5, 0.25, 0) },
    ],
    ['a column of zeros more', { connectedKvar: new Float64Array(3) }],
    ['which of two columns it is', { standby: new Uint8Array(3) }],
    ['a repair', { repaired: 1 }],
    ['a dropped repeat', { duplicates: 1 }],
  ])('tell %s', (_what, changes) => {
    expect(hashOf(changes)).not.toBe(hashOf());
  });
});

describe('canonical JSON', () => {
  it('has one spelling: keys sorted, absent members left out, −0 as 0, typed arrays as lists', () => {
    const value = { b: -0, a: [1e21, 'é', null], c: undefined, A: Float64Array.of(0.1) };
    expect(canonicalJson(value)).toBe('{"A":[0.1],"a":[1e+21,"é",null],"b":0}');
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY, 1n, () => 1])('refuses %s', (value) => {
    expect(() => canonicalJson({ value })).toThrow(/no canonical JSON/);
  });
});

describe('the content of a plan', () => {
  const inputs = {
    kind: 'plan' as const,
    site: {
      name: 'M',
      timeZone: 'UTC',
      rules: 'iec' as const,
      frequencyHz: 50,
      bus: { nominalV: 400 },
      supply: { faultLevelMva: { max: 1 } },
    },
    recordHash: 'ab',
    zone: { zone: 'UTC', fromS: [0], offsetS: [0] },
    engineVersion: '1',
  };

  it('does not depend on the order of keys', () => {
    const { name, ...rest } = inputs.site;
    expect(planContent({ ...inputs, site: { ...rest, name } })).toBe(planContent(inputs));
  });

  it('depends on each of its parts', () => {
    const others = [
      { ...inputs, kind: 'assess' as const },
      { ...inputs, site: { ...inputs.site, asOf: '2026-01-31' } },
      { ...inputs, recordHash: 'ac' },
      { ...inputs, zone: { ...inputs.zone, offsetS: [3600] } },
      { ...inputs, engineVersion: '2' },
    ];
    expect(new Set([inputs, ...others].map(planContent)).size).toBe(6);
  });
});
