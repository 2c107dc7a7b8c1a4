import { LIMIT_EDITIONS } from '#libs/engine/index.js';
import { estimateRules } from './estimate-rules.js';
import { networkRules } from './network-rules.js';
import { listAt, numberAt, partAt, type Readable, type RuleBreach, repeatsIn, textAt } from './rule-breach.js';
import { shown } from './shown.js';
import { spellingRules } from './spelling-rules.js';
import { tariffRules } from './tariff-rules.js';

/**
 * What the fields of a site have to do with each other.
 * @param site what was readable of it
 * @returns every rule that is broken
 */
export function siteRules(site: Readable): RuleBreach[] {
  return [
    ...voltageRules(site),
    ...spellingRules(site),
    ...networkRules(site),
    ...limitRules(site),
    ...supplyRules(site),
    ...transformerRules(site),
    ...loadRules(site),
    ...estimateRules(site),
    ...stateRules(site),
    ...priceRules(site),
    ...paperRules(site),
    ...tariffRules(partAt(site, 'tariff')).map((breach) => ({ ...breach, path: ['tariff', ...breach.path] })),
  ];
}

function voltageRules(site: Readable): RuleBreach[] {
  const nominalV = numberAt(site, 'bus', 'nominalV');
  const highestV = numberAt(site, 'bus', 'highestV');
  if (!(highestV < nominalV)) return [];
  const expected = `at least bus.nominalV, ${nominalV}`;
  return [{ code: 'inconsistent', path: ['bus', 'highestV'], expected, found: `${highestV}`, unit: 'V' }];
}

// A paper stands in for what the file does not hold.
function paperRules(site: Readable): RuleBreach[] {
  return ['tariff', 'prices'].flatMap((kind): RuleBreach[] => {
    if (partAt(site, 'papers', kind) === undefined || partAt(site, kind) === undefined) return [];
    const expected = `the name of a shared paper, or "${kind}" in the file itself`;
    return [{ code: 'inconsistent', path: ['papers', kind], expected, found: 'both' }];
  });
}

function supplyRules(site: Readable): RuleBreach[] {
  const breaches: RuleBreach[] = [];
  const max = numberAt(site, 'supply', 'faultLevelMva', 'max');
  const min = numberAt(site, 'supply', 'faultLevelMva', 'min');
  if (min > max) {
    const path = ['supply', 'faultLevelMva', 'min'];
    breaches.push({
      code: 'inconsistent',
      path,
      expected: `at most supply.faultLevelMva.max, ${max}`,
      found: `${min}`,
      unit: 'MVA',
    });
  }
  const rippleHz = numberAt(site, 'supply', 'rippleHz');
  const frequencyHz = numberAt(site, 'frequencyHz');
  if (rippleHz <= frequencyHz) {
    const expected = `more than frequencyHz, ${frequencyHz}`;
    breaches.push({ code: 'out-of-range', path: ['supply', 'rippleHz'], expected, found: `${rippleHz}`, unit: 'Hz' });
  }
  const count = listAt(site, 'supply', 'transformers').length;
  const meteredAt = partAt(site, 'meteredAt');
  if (count > 0 && meteredAt === undefined) {
    breaches.push({ code: 'missing', path: ['meteredAt'], expected: '"bus" or "primary"', found: 'nothing' });
  }
  if (count === 0 && meteredAt === 'primary') {
    const expected = '"bus", or a transformer in supply.transformers';
    breaches.push({ code: 'inconsistent', path: ['meteredAt'], expected, found: '"primary"' });
  }
  return [...breaches, ...arrangementRules(site, count)];
}

function arrangementRules(site: Readable, count: number): RuleBreach[] {
  const arrangement = partAt(site, 'supply', 'arrangement');
  const path = ['supply', 'arrangement'];
  // With a network the buses of the transformers say how they stand.
  if (partAt(site, 'network') !== undefined) return [];
  if (count > 1 && arrangement === undefined) {
    const expected = `"parallel" or "separate" for ${count} transformers`;
    return [{ code: 'missing', path, expected, found: 'nothing' }];
  }
  if (count > 1 && arrangement === 'separate') {
    const expected = '"parallel", or a site.network with a bus for each: boards of their own are never merged';
    return [{ code: 'not-supported-yet', path, expected, found: '"separate"' }];
  }
  return [];
}

/** An edition belongs to its rule set, and the user's own table alone needs rows. */
function limitRules(site: Readable): RuleBreach[] {
  const rules = partAt(site, 'rules');
  const edition = textAt(site, 'limits', 'edition');
  const path = ['limits', 'edition'];
  if (edition === undefined || (rules !== 'iec' && rules !== 'ieee')) return ownRepeats(site);
  const known: readonly string[] = LIMIT_EDITIONS[rules];
  if (!known.includes(edition)) {
    const expected = `an edition of the rule set: ${known.map(shown).join(', ')}`;
    return [{ code: 'inconsistent', path, expected, found: shown(edition) }, ...ownRepeats(site)];
  }
  if (edition === 'own' && partAt(site, 'limits', 'own') === undefined) {
    return [{ code: 'missing', path: ['limits', 'own'], expected: 'the limits to judge by', found: 'nothing' }];
  }
  return ownRepeats(site);
}

function ownRepeats(site: Readable): RuleBreach[] {
  return (['voltage', 'current'] as const).flatMap((key) =>
    repeatedOrders(listAt(site, 'limits', 'own', key), ['limits', 'own', key]),
  );
}

