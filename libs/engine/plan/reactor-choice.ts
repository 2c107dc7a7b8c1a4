import { PEAK_REACH_H, RIPPLE_FLOOR } from '../duty/judge-bank.js';
import { type FirmVerdict, firmVerdict } from '../duty/quick-judge.js';
import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { bankLevels, type Level } from '../layout/levels.js';
import { effectiveKvar, tunedOrderH } from '../layout/stage.js';
import { type CostBasis, capitalOf } from '../money/capital.js';
import { bankModel } from '../network/flow.js';
import { nearestPeak } from '../network/network-check.js';
import { PeakFinder } from '../network/peaks.js';
import { rippleShare } from '../network/ripple-share.js';
import type { Control } from '../operation/control.js';
import { basisOf, type Judged, overallVerdict } from './judge-basis.js';

/** Reactor ratios that are tried beside the bank's own [%]; common practice, no source. */
export const TRIED_REACTOR_PCT = [0, 5.67, 7, 12.5, 14] as const;

/** A filter stage is tuned to this share of the order it takes up; common practice, no source. */
export const FILTER_SHARE = 0.94;
/** Ratios nearer than this are one [%]. */
const SAME_PCT = 0.01;

/**
 * Why a ratio is or is not the bank's: its own; a limit passed; the ripple signal taken up; a limit or a peak near; what is
 * open whatever the ratio; less kvar from the same stages; or within limits at more kvar, reactor or voltage.
 */
export type TrialReason =
  | 'chosen'
  | 'overLimit'
  | 'ripple'
  | 'nearLimit'
  | 'nearPeak'
  | 'openAnyway'
  | 'givesLess'
  | 'takesMore';

/** The bank's stages built with one reactor ratio. */
export interface ReactorTrial {
  reactorPct: number;
  /** voltage the stages were tried at [V] */
  ratedV: number;
  chosen: boolean;
  /** tuned to take up the greatest order present, not to keep clear of all */
  filter: boolean;
  tunedOrderH: number | null;
  /** X_L/R_L at the fundamental, null without a reactor */
  reactorQuality: number | null;
  /** all stages at nominal voltage [kvar] */
  effectiveKvar: number;
  /** rms current of the stage nearest its limit, and its share of the limit */
  stageA: number | null;
  stageRatio: number | null;
  /** least and greatest parallel order over levels above 0, nominal */
  lowestPeakH: number | null;
  highestPeakH: number | null;
  verdict: Verdict;
  worstDuty: string | null;
  worstRatio: number | null;
  /** least share of a ripple-control signal that is left with the bank in, or null where there is none */
  rippleShare: number | null;
  /** what such a bank costs new; null without prices, or where none of them is for such a reactor */
  capital: number | null;
  why: TrialReason;
  /** peak and order present that come too near, where that is why */
  nearPeakH: number | null;
  nearOrderH: number | null;
}

/** One bank to be tried, before it is judged. */
interface Tried {
  bank: Bank;
  reactorPct: number;
  ratedV: number;
  chosen: boolean;
  filter: boolean;
}

/**
 * The bank's stages tried plain, with the customary reactor ratios and as a filter of the greatest order present, each at
 * the least listed voltage that carries the fundamental: which would be within limits, and why the others are not.
 * @param study site and record
 * @param bank the bank
 * @param control settings
 * @param ratedV voltages to choose from, ascending [V]
 * @returns one row a ratio, ascending; the bank's own marked
 * @source method-network
 */
export function reactorTrials(study: Judged, bank: Bank, control: Control, ratedV: readonly number[]): ReactorTrial[] {
  const own = new Set(bank.groups.map(({ reactorPct }) => reactorPct));
  if (own.size !== 1) return [];
  const ownPct = [...own][0]!;
  const filterPct = filterReactorPct(study);
  const isFilter = (pct: number): boolean => filterPct !== null && Math.abs(pct - filterPct) < SAME_PCT;
  const ratios = [...new Set([...TRIED_REACTOR_PCT, ownPct])];
  if (filterPct !== null && !ratios.some(isFilter)) ratios.push(filterPct);
  const ownKvar = totalKvar(study, bank);
  return ratios
    .sort((a, b) => a - b)
    .map((reactorPct) => {
      const chosen = reactorPct === ownPct;
      const voltage = chosen ? bank.groups[0]!.ratedV : voltageFor(study, reactorPct, ratedV);
      const groups = bank.groups.map((group) => ({ ...group, reactorPct, ratedV: voltage }));
      const tried = { bank: chosen ? bank : { ...bank, groups }, reactorPct, ratedV: voltage };
      return trial(study, { ...tried, chosen, filter: isFilter(reactorPct) }, control, ownKvar);
    });
}

/**
 * The same rows with what each bank costs new. A reactor's price is that of its exact ratio, so a row whose ratio the book
 * does not name has no capital, rather than one without its reactors.
 * @param trials rows
 * @param bank the bank they were tried on
 * @param cost what it is paid from, null without prices
 * @returns the rows
 * @source method-money
 */
