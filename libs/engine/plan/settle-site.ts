import { limitChoice } from '../duty/limit-editions.js';
import type { SiteFacts } from '../duty/site-facts.js';
import type { Loads } from '../network/loads.js';
import { settleTopology } from '../network/settle-topology.js';
import type { Topology } from '../network/topology.js';
import { InputProblem, type Problem, type Remark, remark } from '../problem.js';
import { compensatedSum } from '../quantity/compensated-sum.js';
import type { LoadRecord } from '../record/load-record.js';
import type { Supply, SupplyInput } from '../supply/supply.js';
import { fittedLoads } from './fitted-loads.js';
import { loadProblems } from './load-problems.js';
import { moneyPapers } from './money-papers.js';
import { settleGroup } from './settle-bank.js';
import type { SettledSite } from './settled-site.js';
import type { Site } from './site.js';

/** A site with its defaults filled in, and a line for each of them. */
export interface Settled {
  site: SettledSite;
  assumptions: Remark[];
}

// The topology of a site with a network part, null for one bus; what its capacitors took is said with the rest.
function settledTopology(site: Site, assumptions: Remark[]): Topology | null {
  if (site.network === undefined) return null;
  const context = { frequencyHz: site.frequencyHz, assumptions, findings: assumptions };
  return settleTopology(site.network, {
    nominalV: site.bus.nominalV,
    frequencyHz: site.frequencyHz,
    ...(site.meteredAt === undefined ? {} : { meteredAt: site.meteredAt }),
    transformerBuses: (site.supply.transformers ?? []).map(({ bus }) => bus),
    group: (stage, path) => settleGroup(stage, path, context),
  });
}

/** Collects the values that were taken where the site file gave none. */
class Defaults {
  readonly assumptions: Remark[] = [];

  take<T extends number | string>(given: T | undefined, otherwise: T, path: string, unit?: string): T {
    if (given !== undefined) return given;
    // A member of a list keeps its own path; the code names the field alone, so that one sentence serves all.
    this.note(`default.${path.replaceAll(/\[\d+\]/g, '')}`, path, { value: otherwise }, unit);
    return otherwise;
  }

  note(code: string, path: string, values: Record<string, number | string>, unit?: string): void {
    this.assumptions.push(remark(code, values, unit === undefined ? { path } : { path, unit }));
  }
}

/**
 * Fills in every default of the site and says so, one assumption each.
 * @param site validated site
 * @param record the meter's record; null for a scan, where damping counts as 0 unless given
 * @returns the settled site and its assumptions
 * @throws InputProblem where parts contradict each other
 * @source method-conventions
 */
export function settleSite(site: Site, record: LoadRecord | null): Settled {
  const problems = [...contradictions(site), ...loadProblems(site)];
  if (problems.length > 0) throw new InputProblem(problems);
  const defaults = new Defaults();
  const hasTransformer = (site.supply.transformers ?? []).length > 0;
  const highestRatio = site.rules === 'iec' ? 1.1 : 1.058;
  const settled: SettledSite = {
    name: site.name,
    asOf: site.asOf ?? null,
    timeZone: site.timeZone,
    currency: site.currency ?? null,
    rules: site.rules,
    frequencyHz: site.frequencyHz,
    nominalV: site.bus.nominalV,
    highestV: defaults.take(site.bus.highestV, highestRatio * site.bus.nominalV, 'bus.highestV', 'V'),
    meteredAt: site.meteredAt ?? 'bus',
    recordedBank: site.recordedBank ?? { state: 'none' },
    targetPowerFactor: defaults.take(site.target?.powerFactor, 0.95, 'target.powerFactor'),
    onExport: defaults.take(site.target?.onExport, 'importOnly', 'target.onExport'),
    supply: settleSupply(site.supply, defaults),
    loads: settleLoads(site, record, defaults),
    topology: settledTopology(site, defaults.assumptions),
    emcClass: 2,
    limits: limitChoice(site.rules, site.limits),
    facts: siteFacts(site),
    papers: moneyPapers(site),
  };
  // Only this edition has classes.
  if (settled.limits.edition === 'IEC 61000-2-4:2002') {
    settled.emcClass = defaults.take(site.limits?.emcClass, 2, 'limits.emcClass') as 1 | 2 | 3;
  }
  if (site.recordedBank === undefined) defaults.note('default.recordedBank', 'recordedBank', {});
  if (!hasTransformer) defaults.note('supply.noTransformer', 'supply.transformers', {});
  noteNetwork(site, defaults);
  const { measured } = settled.facts;
  const fitted = measured?.use === 'fit' ? fittedLoads(site, settled, measured) : null;
  if (fitted !== null) settled.loads = fitted.loads;
  return { site: settled, assumptions: [...defaults.assumptions, ...(fitted?.lines ?? []), ...understood(site)] };
}

function noteNetwork(site: Site, defaults: Defaults): void {
  if ((site.network?.cables ?? []).length > 0) defaults.note('network.cables.steady', 'network.cables', {});
  for (const { name, bus, path } of switchedBeside(site)) {
    defaults.note('network.besideNotSimulated', path, { name, bus });
  }
}

// Whatever else is switched in the network has a controller, or a hand, that nobody told.
function switchedBeside({ network }: Site): { name: string; bus: string; path: string }[] {
  const sets = (network?.capacitors ?? []).map((set, i) => ({
    ...set,
    name: set.name ?? `capacitors ${i + 1}`,
    path: `network.capacitors[${i}]`,
  }));
  const banks = (network?.banks ?? []).map(({ name, bus }, i) => ({
    bus,
    name: name ?? `bank ${i + 1}`,
    path: `network.banks[${i}]`,
  }));
  return [...sets.filter(({ switched }) => switched), ...banks];
}

