import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { readQuantity, unitOfName } from './quantity.js';
import { readSite } from './read-site.js';

const SEED = 20_260_131;

/** An invented site that uses every part once. */
const SITE = {
  name: 'Invented Mill',
  asOf: '2026-01-31',
  timeZone: 'Europe/Dublin',
  currency: 'EUR',
  rules: 'iec',
  frequencyHz: 50,
  bus: { nominalV: 400, highestV: 420 },
  meteredAt: 'primary',
  recordedBank: { state: 'fixed', kvar: 20 },
  target: { powerFactor: 0.95, onExport: 'importOnly' },
  control: { setPointPowerFactor: 0.97, mode: 'nearestLevel', responseRatio: 0.65, stepDelayS: 10, wear: 'even' },
  supply: {
    faultLevelMva: { max: 250, min: 180 },
    rOverX: 0.1,
    rippleHz: null,
    arrangement: 'parallel',
    transformers: [{ ratedKva: '1 MVA', impedancePct: 6, loadLossKw: 10.5 }],
  },
  loads: {
    motorSharePct: 60,
    distorting: [
      { name: 'drives', fundamentalA: 320, spectrum: 'six-pulse-choke', orders: [{ orderH: 5, pct: 18.2 }] },
    ],
    backgroundPct: [{ orderH: 5, pct: 1.5 }],
    dampingKw: { max: 400, min: 0 },
  },
  bank: { stages: [{ count: 6, ratedKvar: 50, ratedV: 480, reactorPct: 7 }], interStageUh: 2 },
  limits: { emcClass: 2 },
  tariff: { clauses: [{ name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.02 }] },
  prices: { currency: 'EUR', perKvar: 9, switches: [{ kind: 'contactor', perStage: 38 }] },
  catalogue: { stageKvar: [25, 50], setPoints: [0.95] },
  finance: { discountPct: 8, horizonYears: 10 },
};

type Path = (string | number)[];

function pathsOf(value: unknown, path: Path = []): Path[] {
  if (typeof value !== 'object' || value === null) return [path];
  const parts = Array.isArray(value) ? value.map((part, i) => [i, part] as const) : Object.entries(value);
  return [path, ...parts.flatMap(([key, part]) => pathsOf(part, [...path, key]))];
}

function put(root: unknown, path: Path, value: unknown): unknown {
  const [key, ...rest] = path;
  if (key === undefined) return value;
  const copy = (Array.isArray(root) ? [...root] : { ...(root as object) }) as Record<string | number, unknown>;
  if (rest.length === 0 && value === undefined) delete copy[key];
  else copy[key] = put(copy[key], rest, value);
  return copy;
}

/** What a file may hold by mistake or malice, in place of any value, and what it may well hold. */
const STRANGE = fc.oneof(
  fc.constantFrom<unknown>(
    undefined,
    null,
    true,
    '',
    0,
    -0,
    -1,
    1e-320,
    1e308,
    Infinity,
    -Infinity,
    Number.NaN,
    [],
    {},
    [[]],
  ),
  fc.constantFrom(
    '0',
    '5 kW',
    '5 kvar',
    '400 V',
    '7 %',
    '1e9 GVA',
    '2 min',
    'NaN',
    '__proto__',
    'constructor',
    '\u0000',
  ),
  fc.double(),
  fc.double({ min: 0.001, max: 100, noNaN: true }),
  fc.integer({ min: 1, max: 12 }),
  fc.constantFrom(undefined, null),
  fc.integer(),
  fc.string({ maxLength: 30, unit: 'binary' }),
  fc.jsonValue({ maxDepth: 3 }),
);

describe('a site file with parts of it replaced', () => {
  it('is read as it stands or refused with a list, and nothing of it is changed on the way', () => {
    const paths = pathsOf(SITE);
    const one = fc.record({ path: fc.constantFrom(...paths), value: STRANGE });
    let accepted = 0;
    fc.assert(
      fc.property(fc.array(one, { minLength: 1, maxLength: 2 }), (changes) => {
        // later changes may find their place gone
        const json = changes.reduce<unknown>((site, { path, value }) => {
          const parent = path
            .slice(0, -1)
            .reduce<unknown>((part, key) => (part as Record<string, unknown>)?.[key], site);
          return path.length > 0 && (typeof parent !== 'object' || parent === null) ? site : put(site, path, value);
        }, SITE);
        const site = readOrProblems(json);
        if (site instanceof InputProblem) expect(site.problems.length).toBeGreaterThan(0);
        else {
          accepted++;
          const { understood: _, ...read } = site;
          expect(read).toEqual(asNumbers(json));
        }
      }),
      { seed: SEED, numRuns: 2000 },
    );
    // the test means something only where a good part of the files is accepted
    expect(accepted).toBeGreaterThan(100);
  });
});

function readOrProblems(json: unknown) {
  try {
    return readSite(json);
  } catch (error) {
    if (error instanceof InputProblem) return error;
    throw error;
  }
}

/** The same file with texts that stand for quantities read by the table of units, name by name. */
function asNumbers(value: unknown, name = '', outer = ''): unknown {
  if (Array.isArray(value)) return value.map((part) => asNumbers(part, name, outer));
  if (typeof value === 'object' && value !== null) {
    return Object.fromEntries(Object.entries(value).map(([key, part]) => [key, asNumbers(part, key, name)]));
  }
  const unit = unitOfName(name) ?? unitOfName(outer);
  const reading = typeof value === 'string' && unit !== null ? readQuantity(value, unit) : null;
  return reading !== null && 'value' in reading ? reading.value : value;
}
