import { listAt, numberAt, partAt, type Readable, type RuleBreach } from './rule-breach.js';

/** Forms a fault level may have, each with its greatest end first; an impedance is least where the level is greatest. */
const FAULT_FORMS: [greatest: string, least: string, needsVoltage: boolean][] = [
  ['maxMva', 'minMva', false],
  ['maxKa', 'minKa', true],
  ['minOhm', 'maxOhm', true],
];

/**
 * Quantities that may be given in one of several forms stand in exactly one, and whole.
 * @param site what was readable of it
 * @returns every rule that is broken
 */
export function spellingRules(site: Readable): RuleBreach[] {
  return [...faultLevelRules(site), ...ratioRules(site), ...reactorRules(site), ...cableRules(site)];
}

function faultLevelRules(site: Readable): RuleBreach[] {
  const supply = partAt(site, 'supply');
  if (typeof supply !== 'object' || supply === null) return [];
  const plain = partAt(supply, 'faultLevelMva');
  const other = partAt(supply, 'faultLevel');
  const path = ['supply', 'faultLevel'];
  if (other === undefined) {
    const expected = 'the greatest fault level: faultLevelMva, or faultLevel in kA or ohm at a voltage';
    return plain === undefined
      ? [{ code: 'missing', path: ['supply', 'faultLevelMva'], expected, found: 'nothing' }]
      : [];
  }
  if (plain !== undefined) return [breach(path, 'one of supply.faultLevelMva and supply.faultLevel', 'both')];
  const used = FAULT_FORMS.filter((form) => form.slice(0, 2).some((key) => partAt(other, String(key)) !== undefined));
  const [form] = used;
  if (form === undefined || used.length > 1) {
    const expected = 'one of maxMva, maxKa with atKv, minOhm with atKv';
    return [breach(path, expected, used.length === 0 ? 'none' : `${used.length} of them`)];
  }
  return formRules(other, form, path);
}

function formRules(
  given: Readable,
  [greatest, least, needsVoltage]: (typeof FAULT_FORMS)[number],
  path: string[],
): RuleBreach[] {
  const breaches: RuleBreach[] = [];
  if (partAt(given, greatest) === undefined) {
    breaches.push({
      code: 'missing',
      path: [...path, greatest],
      expected: 'the end of the greatest fault level',
      found: 'nothing',
    });
  }
  if (needsVoltage && partAt(given, 'atKv') === undefined) {
    breaches.push({
      code: 'missing',
      path: [...path, 'atKv'],
      expected: 'the voltage it is stated at',
      found: 'nothing',
    });
  }
  const [low, high] = greatest === 'minOhm' ? [greatest, least] : [least, greatest];
  if (numberAt(given, low) > numberAt(given, high)) {
    breaches.push(breach([...path, low], `at most ${path.join('.')}.${high}`, `${numberAt(given, low)}`));
  }
  return breaches;
}

/** A resistance has one form: a ratio to the reactance, and of a transformer its load loss. */
function ratioRules(site: Readable): RuleBreach[] {
  const transformers = ['supply', 'transformers'];
  const generators = ['network', 'generators'];
  const places: [path: PropertyKey[], keys: string[]][] = [
    [['supply'], ['rOverX', 'xOverR']],
    ...listAt(site, ...transformers).map((_, i): [PropertyKey[], string[]] => [
      [...transformers, i],
      ['loadLossKw', 'rOverX', 'xOverR'],
    ]),
    ...listAt(site, ...generators).map((_, i): [PropertyKey[], string[]] => [
      [...generators, i],
      ['rOverX', 'xOverR'],
    ]),
  ];
  return places.flatMap(([path, keys]) => {
    const given = keys.filter((key) => partAt(site, ...path, key) !== undefined);
    if (given.length < 2) return [];
    const found = given.length === keys.length && keys.length === 2 ? 'both' : given.join(' and ');
    return [
      breach([...path, given[given.length - 1]!], `one of ${keys.join(', ').replace(/, (\w+)$/, ' and $1')}`, found),
    ];
  });
}

function reactorRules(site: Readable): RuleBreach[] {
  const lists: PropertyKey[][] = [
    ['bank', 'stages'],
    ['recordedBank', 'bank', 'stages'],
    ['network', 'capacitors'],
    ...listAt(site, 'network', 'banks').map((_, index) => ['network', 'banks', index, 'stages']),
  ];
  return lists.flatMap((list) =>
    listAt(site, ...list).flatMap((stage, index) => {
      const given = ['reactorPct', 'tunedHz', 'tunedOrderH'].filter((key) => partAt(stage, key) !== undefined);
      const path = [...list, index, given[1] ?? ''];
      if (given.length > 1) return [breach(path, 'one of reactorPct, tunedHz and tunedOrderH', given.join(' and '))];
      return tuningRules(site, stage, [...list, index]);
    }),
  );
}

/** The tuned frequency lies above the fundamental, with room for the corners. */
function tuningRules(site: Readable, stage: Readable, path: PropertyKey[]): RuleBreach[] {
  const tunedHz = numberAt(stage, 'tunedHz');
  const leastHz = 1.07 * numberAt(site, 'frequencyHz');
  if (!(tunedHz < leastHz)) return [];
  const expected = `at least ${leastHz}: the reactor must leave a capacitor at the fundamental`;
  return [{ code: 'out-of-range', path: [...path, 'tunedHz'], expected, found: `${tunedHz}`, unit: 'Hz' }];
}

function cableRules(site: Readable): RuleBreach[] {
  return listAt(site, 'network', 'cables').flatMap((cable, index) => {
    const path = ['network', 'cables', index];
    const ways = ['resistanceOhmPerKm', 'crossSectionMm2', 'sizeAwg'].filter((key) => partAt(cable, key) !== undefined);
    if (ways.length > 1) return [breach([...path, ways[1]!], 'one way to say the resistance', ways.join(' and '))];
    if (ways.length === 1) return [];
    const expected = 'resistanceOhmPerKm, crossSectionMm2 or sizeAwg';
    return [{ code: 'missing' as const, path: [...path, 'resistanceOhmPerKm'], expected, found: 'nothing' }];
  });
}

function breach(path: PropertyKey[], expected: string, found: string): RuleBreach {
  return { code: 'inconsistent', path, expected, found };
}
