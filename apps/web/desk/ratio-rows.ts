import {
  type Bank,
  bankLevels,
  type Duty,
  judge,
  type Outcome,
  overallVerdict,
  type Study,
  summarizeBank,
} from '#libs/engine/index.js';
import type { RatioRow } from './look.js';

/** Ratios in common use [%]. */
const RATIOS_PCT = [0, 5.67, 7, 14];

/**
 * The same nameplates at each common reactor ratio, judged in full.
 * @param study site and record
 * @param outcome the bank as it stands
 */
export function ratioRows(study: Study, { bank, result }: Outcome): RatioRow[] {
  const own = bank.groups[0]?.reactorPct;
  if (own === undefined) return [];
  const isMixed = bank.groups.some(({ reactorPct }) => reactorPct !== own);
  const ratios = isMixed ? RATIOS_PCT : [own, ...RATIOS_PCT.filter((ratio) => ratio !== own)];
  return ratios.map((reactorPct) => {
    const groups = bank.groups.map((group) => ({ ...group, reactorPct }));
    return rowOf(study, { ...bank, groups }, { result, isOwn: !isMixed && reactorPct === own });
  });
}

function rowOf(study: Study, bank: Bank, { result, isOwn }: { result: Outcome['result']; isOwn: boolean }): RatioRow {
  const levels = bankLevels(bank, study.site.nominalV);
  const judgement = judge(study, bank, result.control);
  const summary = summarizeBank(bank, levels, study.site.nominalV);
  const share = (test: (duty: Duty) => boolean) => {
    const ratios = judgement.duties.filter(test).flatMap(({ ratio }) => (ratio === null ? [] : [100 * ratio]));
    return ratios.length === 0 ? null : Math.max(...ratios);
  };
  return {
    reactorPct: bank.groups[0]!.reactorPct,
    ratedV: bank.groups[0]!.ratedV,
    effectiveKvar: summary.effectiveKvar,
    tunedOrderH: summary.stages[0]?.tunedOrderH ?? null,
    parallelOrderH: judgement.network.levels.findLast((level) => level.case === 'nominal')?.parallelOrderH ?? null,
    harmonicVoltagePct: share(({ name }) => name === 'harmonic voltage'),
    capacitorVoltagePct: share(({ name }) => name.startsWith('capacitor voltage')),
    capacitorCurrentPct: share(({ name }) => name === 'capacitor current'),
    verdict: overallVerdict(study, judgement),
    isOwn,
  };
}
