import { energyPowerFactor } from '#libs/engine/index.js';
import { listAt, numberAt, partAt, type Readable, type RuleBreach, repeatsIn, textAt } from './rule-breach.js';
import { shown } from './shown.js';

/** A printed power factor may be this far from that of the printed energies. */
const FACTOR_TOLERANCE = 0.01;
const EARLIEST_YEAR = 1950;
const LATEST_YEAR = 2149;

/**
 * What bills and equipment have to do with each other.
 * @param site what was readable of it
 * @returns every rule that is broken
 */
export function estimateRules(site: Readable): RuleBreach[] {
  const estimate = partAt(site, 'estimate');
  if (typeof estimate !== 'object' || estimate === null) return [];
  const bills = listAt(estimate, 'bills');
  return [
    ...emptyRules(estimate),
    ...bills.flatMap((bill, k) => [
      ...monthRules(bill, ['estimate', 'bills', k, 'month']),
      ...billRules(bill, ['estimate', 'bills', k]),
    ]),
    ...repeatsIn(bills.map((bill) => textAt(bill, 'month'))).map(
      ({ index, value }): RuleBreach => ({
        code: 'inconsistent',
        path: ['estimate', 'bills', index, 'month'],
        expected: 'each month once',
        found: `${shown(value)} again`,
      }),
    ),
  ];
}

function emptyRules(estimate: Readable): RuleBreach[] {
  if (partAt(estimate, 'bills') !== undefined || partAt(estimate, 'equipment') !== undefined) return [];
  return [{ code: 'missing', path: ['estimate'], expected: 'bills, equipment, or both', found: 'neither' }];
}

// A slip of the hand in the year would be a month of another calendar, or one no zone is known for.
function monthRules(bill: Readable, path: PropertyKey[]): RuleBreach[] {
  const month = textAt(bill, 'month');
  const year = Number(month?.slice(0, 4));
  if (!(year < EARLIEST_YEAR || year > LATEST_YEAR)) return [];
  const expected = `a month of the years ${EARLIEST_YEAR} to ${LATEST_YEAR}`;
  return [{ code: 'out-of-range', path, expected, found: shown(month) }];
}

function billRules(bill: Readable, path: PropertyKey[]): RuleBreach[] {
  return [
    ...oneOf(bill, path, ['laggingKvarh', 'powerFactor']),
    ...oneOf(bill, path, ['maxKw', 'maxKva']),
    ...factorRules(bill, path),
    ...apparentRules(bill, path),
  ];
}

function oneOf(bill: Readable, path: PropertyKey[], [first, second]: [string, string]): RuleBreach[] {
  if (typeof bill !== 'object' || bill === null) return [];
  if (partAt(bill, first) !== undefined || partAt(bill, second) !== undefined) return [];
  return [{ code: 'missing', path: [...path, first], expected: `${first} or ${second}`, found: 'neither' }];
}

function factorRules(bill: Readable, path: PropertyKey[]): RuleBreach[] {
  const given = numberAt(bill, 'powerFactor');
  const [activeKwh, laggingKvarh] = [numberAt(bill, 'activeKwh'), numberAt(bill, 'laggingKvarh')];
  const factor = energyPowerFactor(activeKwh, laggingKvarh);
  if (factor === null || !(Math.abs(factor - given) > FACTOR_TOLERANCE)) return [];
  const expected = `the factor of the kWh and kvarh beside it, ${factor.toFixed(3)}, to ${FACTOR_TOLERANCE}; leave out a factor of another kind`;
  return [{ code: 'inconsistent', path: [...path, 'powerFactor'], expected, found: `${given}` }];
}

function apparentRules(bill: Readable, path: PropertyKey[]): RuleBreach[] {
  const [maxKw, maxKva] = [numberAt(bill, 'maxKw'), numberAt(bill, 'maxKva')];
  if (!(maxKva < maxKw)) return [];
  const expected = `at least maxKw, ${maxKw}`;
  return [{ code: 'inconsistent', path: [...path, 'maxKva'], expected, found: `${maxKva}`, unit: 'kVA' }];
}
