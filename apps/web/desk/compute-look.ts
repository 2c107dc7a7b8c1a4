import {
  assessBank,
  bankLevels,
  basisOf,
  type LoadRecord,
  marginMap,
  type Outcome,
  operate,
  outcomeOf,
  quickJudge,
  type Site,
  type Study,
  settleBank,
  settleControl,
  summarizeBank,
  summarizeOperation,
} from '#libs/engine/index.js';
import type { StudyCache } from './study-cache.js';

/** An outcome with the study it was made on. */
export interface Looked {
  outcome: Outcome;
  study: Study;
}

/**
 * Judges a site's bank as `assess` does; where the site has none yet, what is needed without one.
 * @param cache studies of the record
 * @param site a site as read
 */
export function fullLook(cache: StudyCache, site: Site): Looked {
  const study = cache.of(site);
  if (site.bank !== undefined) return { outcome: assessBank(site, cache.record, cache.zone), study };
  const { bank } = settleBank({ stages: [] }, site.frequencyHz);
  const { control, assumptions } = settleControl(site.control, bank, study.site);
  const outcome = outcomeOf('assess', study, { bank, control, said: { reasons: [], assumptions } });
  return { outcome, study };
}

/**
 * The same without looking for the peaks of |Z|: simulation, flows and limits follow, and network, duties and remarks
 * stay those of the last full look until the hand rests.
 * @param cache studies of the record
 * @param site a site as read
 * @param last the last full outcome
 */
export function quickLook(cache: StudyCache, site: Site, last: Outcome): Looked {
  const study = cache.of(site);
  const { bank } = settleBank(site.bank ?? { stages: [] }, site.frequencyHz);
  const { control } = settleControl(site.control, bank, study.site);
  const levels = bankLevels(bank, study.site.nominalV);
  const operated = operate(study, bank, control);
  const basis = basisOf(study, control);
  const result = {
    ...last.result,
    requirement: study.requirement,
    bank: summarizeBank(bank, levels, study.site.nominalV),
    control,
    operation: summarizeOperation(operated, study.months, study.target, levels),
    verdict: quickJudge(study.model, bank, basis).verdict,
  };
  const record: LoadRecord = cache.record;
  const outcome: Outcome = {
    ...last,
    site: study.site,
    record,
    zone: cache.zone,
    bank,
    result,
    series: {
      beginS: record.beginS,
      busKw: study.load.activeKw,
      busKvar: study.load.reactiveKvar,
      needKvar: study.needKvar,
      connectedKvar: operated.deliveredKvar,
      meterKw: operated.meter.activeKw,
      meterLaggingKvar: operated.meter.laggingKvar,
      meterLeadingKvar: operated.meter.leadingKvar,
    },
    margins: marginMap(study.model, bank, levels, basis),
  };
  return { outcome, study };
}
