import { agedGroup, lastFactors, stageHistories } from '../duty/stage-history.js';
import type { BankInput, StageGroup, StageGroupInput } from '../layout/bank.js';
import { deltaCapacitanceUf } from '../layout/stage.js';
import { settleBank } from '../plan/settle-bank.js';
import type { Site } from '../plan/site.js';
import { InputProblem } from '../problem.js';

/** A site whose bank is as it measures. */
export interface SiteAsMeasured {
  site: Site & { bank: BankInput };
  /** entry of the given `bank.stages` each entry comes from */
  ofGroup: number[];
  /** number of the stage within that entry, from 1; null for the rest that was not measured */
  ofStage: (number | null)[];
  /** capacitance left, as a share of the nameplate's */
  factor: number[];
}

/**
 * The site with every measured stage an entry of its own, at the capacitance last found: kvar and reactor ratio go with
 * it. The rest stays at the nameplate.
 * @param site validated site with a `bank`
 * @returns the site, and where its entries come from
 * @throws InputProblem where there is no bank, or a measurement can't be
 * @source method-ageing
 */
export function siteAsMeasured(site: Site): SiteAsMeasured {
  const given = bankOf(site);
  const { bank } = settleBank(given, site.frequencyHz);
  const basis = { nominalV: site.bus.nominalV, frequencyHz: site.frequencyHz, asOf: site.asOf ?? null };
  const histories = stageHistories(given, bank, basis);
  const entries = given.stages.flatMap((stage, g) => {
    const factors = [...lastFactors(histories, g)];
    const measured = factors.map(([number, factor]) => ({
      stage: measuredEntry(stage, agedGroup(bank.groups[g]!, factor), site.frequencyHz),
      ofGroup: g,
      ofStage: number,
      factor,
    }));
    const rest = stage.count - factors.length;
    const unmeasured = { stage: { ...plate(stage), count: rest }, ofGroup: g, ofStage: null, factor: 1 };
    return rest === 0 ? measured : [unmeasured, ...measured];
  });
  return {
    site: { ...site, bank: { ...given, stages: entries.map(({ stage }) => stage) } },
    ofGroup: entries.map(({ ofGroup }) => ofGroup),
    ofStage: entries.map(({ ofStage }) => ofStage),
    factor: entries.map(({ factor }) => factor),
  };
}

/**
 * The site with its bank by the nameplate, entries as they are given.
 * @param site validated site with a `bank`
 * @returns the same as `siteAsMeasured` gives where nothing was measured
 * @throws InputProblem where there is no bank
 */
export function siteAsRated(site: Site): SiteAsMeasured {
  const bank = bankOf(site);
  const { stages } = bank;
  return {
    site: { ...site, bank: { ...bank, stages: stages.map(plate) } },
    ofGroup: stages.map((_, g) => g),
    ofStage: stages.map(() => null),
    factor: stages.map(() => 1),
  };
}

function bankOf({ bank }: Site): BankInput {
  if (bank !== undefined) return bank;
  throw new InputProblem([{ code: 'missing', path: 'bank', expected: 'the bank that stands there', found: 'nothing' }]);
}

function plate(stage: StageGroupInput): StageGroupInput {
  const { measurements: _, commissioned: __, ...rest } = stage;
  return rest;
}

// What it measures is what it has: the end of life of an installed one is not counted on top.
function measuredEntry(stage: StageGroupInput, group: StageGroup, frequencyHz: number): StageGroupInput {
  const { reactorMh: _, capacitanceUf: __, ...rest } = plate(stage);
  return {
    ...rest,
    count: 1,
    ratedKvar: group.ratedKvar,
    reactorPct: group.reactorPct,
    measuredUf: deltaCapacitanceUf(group, frequencyHz),
  };
}