// What stood in another form is echoed as it was understood.
function understood(site: Site): Remark[] {
  return (site.understood ?? []).map(({ path, given, value, unit }) =>
    remark('understood.value', { given, value }, { path, unit }),
  );
}

function siteFacts(site: Site): SiteFacts {
  return {
    place: site.place ?? {},
    earthing: site.supply.earthing ?? null,
    photovoltaicKw: site.supply.photovoltaicKw ?? 0,
    fast: site.loads?.fast ?? [],
    measured: site.loads?.measured ?? null,
    currentTransformer: site.control?.currentTransformer ?? null,
    generator: site.control?.generator ?? {},
    bank: site.bank ?? null,
  };
}

function contradictions(site: Site): Problem[] {
  const problems: Problem[] = [];
  const transformers = site.supply.transformers ?? [];
  if (transformers.length > 0 && site.meteredAt === undefined) {
    problems.push({ code: 'missing', path: 'meteredAt', expected: '"bus" or "primary"', found: 'nothing' });
  }
  if (transformers.length === 0 && site.meteredAt === 'primary') {
    problems.push({
      code: 'inconsistent',
      path: 'supply.transformers',
      expected: 'a transformer, since the meter is at the primary',
      found: 'none',
    });
  }
  if (transformers.length > 1 && site.supply.arrangement === undefined && site.network === undefined) {
    problems.push({
      code: 'missing',
      path: 'supply.arrangement',
      expected: '"parallel" or "separate", since there are several transformers',
      found: 'nothing',
    });
  }
  if (transformers.length > 1 && site.supply.arrangement === 'separate' && site.network === undefined) {
    problems.push({
      code: 'not-supported-yet',
      path: 'supply.arrangement',
      expected: '"parallel": boards of their own are judged one site file each',
      found: '"separate"',
    });
  }
  if (site.recordedBank?.state === 'switching' && (site.recordedBank.bank ?? site.bank) === undefined) {
    problems.push({
      code: 'missing',
      path: 'recordedBank.bank',
      expected: 'the bank that was switching, here or as the site’s bank',
      found: 'nothing',
    });
  }
  return problems;
}

function settleSupply(supply: SupplyInput, defaults: Defaults): Supply {
  const { max, min } = supply.faultLevelMva;
  return {
    faultLevelMva: { max, min: defaults.take(min, max, 'supply.faultLevelMva.min', 'MVA') },
    rOverX: defaults.take(supply.rOverX, 0.1, 'supply.rOverX'),
    resistanceExponent: defaults.take(supply.resistanceExponent, 0.5, 'supply.resistanceExponent'),
    rippleHz: supply.rippleHz ?? null,
    transformers: (supply.transformers ?? []).map((transformer, i) => {
      const path = `supply.transformers[${i}]`;
      const part = (name: string): string => `${path}.${name}`;
      return {
        ratedKva: transformer.ratedKva,
        impedancePct: transformer.impedancePct,
        impedanceTolerancePct: defaults.take(transformer.impedanceTolerancePct, 10, part('impedanceTolerancePct'), '%'),
        loadLossKw: defaults.take(transformer.loadLossKw, 0, part('loadLossKw'), 'kW'),
        noLoadLossKw: defaults.take(transformer.noLoadLossKw, 0, part('noLoadLossKw'), 'kW'),
        noLoadCurrentPct: defaults.take(transformer.noLoadCurrentPct, 0, part('noLoadCurrentPct'), '%'),
      };
    }),
  };
}

function settleLoads(site: Site, record: LoadRecord | null, defaults: Defaults): Loads {
  const { loads } = site;
  // Motors and loads listed in a network damp already: the mean of the record would count them twice.
  const listed = (site.network?.motors ?? []).length + (site.network?.resistive ?? []).length > 0;
  const meanKw = record === null || listed ? 0 : Math.max(0, compensatedSum(record.activeKw) / record.activeKw.length);
  // A stated minimum above the mean is the user's own, and the maximum can't be less.
  const most = Math.max(meanKw, loads?.dampingKw?.min ?? 0);
  const max = listed
    ? (loads?.dampingKw?.max ?? most)
    : defaults.take(loads?.dampingKw?.max, most, 'loads.dampingKw.max', 'kW');
  if (listed && loads?.dampingKw?.max === undefined) defaults.note('loads.dampingListed', 'loads.dampingKw.max', {});
  // A list of loads that are all off declares what an empty one does.
  const none = loads?.distorting?.every(({ fundamentalA }) => fundamentalA === 0);
  if (none) defaults.note('loads.distorting.none', 'loads.distorting', {});
  if (loads?.backgroundPct?.length === 0) defaults.note('loads.backgroundPct.none', 'loads.backgroundPct', {});
  const angled =
    loads?.distorting?.filter(({ orders }) => orders?.some(({ angleDeg }) => angleDeg !== undefined)) ?? [];
  if (angled.length > 1) defaults.note('loads.angles', 'loads.distorting', { count: angled.length });
  return {
    motorSharePct: defaults.take(loads?.motorSharePct, 60, 'loads.motorSharePct', '%'),
    distorting: loads?.distorting ?? null,
    backgroundPct: loads?.backgroundPct ?? null,
    dampingKw: { max, min: Math.min(max, defaults.take(loads?.dampingKw?.min, 0, 'loads.dampingKw.min', 'kW')) },
    summation: defaults.take(loads?.summation, 'exponent', 'loads.summation'),
  };
}
