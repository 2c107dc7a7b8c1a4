import { listAt, partAt, type Readable, type RuleBreach, repeatsIn, textAt } from './rule-breach.js';
import { shown } from './shown.js';

/** Lists whose entries stand at one bus each; the last say whether the first bus is meant where none is named. */
const AT_A_BUS: [list: PropertyKey[], optional: boolean][] = [
  [['network', 'generators'], false],
  [['network', 'motors'], false],
  [['network', 'resistive'], false],
  [['network', 'capacitors'], false],
  [['network', 'banks'], false],
  [['loads', 'distorting'], true],
];

/**
 * What the parts of a network have to do with each other and with the rest of the site.
 * @param site what was readable of it
 * @returns every rule that is broken
 */
export function networkRules(site: Readable): RuleBreach[] {
  const network = partAt(site, 'network');
  if (network === undefined) return withoutNetwork(site);
  const buses = listAt(network, 'buses').map((bus) => textAt(bus, 'name'));
  const names = new Set(buses.filter((name) => name !== undefined));
  if (names.size === 0) return [];
  const known = (path: PropertyKey[]): RuleBreach[] => unknownBus(site, path, names);
  return [
    ...repeatsIn(buses).map(({ index, value }) =>
      breach(['network', 'buses', index, 'name'], 'each name once', `${shown(value)} again`),
    ),
    ...AT_A_BUS.flatMap(([list, optional]) =>
      listAt(site, ...list).flatMap((entry, index) =>
        optional && partAt(entry, 'bus') === undefined ? [] : known([...list, index, 'bus']),
      ),
    ),
    ...endRules(site, known),
    ...transformerRules(site, names),
    ...(partAt(network, 'bankBus') === undefined ? [] : known(['network', 'bankBus'])),
    ...couplingPointRules(site, known),
    ...measuredRules(site, known),
  ];
}

/** Names of buses mean nothing where there is one bus without a name. */
function withoutNetwork(site: Readable): RuleBreach[] {
  const lists: PropertyKey[][] = [
    ['supply', 'transformers'],
    ['loads', 'distorting'],
  ];
  return lists.flatMap((list) =>
    listAt(site, ...list).flatMap((entry, index) => {
      const bus = partAt(entry, 'bus');
      return bus === undefined
        ? []
        : [breach([...list, index, 'bus'], 'a bus of site.network, which is absent', shown(bus))];
    }),
  );
}

function unknownBus(site: Readable, path: PropertyKey[], names: ReadonlySet<string>): RuleBreach[] {
  const name = partAt(site, ...path);
  if (typeof name === 'string' && names.has(name)) return [];
  // A name that is absent or no text was told by the schema already.
  if (typeof name !== 'string') return [];
  return [breach(path, `one of the buses ${[...names].map(shown).join(', ')}`, shown(name))];
}

function endRules(site: Readable, known: (path: PropertyKey[]) => RuleBreach[]): RuleBreach[] {
  const lists: PropertyKey[][] = [
    ['network', 'couplers'],
    ['network', 'cables'],
  ];
  return lists.flatMap((list) =>
    listAt(site, ...list).flatMap((entry, index) => {
      const path = [...list, index, 'between'];
      const [from, to] = [partAt(entry, 'between', 0), partAt(entry, 'between', 1)];
      if (typeof from === 'string' && from === to) return [breach(path, 'two different buses', `${shown(from)} twice`)];
      return [...known([...path, 0]), ...known([...path, 1])];
    }),
  );
}

function transformerRules(site: Readable, names: ReadonlySet<string>): RuleBreach[] {
  const transformers = listAt(site, 'supply', 'transformers');
  const at = transformers.map((transformer) => textAt(transformer, 'bus'));
  const breaches = at.flatMap((bus, index): RuleBreach[] => {
    const path = ['supply', 'transformers', index, 'bus'];
    if (bus !== undefined) return unknownBus(site, path, names);
    if (names.size === 1) return [];
    return [{ code: 'missing', path, expected: 'the bus it feeds, since there are several', found: 'nothing' }];
  });
  const arrangement = partAt(site, 'supply', 'arrangement');
  const distinct = new Set(at).size;
  const path = ['supply', 'arrangement'];
  if (arrangement === 'parallel' && distinct > 1) {
    return [...breaches, breach(path, '"separate", as the buses of the transformers say', '"parallel"')];
  }
  if (arrangement === 'separate' && at.length > 1 && distinct < at.length) {
    return [...breaches, breach(path, 'a bus of its own for every transformer', '"separate"')];
  }
  return breaches;
}

function couplingPointRules(site: Readable, known: (path: PropertyKey[]) => RuleBreach[]): RuleBreach[] {
  const path = ['network', 'couplingPoint'];
  const point = partAt(site, ...path);
  if (point === undefined) return [];
  if (point !== 'primary') return known(path);
  const transformers = listAt(site, 'supply', 'transformers').length;
  return transformers > 0 ? [] : [breach(path, 'a bus, since there is no transformer', '"primary"')];
}

function measuredRules(site: Readable, known: (path: PropertyKey[]) => RuleBreach[]): RuleBreach[] {
  const place = partAt(site, 'loads', 'measured', 'place');
  return place === undefined ? [] : known(['loads', 'measured', 'place']);
}

function breach(path: PropertyKey[], expected: string, found: string): RuleBreach {
  return { code: 'inconsistent', path, expected, found };
}
