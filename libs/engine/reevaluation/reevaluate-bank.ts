import type { Verdict } from '../duty/rules.js';
import { assessBank } from '../plan/assess-bank.js';
import type { Outcome } from '../plan/outcome.js';
import type { Site } from '../plan/site.js';
import { Stopped, type Watch } from '../problem.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';
import { type InputChange, inputChanges } from './input-changes.js';
import { type LikeTerms, likeTerms } from './like-terms.js';
import { type Remedy, remedies } from './remedies.js';
import { type ResultChange, resultChanges } from './result-changes.js';
import { type SinceWhen, sinceWhen } from './since-when.js';
import { type SiteAsMeasured, siteAsMeasured } from './site-as-measured.js';
import { type MeasuredEntry, measuredEntries, type Tonight, tonightOf } from './tonight.js';
import { type Ground, groundOf, networkVerdict } from './weigh-stages.js';

/** A site, its record and its clock at one time. */
export interface SiteThen {
  site: Site;
  record: LoadRecord;
  zone: ZoneTable;
}

/** A bank judged again. */
export interface Reevaluation {
  verdict: { before: Verdict; after: Verdict };
  /** fields of the site that changed */
  inputs: InputChange[];
  /** the record is another one */
  newRecord: boolean;
  /** figures that changed */
  changes: ResultChange[];
  /** entries of the bank as it measures, as `out` of the stages out and of remedies counts them */
  stages: MeasuredEntry[];
  /** null unless the bank is over a limit */
  tonight: Tonight | null;
  /** none where the bank is within limits and meets its target */
  remedies: Remedy[];
  /** null where nothing changed */
  since: SinceWhen | null;
  /** both records on like terms; null where the record is the same */
  records: LikeTerms | null;
}

/** A re-evaluation with the two outcomes it rests on. */
export interface Reevaluated {
  reevaluation: Reevaluation;
  before: Outcome;
  after: Outcome;
}

/**
 * Judges an installed bank again after its load, supply or stages changed: both times by the same engine, with the bank
 * as it measures.
 * @param before site and record then, with its bank
 * @param after site and record now, with its bank
 * @param watch progress and stopping
 * @returns what changed, what to do at once, what would mend it, and since when
 * @throws InputProblem where either has no bank or its inputs contradict each other
 * @throws Stopped where the watch says so
 * @source method-reevaluation
 */
export function reevaluateBank(before: SiteThen, after: SiteThen, watch?: Watch): Reevaluated {
  const step = (fraction: number): void => {
    if (watch?.stopped()) throw new Stopped('stopped while judging again');
    watch?.report(fraction);
  };
  const [then, now] = [siteAsMeasured(before.site), siteAsMeasured(after.site)];
  const old = assessBank(then.site, before.record, before.zone);
  step(0.2);
  const outcome = assessBank(now.site, after.record, after.zone);
  step(0.4);
  const inputs = inputChanges(before.site, after.site);
  const newRecord = !sameRecord(before.record, after.record);
  const ground = groundOf(now.site, after.record, after.zone);
  const tonight = outcome.result.verdict === 'avoid' ? tonightOf(ground, now, outcome.result) : null;
  step(0.6);
  const changed = inputs.length > 0 || newRecord;
  return {
    reevaluation: {
      verdict: { before: old.result.verdict, after: outcome.result.verdict },
      inputs,
      newRecord,
      changes: resultChanges(
        { result: old.result, ofGroup: then.ofGroup },
        { result: outcome.result, ofGroup: now.ofGroup },
      ),
      stages: measuredEntries(now),
      tonight,
      remedies: remediesOf({ ground, now, outcome, tonight }, after.site, before.site),
      since: changed ? sinceWhen(groundOf(then.site, before.record, before.zone), ground) : null,
      records: newRecord ? likeTerms([before, after]) : null,
    },
    before: old,
    after: outcome,
  };
}

function remediesOf(
  { ground, now, outcome, tonight }: { ground: Ground; now: SiteAsMeasured; outcome: Outcome; tonight: Tonight | null },
  site: Site,
  earlier: Site,
): Remedy[] {
  const { verdict, operation, requirement } = outcome.result;
  const missed = operation.months.some(
    ({ powerFactorLagging: factor }) => factor !== null && factor < requirement.targetPowerFactor * (1 - 1e-12),
  );
  if (verdict === 'clear' && !missed) return [];
  const nameplate = site.bank!;
  const basis = { ground, measured: now, nameplate, earlier: earlier.bank ?? null, out: tonight?.within ?? null };
  return remedies({ ...basis, standing: networkVerdict(ground, now.site.bank) });
}

function sameRecord(a: LoadRecord, b: LoadRecord): boolean {
  const columns = ['beginS', 'activeKw', 'laggingKvar', 'leadingKvar', 'voltageV', 'connectedKvar', 'standby'] as const;
  return (
    a.intervalS === b.intervalS &&
    columns.every((name) => {
      const [one, other] = [a[name], b[name]];
      if (one === null || other === null) return one === other;
      return one.length === other.length && one.every((value, i) => value === other[i]);
    })
  );
}
