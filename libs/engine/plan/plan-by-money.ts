import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import type { SettledCatalogue } from '../layout/candidates.js';
import type { SearchSpace } from '../layout/search-space.js';
import type { Alternative, Recommended } from '../money/money-result.js';
import type { Control } from '../operation/control.js';
import { meetsTarget, operationMonths } from '../operation/operation.js';
import { type Remark, remark, type Watch } from '../problem.js';
import { bestAttainableFactor } from './best-attainable.js';
import { judge, overallVerdict } from './judge-basis.js';
import { type MoneyStudy, siteSwitchKind } from './money-study.js';
import type { Outcome } from './outcome.js';
import { outcomeOf } from './outcome-of.js';
import { bankLines } from './plan-lines.js';
import { moneyOf, type Priced, priceBank } from './price-bank.js';
import { type Finished, NEAR_VALUE, type SearchAnswer, search } from './search.js';
import type { SiteSearchJudge } from './search-judge.js';
import { settleBank, settleControl } from './settle-bank.js';
import type { Site } from './site.js';
import { siteSearch } from './site-search.js';
import { type Operated, operate, type Study } from './study.js';
import type { WeighedBank } from './weighed-bank.js';

/** One of the ways that are weighed: nothing, today's bank, the new one. */
interface Way {
  name: Recommended;
  bank: Bank;
  control: Control;
  operated: Operated;
  switchKind: string | null;
  priced: Priced;
  npv: number;
  targetMet: boolean;
  verdict: Verdict;
  voltageDistortionPct: number;
  assumptions: Remark[];
}

/** What a search is asked about. */
interface Asked {
  study: Study;
  site: Site;
  money: MoneyStudy;
}

/**
 * Designs the bank that pays: the candidate of greatest net present value among those within limits and on target,
 * weighed against doing nothing and keeping today's bank.
 * @param study site and record
 * @param site validated site with a tariff, prices and sizes of stages
 * @param money the site's money without a bank
 * @param watch progress and stopping
 * @returns the outcome of the recommended way
 * @throws InputProblem where the catalogue makes too many candidates, Stopped where the watch says so
 * @source method-money
 */
export function planByMoney(study: Study, site: Site, money: MoneyStudy, watch?: Watch): Outcome {
  const asked: Asked = { study, site, money };
  const { catalogue, absent, space, judge: searchJudge } = siteSearch(study, site, money);
  const answer = search(space, searchJudge, watch);
  const ways = [
    doNothing(asked),
    ...keepTodays(asked),
    ...(answer.best === null ? [] : [newBank(asked, searchJudge, answer.best)]),
  ];
  const chosen = recommended(ways, searchJudge.demandedFactor !== null);
  const samples = answer.finished.length === 0 ? [] : nonDominated(answer, searchJudge, space);
  watch?.report(0.95);
  return outcomeOf('plan', study, {
    bank: chosen.bank,
    control: chosen.control,
    isOwn: chosen.name === "keep today's bank",
    operated: chosen.operated,
    priced: { site, ways: ways.map((way) => weighedOf(way, searchJudge.demandedFactor !== null)), chosen: chosen.name },
    money: () =>
      moneyOf(money, chosen.priced, {
        recommended: chosen.name,
        switchKind: chosen.switchKind,
        alternatives: [...ways.map(alternativeOf), ...samples],
        proof: answer.proof,
      }),
    said: {
      reasons: [recommendedReason(chosen, ways, site), ...shortReasons(asked, { answer, space, judge: searchJudge })],
      assumptions: [
        ...chosen.assumptions,
        ...absent.map((key) => remark(`default.catalogue.${key}`, {}, { path: `catalogue.${key}` })),
        ...choiceLines(site, catalogue),
        ...money.assumptions,
      ],
      // Doing nothing because nothing reaches a demanded target is no clear answer.
      atBest: searchJudge.demandedFactor !== null && !chosen.targetMet ? 'watch' : 'clear',
    },
  });
}

