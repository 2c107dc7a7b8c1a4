import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import type { Bill } from '../money/bill.js';
import { freeFactor } from '../money/free-factor.js';
import { type Remark, remark } from '../problem.js';
import { unusualSupply } from '../supply/unusual-supply.js';
import type { SettledSite } from './settled-site.js';
import type { Study } from './study.js';
import { unlikeBills } from './unlike-bills.js';

/** Tariffs ask for 0.85 and more; a tan φ typed for a power factor lies below this. */
const LEAST_TARGET = 0.8;
/** Tariffs round the factor they name, or give the ratio of kvarh for it. */
const FACTOR_ROUNDING = 0.005;
/** A unit rated this much above the voltage across it gives less than half of its kvar. */
const MOST_VOLTAGE_RATIO = 1.5;
/** The loads of a list may do a little more for a moment than the record's greatest mean. */
const LISTED_RATIO = 1.1;
/** A current transformer carries 1.2 of its rating for good, and is not accurate below a tenth of it at the peak. */
const TRANSFORMER_LOAD = { most: 1.2, least: 0.1 };
/** Public networks run at one frequency where these begin a zone's name. */
const ZONE_HZ: readonly (readonly [begins: string, frequencyHz: number])[] = [
  ['Europe/', 50],
  ['Australia/', 50],
  ['US/', 60],
  ['Canada/', 60],
  ['America/New_York', 60],
  ['America/Chicago', 60],
  ['America/Denver', 60],
  ['America/Los_Angeles', 60],
  ['America/Toronto', 60],
  ['America/Vancouver', 60],
];

/**
 * What of a site and its bank is unlike what is built or agreed: more often a slip of the keyboard than an odd site.
 * @param site settled site
 * @param bank the bank
 * @returns one remark a field
 * @source method-plausibility
 */
export function unusualSite(site: SettledSite, bank: Bank): Remark[] {
  const { supply, nominalV, targetPowerFactor, topology } = site;
  const found = topology === null ? unusualSupply(supply, nominalV) : [];
  if (targetPowerFactor < LEAST_TARGET) {
    const place = { path: 'target.powerFactor', source: 'practice' };
    found.push(remark('target.unusual', { targetPowerFactor, leastPowerFactor: LEAST_TARGET }, place));
  }
  return [...found, ...chargedTarget(site), ...unusualFrequency(site), ...unusualVoltages(site, bank)];
}

function chargedTarget({ targetPowerFactor, papers }: SettledSite): Remark[] {
  const free = papers.tariff === null ? null : freeFactor(papers.tariff);
  if (free === null || targetPowerFactor >= free.powerFactor - FACTOR_ROUNDING) return [];
  const values = { targetPowerFactor, freePowerFactor: free.powerFactor, name: free.name };
  return [remark('target.belowTariff', values, { path: 'target.powerFactor', source: 'practice' })];
}

function unusualFrequency({ frequencyHz, timeZone, rules, limits }: SettledSite): Remark[] {
  const found: Remark[] = [];
  const usualHz = ZONE_HZ.find(([begins]) => timeZone.startsWith(begins))?.[1];
  if (usualHz !== undefined && frequencyHz !== usualHz) {
    found.push(remark('site.frequencyUnusual', { frequencyHz, usualHz, timeZone }, { path: 'frequencyHz' }));
  }
  if (rules === 'ieee' && frequencyHz === 50) {
    const place = { path: 'rules', source: 'practice' };
    found.push(remark('site.rulesUnusual', { edition: limits.edition, frequencyHz }, place));
  }
  return found;
}

function unusualVoltages({ nominalV }: SettledSite, bank: Bank): Remark[] {
  return bank.groups.flatMap((group, at) => {
    const capacitorV = nominalV / (1 - group.reactorPct / 100);
    if (group.ratedV <= MOST_VOLTAGE_RATIO * capacitorV) return [];
    const values = { group: at + 1, ratedV: group.ratedV, capacitorV, givesKvar: effectiveKvar(group, nominalV) };
    const place = { path: `bank.stages[${at}].ratedV`, source: 'practice' };
    return [remark('bank.ratedVoltageUnusual', { ...values, ratedKvar: group.ratedKvar }, place)];
  });
}

/**
 * What of a record does not go with the site, its bank and itself.
 * @param study site and record
 * @param bank the bank
 * @param before bills as metered, by the site's tariff; null without one
 * @returns one remark a field
 * @source method-plausibility
 */
export function unusualRecord(study: Study, bank: Bank, before: Bill | null): Remark[] {
  const { site, recordSummary, record } = study;
  const found = unlikeBills(study, before);
  const { activeKwh, laggingKvarh } = recordSummary;
  const exports = record.activeKw.some((kw) => kw < 0);
  if (!exports && laggingKvarh > activeKwh) {
    found.push(remark('record.moreKvarhThanKwh', { activeKwh, laggingKvarh }, { source: 'practice' }));
  }
  const loadKva = (Math.sqrt(3) * site.nominalV * study.model.loadA) / 1000;
  const bankKvar = bank.groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, site.nominalV), 0);
  if (loadKva > 0 && bankKvar > loadKva) {
    found.push(remark('bank.aboveLoad', { bankKvar, loadKva }, { path: 'bank.stages', source: 'practice' }));
  }
  if (site.topology !== null) return found;
  return [...found, ...(exports ? [] : listedLoads(study, loadKva)), ...unusualTransformer(study)];
}

// Own generation hides load from the meter, so that a list may well come to more.
function listedLoads({ site }: Study, loadKva: number): Remark[] {
  if (site.facts.photovoltaicKw > 0) return [];
  const listedA = (site.loads.distorting ?? []).reduce((sum, load) => sum + load.fundamentalA, 0);
  const listedKva = (Math.sqrt(3) * site.nominalV * listedA) / 1000;
  if (listedKva <= LISTED_RATIO * loadKva) return [];
  return [remark('loads.aboveRecord', { listedKva, loadKva }, { path: 'loads.distorting', source: 'practice' })];
}

function unusualTransformer({ site, model }: Study): Remark[] {
  const given = site.facts.currentTransformer;
  const { loadA } = model;
  if (given === null || given.place === 'bank' || !(loadA > 0)) return [];
  const { ratioPrimaryA } = given;
  const share = loadA / ratioPrimaryA;
  if (share >= TRANSFORMER_LOAD.least && share <= TRANSFORMER_LOAD.most) return [];
  const place = { path: 'control.currentTransformer.ratioPrimaryA', source: 'practice' };
  return [remark('currentTransformer.unusual', { ratioPrimaryA, loadA, loadPct: 100 * share }, place)];
}
