import type { BankInput, StageGroupInput } from '#libs/engine/index.js';

/** Every physical stage of a bank as one entry, groups expanded in order. */
export function stagesOf(bank: BankInput): StageGroupInput[] {
  return bank.stages.flatMap((group) => Array.from({ length: group.count }, () => ({ ...group, count: 1 })));
}

/** Physical stages as groups of equal neighbours. */
export function bankFrom(bank: BankInput, stages: readonly StageGroupInput[]): BankInput {
  const groups: StageGroupInput[] = [];
  for (const stage of stages) {
    const last = groups.at(-1);
    if (last !== undefined && sameStage(last, stage)) groups[groups.length - 1] = { ...last, count: last.count + 1 };
    else groups.push({ ...stage, count: 1 });
  }
  return { ...bank, stages: groups };
}

function sameStage(a: StageGroupInput, b: StageGroupInput): boolean {
  return JSON.stringify({ ...a, count: 1 }) === JSON.stringify({ ...b, count: 1 });
}

/** The same bank with one more stage, like its last. */
export function withStageAdded(bank: BankInput): BankInput {
  const stages = stagesOf(bank);
  return bankFrom(bank, [...stages, stages.at(-1)!]);
}

export function withStageRemoved(bank: BankInput, at: number): BankInput {
  return bankFrom(bank, stagesOf(bank).toSpliced(at, 1));
}

export function withStageMoved(bank: BankInput, from: number, to: number): BankInput {
  const stages = stagesOf(bank);
  const [stage] = stages.splice(from, 1);
  if (stage !== undefined) stages.splice(to, 0, stage);
  return bankFrom(bank, stages);
}

/** Every group at another reactor ratio, and at the voltage its capacitors then need. */
export function withRatio(bank: BankInput, reactorPct: number, ratedV: number): BankInput {
  return { ...bank, stages: bank.stages.map(({ reactorMh: _, ...group }) => ({ ...group, reactorPct, ratedV })) };
}