function doNothing({ study, site, money }: Asked): Way {
  const { bank } = settleBank({ stages: [] }, site.frequencyHz);
  const { control, assumptions } = settleControl(site.control, bank, study.site);
  const operated = asMetered(study, control);
  const priced = priceBank(study, money, { bank: null, operated, switchKind: null, isNew: false });
  return wayOf(study, {
    name: 'do nothing',
    bank,
    control,
    operated,
    switchKind: null,
    priced,
    assumptions,
  });
}

// The record as metered, whatever an old bank did while it was taken; nothing is connected.
function asMetered({ record, load, months }: Study, control: Control): Operated {
  const { beginS, intervalS, activeKw, laggingKvar, leadingKvar } = record;
  const meter = { activeKw, laggingKvar, leadingKvar };
  const connectedKvar = new Float64Array(beginS.length);
  return {
    beginS,
    intervalS,
    load,
    run: { connectedKvar, switchings: new Int32Array(0), connectedIntervals: new Float64Array(0) },
    deliveredKvar: connectedKvar,
    meter,
    control,
    months: operationMonths(meter, months, intervalS / 3600),
  };
}

function keepTodays({ study, site, money }: Asked): Way[] {
  if (site.bank === undefined) return [];
  const { bank, assumptions } = settleBank(site.bank, site.frequencyHz);
  const settled = settleControl(site.control, bank, study.site);
  const { control } = settled;
  const operated = operate(study, bank, control);
  const switchKind = siteSwitchKind(site);
  const priced = priceBank(study, money, { bank, operated, switchKind, isNew: false });
  const lines = [...assumptions, ...settled.assumptions];
  const name = "keep today's bank";
  return [wayOf(study, { name, bank, control, operated, switchKind, priced, assumptions: lines })];
}

function newBank({ study, site, money }: Asked, searchJudge: SiteSearchJudge, best: Finished): Way {
  const { bank, control } = best;
  const operated = operate(study, bank, control);
  const switchKind = searchJudge.kind(best).kind;
  const priced = priceBank(study, money, { bank, operated, switchKind, isNew: true });
  const { assumptions } = settleControl(site.control, bank, study.site);
  const replaced = searchJudge.replaces(best);
  const lines = assumptions.filter(({ path }) => path === null || !replaced.includes(path));
  const own = { name: 'new bank' as const, bank, control, operated, switchKind, priced };
  return wayOf(study, { ...own, assumptions: [...bankLines(bank), ...lines] });
}

function wayOf(study: Study, way: Omit<Way, 'npv' | 'targetMet' | 'verdict' | 'voltageDistortionPct'>): Way {
  const judgement = judge(study, way.bank, way.control);
  return {
    ...way,
    npv: way.priced.worth?.npv ?? 0,
    targetMet: meetsTarget(way.operated.months, study.site.targetPowerFactor),
    verdict: overallVerdict(study, judgement),
    voltageDistortionPct: Math.max(...judgement.network.levels.map((level) => level.voltageDistortionPct)),
  };
}

// In this order, a later one only where it is worth more; what misses a demanded target is not among them.
function recommended(ways: readonly Way[], mustMeetTarget: boolean): Way {
  let chosen: Way | null = null;
  for (const way of ways) {
    if (!mayBeRecommended(way, mustMeetTarget)) continue;
    if (chosen === null || way.npv > chosen.npv + NEAR_VALUE) chosen = way;
  }
  return chosen ?? ways[0]!;
}

function mayBeRecommended(way: Way, mustMeetTarget: boolean): boolean {
  if (way.name === 'new bank') return true;
  if (mustMeetTarget && !way.targetMet) return false;
  return way.name === 'do nothing' || way.verdict !== 'avoid';
}

function weighedOf(way: Way, mustMeetTarget: boolean): WeighedBank {
  const { name, bank, control, switchKind } = way;
  const eligible = mayBeRecommended(way, mustMeetTarget);
  return { name, bank, control, switchKind, isNew: name === 'new bank', eligible };
}

