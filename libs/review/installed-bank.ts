import type { CommissioningRecord } from '#libs/contract/review-schema.js';
import type { BankStage, StageGroupInput, StageMeasurementInput } from '#libs/engine/index.js';

/** The bank of a site file, as it was put into service. */
export interface InstalledBank {
  installed: true;
  stages: StageGroupInput[];
}

/** Longest name of an instrument a measurement of the site file takes. */
const LONGEST_INSTRUMENT = 120;

/**
 * Turns a record "as installed" into the bank of the site file, so that the bank can be judged again by what was found:
 * nameplates of the approved plan, the day it was put into service, and each stage as it was measured.
 * @param stages of the approved plan, groups expanded in order
 * @param record of its commissioning
 * @returns the site file's `bank`: equal stages next to each other are one group
 */
export function installedBank(stages: readonly BankStage[], record: CommissioningRecord): InstalledBank {
  const groups: StageGroupInput[] = [];
  stages.forEach(({ ratedKvar, ratedV, reactorPct }, at) => {
    const last = groups.at(-1);
    const isSame = last?.ratedKvar === ratedKvar && last.ratedV === ratedV && (last.reactorPct ?? 0) === reactorPct;
    const group = isSame ? last : { ...{ count: 0, ratedKvar, ratedV, reactorPct }, commissioned: record.doneOn };
    if (!isSame) groups.push(group);
    group.count++;
    const measured = measurementOf(record, { stage: at + 1, within: group.count });
    if (measured !== null) group.measurements = [...(group.measurements ?? []), measured];
  });
  return { installed: true, stages: groups };
}

function measurementOf(
  { stages, doneOn, instrument }: CommissioningRecord,
  { stage, within }: { stage: number; within: number },
): StageMeasurementInput | null {
  const found = stages.find((one) => one.stage === stage);
  if (found === undefined) return null;
  const { lineV, currentsA } = found;
  const named = instrument.slice(0, LONGEST_INSTRUMENT);
  return { stage: within, date: doneOn, busV: lineV, lineA: currentsA, instrument: named };
}