export function pricedTrials(trials: readonly ReactorTrial[], bank: Bank, cost: CostBasis | null): ReactorTrial[] {
  return trials.map((row) => {
    const { reactorPct } = row;
    const isNamed = reactorPct === 0 || cost?.prices.reactors?.some((entry) => entry.reactorPct === reactorPct);
    if (cost === null || isNamed !== true) return row;
    const groups = bank.groups.map((group) => ({ ...group, reactorPct }));
    return { ...row, capital: capitalOf({ ...bank, groups }, cost).total };
  });
}

/**
 * The ratio of a filter stage: tuned a little below the order of the greatest current, where a wandering of the mains or a
 * capacitor that ages moves it away from the order, not onto it.
 * @param study site and network
 * @returns p [%], null where no load injects an order that a reactor can be tuned below
 * @source method-network
 */
export function filterReactorPct({ model: { excitation } }: Judged): number | null {
  const { ordersH, injectedA } = excitation;
  const at = injectedA.reduce((most, a, i) => (a > (injectedA[most] ?? 0) ? i : most), -1);
  const tunedH = at < 0 ? 0 : FILTER_SHARE * ordersH[at]!;
  return tunedH < 2 ? null : 100 / tunedH ** 2;
}

/**
 * Rated voltage of capacitors behind a reactor: the fundamental alone with a twentieth to spare, as the layout has it.
 * @param study site and network
 * @param reactorPct p [%]
 * @param ratedV voltages to choose from, ascending [V]
 * @returns the least listed voltage that will do, else the voltage needed [V]
 * @source method-layout
 */
export function voltageFor(study: Judged, reactorPct: number, ratedV: readonly number[]): number {
  const { nominalV, highestV } = study.site;
  const rise = 1 / (1 - (1.1 * 1.03 * reactorPct) / 100);
  const needV = Math.max((nominalV * rise) / 0.95, (highestV * rise) / 1.1 / 0.95);
  return ratedV.find((v) => v >= needV) ?? needV;
}

function totalKvar(study: Judged, bank: Bank): number {
  return bank.groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, study.site.nominalV), 0);
}

function trial(study: Judged, { bank, ...head }: Tried, control: Control, ownKvar: number): ReactorTrial {
  const basis = basisOf(study, control);
  const found = firmVerdict(study.model, bank, basis);
  const finder = new PeakFinder(study.model, bank);
  const nominal = study.model.corners.corners[0]!;
  const levels = bankLevels(bank, study.site.nominalV);
  const peaks = levels.slice(1).flatMap(({ vectors }) => finder.greatest(vectors[0]!, nominal)?.orderH ?? []);
  const { rippleHz } = study.site.supply;
  const ripple = rippleHz === null ? null : rippleShare(study.model, bank, levels, rippleHz / study.site.frequencyHz);
  const share = ripple?.share ?? null;
  const current = found.duties
    .filter(({ name }) => name === 'capacitor current')
    .reduce<FirmVerdict['worst']>((most, duty) => ((duty.ratio ?? 0) > (most?.ratio ?? 0) ? duty : most), null);
  const verdict = overallVerdict(study, found);
  const kvar = totalKvar(study, bank);
  const givesLess = kvar < ownKvar * (1 - 1e-9);
  return {
    ...head,
    tunedOrderH: tunedOrderH(head.reactorPct),
    reactorQuality: head.reactorPct === 0 ? null : bank.groups[0]!.reactorQuality,
    effectiveKvar: kvar,
    stageA: current?.value ?? null,
    stageRatio: current?.ratio ?? null,
    lowestPeakH: peaks.length === 0 ? null : Math.min(...peaks),
    highestPeakH: peaks.length === 0 ? null : Math.max(...peaks),
    verdict,
    worstDuty: found.worst?.name ?? null,
    worstRatio: found.worst?.ratio ?? null,
    rippleShare: share,
    capital: null,
    ...reasonOf(study, { bank, levels, chosen: head.chosen, found, verdict, share, givesLess }),
  };
}

function reasonOf(
  study: Judged,
  tried: {
    bank: Bank;
    levels: Level[];
    chosen: boolean;
    found: FirmVerdict;
    verdict: Verdict;
    share: number | null;
    givesLess: boolean;
  },
): Pick<ReactorTrial, 'why' | 'nearPeakH' | 'nearOrderH'> {
  const { bank, levels, chosen, found, verdict, share, givesLess } = tried;
  const because = (why: TrialReason) => ({ why, nearPeakH: null, nearOrderH: null });
  if (chosen) return because('chosen');
  if (verdict === 'clear') return because(givesLess ? 'givesLess' : 'takesMore');
  if (verdict === 'avoid') return because('overLimit');
  if (share !== null && share < RIPPLE_FLOOR) return because('ripple');
  if (found.duties.some((duty) => duty.verdict === 'watch')) return because('nearLimit');
  const finder = new PeakFinder(study.model, bank, PEAK_REACH_H);
  const peak = nearestPeak(study.model, bankModel(study.model, bank, levels), finder, PEAK_REACH_H);
  if (peak === null) return because('openAnyway');
  return { why: 'nearPeak', nearPeakH: peak.peakOrderH, nearOrderH: peak.presentOrderH };
}