/** z is more than r, also with z at the lower end of its tolerance. */
function transformerRules(site: Readable): RuleBreach[] {
  return listAt(site, 'supply', 'transformers').flatMap((transformer, index) => {
    const ratedKva = numberAt(transformer, 'ratedKva');
    const tolerancePct = partAt(transformer, 'impedanceTolerancePct') ?? 10;
    const leastPct = numberAt(transformer, 'impedancePct') * (1 - Number(tolerancePct) / 100);
    const loadLossKw = numberAt(transformer, 'loadLossKw');
    const mostKw = (ratedKva * leastPct) / 100;
    if (!(loadLossKw >= mostKw)) return [];
    const expected = `less than ${mostKw}: the loss is part of the impedance, ${leastPct} % of ${ratedKva} kVA at least`;
    const path = ['supply', 'transformers', index, 'loadLossKw'];
    return [{ code: 'inconsistent' as const, path, expected, found: `${loadLossKw}`, unit: 'kW' }];
  });
}

function loadRules(site: Readable): RuleBreach[] {
  const breaches = listAt(site, 'loads', 'distorting').flatMap((load, index): RuleBreach[] => {
    const path = ['loads', 'distorting', index, 'orders'];
    if (partAt(load, 'spectrum') !== undefined || partAt(load, 'orders') !== undefined) {
      return repeatedOrders(listAt(load, 'orders'), path);
    }
    return [{ code: 'missing', path, expected: 'a list of orders, or the name of a spectrum', found: 'nothing' }];
  });
  for (const path of [['backgroundPct'], ['measured', 'voltagePct'], ['measured', 'currentA']]) {
    breaches.push(...repeatedOrders(listAt(site, 'loads', ...path), ['loads', ...path]));
  }
  const max = numberAt(site, 'loads', 'dampingKw', 'max');
  const min = numberAt(site, 'loads', 'dampingKw', 'min');
  if (min > max) {
    const path = ['loads', 'dampingKw', 'min'];
    const expected = `at most loads.dampingKw.max, ${max}`;
    breaches.push({ code: 'inconsistent', path, expected, found: `${min}`, unit: 'kW' });
  }
  return breaches;
}

function repeatedOrders(orders: unknown[], path: PropertyKey[]): RuleBreach[] {
  const ordersH = orders.map((order) => partAt(order, 'orderH'));
  return repeatsIn(ordersH).map(({ index, value }) => ({
    code: 'inconsistent',
    path: [...path, index, 'orderH'],
    expected: 'each order once',
    found: `${shown(value)} again`,
  }));
}

/** A bank that was switching has a nameplate, its own or the site's. */
function stateRules(site: Readable): RuleBreach[] {
  if (partAt(site, 'recordedBank', 'state') !== 'switching') return [];
  const breaches: RuleBreach[] = [];
  if (partAt(site, 'recordedBank', 'bank') === undefined && partAt(site, 'bank') === undefined) {
    const expected = 'the bank that was switching, here or as the site’s bank';
    breaches.push({ code: 'missing', path: ['recordedBank', 'bank'], expected, found: 'nothing' });
  }
  const min = numberAt(site, 'recordedBank', 'loadPowerFactor', 'min');
  const max = numberAt(site, 'recordedBank', 'loadPowerFactor', 'max');
  if (min > max) {
    const path = ['recordedBank', 'loadPowerFactor', 'min'];
    const expected = `at most recordedBank.loadPowerFactor.max, ${max}`;
    breaches.push({ code: 'inconsistent', path, expected, found: `${min}` });
  }
  return breaches;
}

function priceRules(site: Readable): RuleBreach[] {
  const breaches: RuleBreach[] = [];
  const siteCurrency = textAt(site, 'currency');
  const bookCurrency = textAt(site, 'prices', 'currency');
  if (siteCurrency !== undefined && bookCurrency !== undefined && siteCurrency !== bookCurrency) {
    const expected = `the site's currency, "${siteCurrency}"`;
    breaches.push({ code: 'inconsistent', path: ['prices', 'currency'], expected, found: shown(bookCurrency) });
  }
  const validFrom = textAt(site, 'prices', 'validFrom');
  const validTo = textAt(site, 'prices', 'validTo');
  if (validFrom !== undefined && validTo !== undefined && validTo < validFrom) {
    const expected = `a date not before prices.validFrom, "${validFrom}"`;
    breaches.push({ code: 'inconsistent', path: ['prices', 'validTo'], expected, found: shown(validTo) });
  }
  const kinds = listAt(site, 'prices', 'switches').map((entry) => partAt(entry, 'kind'));
  const kind = textAt(site, 'bank', 'switchKind');
  if (kind !== undefined && kinds.length > 0 && !kinds.includes(kind)) {
    const expected = `a kind of prices.switches: ${kinds.map(shown).join(', ')}`;
    breaches.push({ code: 'inconsistent', path: ['bank', 'switchKind'], expected, found: shown(kind) });
  }
  return [...breaches, ...repeatedNames(site)];
}

function repeatedNames(site: Readable): RuleBreach[] {
  const lists: [PropertyKey[], string][] = [
    [['prices', 'switches'], 'kind'],
    [['prices', 'cabinets'], 'name'],
    [['prices', 'reactors'], 'reactorPct'],
    [['catalogue', 'switches'], 'kind'],
    [['catalogue', 'cabinets'], 'name'],
  ];
  return lists.flatMap(([path, key]) =>
    repeatsIn(listAt(site, ...path).map((entry) => partAt(entry, key))).map(({ index, value }) => ({
      code: 'inconsistent' as const,
      path: [...path, index, key],
      expected: 'each once',
      found: `${shown(value)} again`,
    })),
  );
}
