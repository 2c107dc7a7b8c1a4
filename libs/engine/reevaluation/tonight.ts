import { shortDevices, shortVerdict } from '../duty/device-row.js';
import { assessBank } from '../plan/assess-bank.js';
import { type EstimateOutcome, isEstimate } from '../plan/estimate-result.js';
import { studyEstimate } from '../plan/estimate-study.js';
import type { Outcome } from '../plan/outcome.js';
import { assessEstimate } from '../plan/plan-estimate.js';
import type { BankResult } from '../plan/result.js';
import type { Site } from '../plan/site.js';
import { type SiteAsMeasured, siteAsMeasured, siteAsRated } from './site-as-measured.js';
import { leastStagesOut, type StagesOut } from './stages-out.js';
import { groundOf, type NetworkGround } from './weigh-stages.js';

/** A finding that has to be mended before stages go in again. */
export interface ToMend {
  /** a duty or a device */
  kind: 'duty' | 'device';
  name: string;
  /** entry of the site's own `bank.stages`, null for the bank as a whole */
  group: number | null;
}

/** One entry of the bank as it measures. */
export interface MeasuredEntry {
  /** entry of the site's own `bank.stages` */
  group: number;
  /** number of a measured stage within it, null for the rest */
  stage: number | null;
  count: number;
  /** as it measures [kvar] */
  ratedKvar: number;
}

/** What to do at once with a bank that is over a limit. */
export interface Tonight {
  /** least stages out that leave every level within limits */
  within: StagesOut;
  /** least stages out that leave nothing over a limit, where that keeps more in */
  nearLimits: StagesOut | null;
  /** until these are mended */
  until: ToMend[];
}

/** What to do at once with an installed bank, and the stages it is told by. */
export interface BankTonight {
  /** entries of the bank as it measures */
  stages: MeasuredEntry[];
  /** null unless the bank is over a limit */
  tonight: Tonight | null;
  /** where the load is an estimate: the stages out are those of its severe ends */
  byEstimate?: true;
}

/**
 * What to do at once with an installed bank, judged as it measures, and by its nameplate where that alone is over a limit.
 * A bank of which nothing was measured is judged already.
 * @param outcome the same bank on the same record, judged by its nameplate
 * @param site validated site with its bank
 * @returns the stages to keep out where the bank is over a limit
 * @throws InputProblem where there is no bank, or inputs contradict each other
 * @source method-reevaluation
 */
export function bankTonight({ result, record, zone }: Outcome, site: Site): BankTonight {
  return tonightBy(result, site, {
    judge: (measured) => assessBank(measured, record, zone).result,
    ground: (judged) => groundOf(judged, record, zone),
  });
}

/**
 * The same without a record: what the network rules out at the severe ends of the estimate, no load that damps but what is
 * stated and the load current of the distorting loads alone. It asks nothing of the need, which is what an estimate leaves open.
 * @param outcome the same bank, judged by its nameplate on the estimate
 * @param site validated site with its bank and an estimate
 * @returns the stages to keep out where the bank is over a limit
 * @throws InputProblem where there is no bank, or inputs contradict each other
 * @source method-reevaluation, method-estimate
 */
export function estimateTonight({ result, zone }: EstimateOutcome, site: Site): BankTonight {
  const told = tonightBy(result, site, {
    judge: (measured) => assessEstimate(measured, zone).result,
    ground: (judged) => ({ site: judged, study: studyEstimate(judged, zone) }),
  });
  return { ...told, byEstimate: true };
}

/** How a bank is judged, and what it is judged on. */
interface TonightGround {
  judge: (site: Site) => BankResult;
  ground: (site: Site) => NetworkGround;
}

function tonightBy(result: BankResult, site: Site, { judge, ground }: TonightGround): BankTonight {
  const measured = siteAsMeasured(site);
  const wasMeasured = measured.ofStage.some((stage) => stage !== null);
  const now = wasMeasured ? judge(measured.site) : result;
  if (now.verdict !== 'avoid' && result.verdict !== 'avoid')
    return { stages: measuredEntries(measured), tonight: null };
  const [judged, over] = now.verdict === 'avoid' ? [measured, now] : [siteAsRated(site), result];
  return { stages: measuredEntries(judged), tonight: tonightOf(ground(judged.site), judged, over) };
}

/**
 * What to do at once with the site's own bank, where it stands there; by the estimate where there is no record.
 * @param outcome the site's own bank as it was judged, or its estimate
 * @param site validated site
 * @returns null for a bank that is planned or not installed
 * @throws InputProblem where inputs contradict each other
 * @source method-reevaluation
 */
export function installedTonight(outcome: Outcome | EstimateOutcome, site: Site): BankTonight | null {
  if (outcome.kind === 'plan' || site.bank?.installed !== true) return null;
  return isEstimate(outcome) ? estimateTonight(outcome, site) : bankTonight(outcome, site);
}

/**
 * Entries of a bank as it measures, by the groups and stages of the site's own.
 * @param measured the site as it measures
 * @returns one a group of the bank as it is judged
 */
export function measuredEntries({ site, ofGroup, ofStage }: SiteAsMeasured): MeasuredEntry[] {
  return site.bank.stages.map(({ count, ratedKvar }, k) => ({
    group: ofGroup[k]!,
    stage: ofStage[k]!,
    count,
    ratedKvar,
  }));
}

/**
 * The least stages to keep out of a bank that is over a limit, and what has to be mended before they go in again.
 * @param ground site as it measures and its network
 * @param measured where its entries come from
 * @param result its result
 * @returns stages to keep out, and until when
 * @source method-reevaluation
 */
export function tonightOf(
  ground: NetworkGround,
  { site, ofGroup }: SiteAsMeasured,
  result: Pick<BankResult, 'duties' | 'devices'>,
): Tonight {
  const near = leastStagesOut(ground, site.bank, 'watch');
  const within = near.verdict === 'clear' ? near : leastStagesOut(ground, site.bank, 'clear');
  const groupOf = (group: number | null): number | null => (group === null ? null : ofGroup[group]!);
  const found: ToMend[] = [
    ...result.duties
      .filter(({ verdict }) => verdict === 'avoid')
      .map(({ name, group }) => ({ kind: 'duty' as const, name, group: groupOf(group) })),
    ...shortDevices(result.devices)
      .filter((row) => shortVerdict(row) === 'avoid')
      .map(({ device, group }) => ({ kind: 'device' as const, name: device, group: groupOf(group) })),
  ];
  const key = ({ kind, name, group }: ToMend): string => `${kind} ${name} ${group}`;
  const until = found.filter((one, k) => found.findIndex((other) => key(other) === key(one)) === k);
  return { within, nearLimits: near.stagesOut < within.stagesOut ? near : null, until };
}
