import type { Bank } from '../layout/bank.js';
import { settleCatalogue } from '../layout/candidates.js';
import { meetsTarget, operationMonths } from '../operation/operation.js';
import { type Remark, remark, type Watch } from '../problem.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';
import { unusedPapers } from './assess-bank.js';
import { type Chosen, chooseBank } from './choose-bank.js';
import type { Outcome } from './outcome.js';
import { outcomeOf } from './outcome-of.js';
import { settleBank, settleControl } from './settle-bank.js';
import type { Site } from './site.js';
import { meterWithConstant, type Study, studySite } from './study.js';

/**
 * Designs the smallest bank that meets the target in every billing month without over-correcting and is clear, and
 * judges it; where none does, the nearest, with the reason.
 * @param site validated site; its own `bank` lends nothing
 * @param record the meter's record
 * @param zone the site's zone over the record
 * @param watch progress and stopping
 * @returns the outcome
 * @throws InputProblem where the inputs contradict each other, Stopped where the watch says so
 * @source method-layout
 */
export function planBank(site: Site, record: LoadRecord, zone: ZoneTable, watch?: Watch): Outcome {
  const study = studySite(site, record, zone);
  watch?.report(0.05);
  const without = operationMonths(meterWithConstant(study, 0), study.months, record.intervalS / 3600);
  const { bank: nothing } = settleBank({ stages: [] }, site.frequencyHz);
  if (meetsTarget(without, study.site.targetPowerFactor)) {
    const { control, assumptions } = settleControl(site.control, nothing, study.site);
    const said = { reasons: metAlready(study), assumptions: [...assumptions, ...inputLines(site, [])] };
    const outcome = outcomeOf('plan', study, { bank: nothing, control, said });
    watch?.report(1);
    return outcome;
  }
  const { catalogue, absent } = settleCatalogue(site.catalogue, 2);
  const chosen = chooseBank(study, site, catalogue, watch);
  const bank = chosen?.bank ?? nothing;
  const outcome = outcomeOf('plan', study, {
    bank,
    control: chosen?.control ?? settleControl(site.control, bank, study.site).control,
    said: {
      reasons: chosen === null ? [remark('layout.noCandidate', {}, { path: 'catalogue' })] : nearestReasons(chosen),
      assumptions: [
        ...(chosen === null ? [] : bankLines(bank)),
        ...(chosen?.assumptions ?? []),
        ...inputLines(site, absent),
      ],
      // A bank that falls short of the target is no clear answer, however well it stays within its limits.
      atBest: chosen === null || chosen.shortOf !== null ? 'watch' : 'clear',
    },
  });
  watch?.report(1);
  return outcome;
}

// Needed in single intervals, and yet every billing month holds the target already.
function metAlready(study: Study): Remark[] {
  const { maxKvar } = study.requirement;
  const { targetPowerFactor } = study.site;
  if (maxKvar <= 1e-9) return [];
  return [remark('need.metEveryMonth', { targetPowerFactor, maxKvar }, { unit: 'kvar' })];
}

function nearestReasons(chosen: Chosen): Remark[] {
  return chosen.shortOf === null ? [] : [remark(`layout.${chosen.shortOf}`, {}, { path: 'catalogue' })];
}

function bankLines(bank: Bank): Remark[] {
  const lines = [];
  if (bank.groups.some((group) => group.reactorPct > 0)) {
    const quality = bank.groups[0]!.reactorQuality;
    lines.push(remark('default.bank.stages.reactorQuality', { value: quality }, { path: 'catalogue' }));
  }
  if (!bank.interStageGiven) {
    const place = { path: 'catalogue.interStageUh', unit: 'µH' };
    lines.push(remark('default.bank.interStageUh', { value: bank.interStageUh }, place));
  }
  return lines;
}

function inputLines(site: Site, absent: readonly string[]): Remark[] {
  return [
    ...absent.map((key) => remark(`default.catalogue.${key}`, {}, { path: `catalogue.${key}` })),
    ...(site.bank === undefined ? [] : [remark('bank.ignored', {}, { path: 'bank' })]),
    ...unusedPapers(site).map((name) => remark('money.unused', { name }, { path: name })),
    ...(site.catalogue?.switches === undefined && site.catalogue?.cabinets === undefined
      ? []
      : [remark('money.unused', { name: 'catalogue.switches, catalogue.cabinets' }, { path: 'catalogue' })]),
  ];
}