function alternativeOf(way: Way): Alternative {
  const { operated } = way;
  return {
    name: way.name,
    capital: way.priced.worth?.capital.total ?? 0,
    npv: way.npv,
    laggingKvarh: operated.months.reduce((sum, month) => sum + month.laggingKvarh, 0),
    totalSwitchings: operated.run.switchings.reduce((sum, count) => sum + count, 0),
    voltageDistortionPct: way.voltageDistortionPct,
    targetMet: way.targetMet,
    verdict: way.verdict,
    sample: false,
  };
}

/** Of the candidates simulated whole, those that no other of them equals or betters in everything. */
function nonDominated(answer: SearchAnswer, searchJudge: SiteSearchJudge, space: SearchSpace): Alternative[] {
  const others = answer.finished.filter((one) => one !== answer.best);
  const measures = (one: Finished): number[] => [one.capital, -one.npv, one.laggingKvarh, one.totalSwitchings];
  const betters = (a: Finished, b: Finished): boolean => {
    const [left, right] = [measures(a), measures(b)];
    return left.every((value, k) => value <= right[k]!) && left.some((value, k) => value < right[k]!);
  };
  return others
    .filter((one) => !answer.finished.some((other) => betters(other, one)))
    .map((one) => ({
      name: nameOf(one, searchJudge, space),
      capital: one.capital,
      npv: one.npv,
      laggingKvarh: one.laggingKvarh,
      totalSwitchings: one.totalSwitchings,
      targetMet: one.targetMet,
      sample: true,
      verdict: searchJudge.verdict(one),
      voltageDistortionPct: searchJudge.voltageDistortionPct(one),
    }))
    .filter(({ verdict }) => verdict !== 'avoid');
}

function nameOf(one: Finished, searchJudge: SiteSearchJudge, space: SearchSpace): string {
  const stages = one.bank.groups.map(({ count, ratedKvar }) => `${count} × ${ratedKvar} kvar`).join(' + ');
  const { ratedV, reactorPct } = space.builds[one.build]!;
  const kind = searchJudge.kind(one).kind;
  const parts = [stages, `${ratedV} V`, `${reactorPct} %`, kind, `λ ${space.setPoints[one.setPoint]}`];
  return parts.filter((part) => part !== null).join(', ');
}

function recommendedReason(chosen: Way, ways: readonly Way[], site: Site): Remark {
  const place = site.currency === undefined ? {} : { unit: site.currency };
  const { npv } = chosen;
  if (chosen.name === 'new bank') {
    return remark('search.newBank', { value: npv }, place);
  }
  if (chosen.name === "keep today's bank") return remark('search.keepBank', { value: npv }, place);
  const built = ways.find(({ name }) => name === 'new bank');
  return built === undefined ? remark('search.nothing', {}) : remark('search.nothingPays', { value: built.npv }, place);
}

function shortReasons(
  { study }: Asked,
  found: { answer: SearchAnswer; space: SearchSpace; judge: SiteSearchJudge },
): Remark[] {
  const { answer, space } = found;
  if (answer.best !== null)
    return answer.pool === 'watch' ? [remark('search.onlyWatch', {}, { path: 'catalogue' })] : [];
  if (space.candidates === 0) return [remark('layout.noCandidate', {}, { path: 'catalogue' })];
  const powerFactor = bestAttainableFactor(space, found.judge);
  if (powerFactor === null) return [remark('search.onlyAvoid', {}, { path: 'catalogue' })];
  const { targetPowerFactor } = study.site;
  return [remark('search.bestAttainable', { powerFactor, targetPowerFactor }, { path: 'catalogue' })];
}

function choiceLines(site: Site, catalogue: SettledCatalogue): Remark[] {
  const lines: Remark[] = [];
  if (site.catalogue?.evenSteps === undefined) {
    lines.push(remark('default.catalogue.evenSteps', {}, { path: 'catalogue.evenSteps' }));
  }
  if (site.catalogue?.mustMeetTarget === undefined) {
    lines.push(remark('default.catalogue.mustMeetTarget', {}, { path: 'catalogue.mustMeetTarget' }));
  }
  if (catalogue.maxTotalKvar === null) {
    lines.push(remark('default.catalogue.maxTotalKvar', {}, { path: 'catalogue.maxTotalKvar' }));
  }
  return lines;
}
