import { shortDevices, shortVerdict } from '../duty/device-row.js';
import { assessBank } from '../plan/assess-bank.js';
import type { Result } from '../plan/result.js';
import type { Site } from '../plan/site.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';
import { type SiteAsMeasured, siteAsMeasured } from './site-as-measured.js';
import { leastStagesOut, type StagesOut } from './stages-out.js';
import { type Ground, groundOf } from './weigh-stages.js';

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
}

/**
 * What to do at once with an installed bank, judged as it measures.
 * @param site validated site with its bank
 * @param record the meter's record
 * @param zone the site's zone over the record
 * @returns the stages to keep out where the bank is over a limit
 * @throws InputProblem where there is no bank, or inputs contradict each other
 * @source method-reevaluation
 */
export function bankTonight(site: Site, record: LoadRecord, zone: ZoneTable): BankTonight {
  const measured = siteAsMeasured(site);
  const { result } = assessBank(measured.site, record, zone);
  const isOver = result.verdict === 'avoid';
  return {
    stages: measuredEntries(measured),
    tonight: isOver ? tonightOf(groundOf(measured.site, record, zone), measured, result) : null,
  };
}

/**
 * What to do at once with the site's own bank, where it stands there and a record says what it meets.
 * @param site validated site
 * @param record the meter's record, null where there is none
 * @param zone the site's zone over the record
 * @returns null for a bank that is not installed, or without a record
 * @throws InputProblem where inputs contradict each other
 * @source method-reevaluation
 */
export function installedTonight(site: Site, record: LoadRecord | null, zone: ZoneTable): BankTonight | null {
  return record === null || site.bank?.installed !== true ? null : bankTonight(site, record, zone);
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
 * @param ground site as it measures, record and study
 * @param measured where its entries come from
 * @param result its result
 * @returns stages to keep out, and until when
 * @source method-reevaluation
 */
export function tonightOf(ground: Ground, { site, ofGroup }: SiteAsMeasured, result: Result): Tonight {
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
