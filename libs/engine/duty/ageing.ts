import type { Bank, BankInput, StageGroupInput } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import { deltaCapacitanceUf, tunedOrderH } from '../layout/stage.js';
import type { NetworkModel } from '../network/network-model.js';
import { InputProblem } from '../problem.js';
import type { Duty } from './duty-row.js';
import { type JudgeBasis, judgeBank } from './judge-bank.js';
import { firmVerdict, quickJudge } from './quick-judge.js';
import { graver, type Verdict } from './rules.js';
import { agedGroup, lastFactors, type StageHistory, stageHistories } from './stage-history.js';

/** A bank with capacitors that have lost some of their capacitance, judged beside the corners. */
export interface AgedCase {
  /** entry of `bank.stages` of which one stage has aged; null where all stages have alike */
  group: number | null;
  /** capacitance left, as a share of the nameplate's */
  capacitanceFactor: number;
  /** how the share was come by: end of life of a new or an installed capacitor, or as measured */
  from: 'new' | 'installed' | 'measured';
  capacitanceUf: number | null;
  /** ratio and tuned order with what is left; null where groups differ */
  reactorPct: number | null;
  tunedOrderH: number | null;
  /** null where there are too many combinations to judge */
  verdict: Verdict | null;
  /** duties over a limit, by the bank's own groups */
  exceeded: { name: string; group: number | null }[];
}

/** The capacitance at which a stage must come out. */
export interface StageEnd {
  group: number;
  /** one delta phase [µF]; null where the verdict stands down to half of the nameplate's, or is the gravest already */
  comesOutUf: number | null;
  comesOutPct: number | null;
}

/** Ageing of a bank. */
export interface Ageing {
  cases: AgedCase[];
  stages: StageEnd[];
  /** what was measured, stage by stage; empty for a new bank */
  measured: StageHistory[];
}

/** End of life as a share of the nameplate's capacitance; common practice. */
const END_OF_LIFE = { new: 0.9, installed: 0.8 } as const;
/** No capacitor is left in to lose more than this. */
const LEAST_FACTOR = 0.5;
/** The verdict is looked at in steps of this before the first change of it is narrowed down. */
const FACTOR_STEP = 0.02;
/** Width at which the search ends [share]. */
const FACTOR_WIDTH = 1e-4;

/**
 * Ageing judged beside the corners: all stages and one stage of each group with the capacitance of the end of life (or as
 * measured), p and tuned order falling with it, and the capacitance at which a stage must come out: where the verdict
 * first turns graver as one stage's capacitance falls.
 * @param model the network without the bank
 * @param bank the bank
 * @param basis what it is judged by
 * @param given the bank of the site file, which says whether it is installed and what was measured, and the day of the
 *   judgement; null for a new one
 * @returns cases, the end of each group's stages, and what was measured; none for an empty bank
 * @throws InputProblem naming every measurement that can't be
 * @source method-ageing
 */
export function ageing(
  model: NetworkModel,
  bank: Bank,
  basis: JudgeBasis,
  given: { bank: BankInput; asOf: string | null } | null,
): Ageing {
  if (bank.groups.length === 0) return { cases: [], stages: [], measured: [] };
  const { frequencyHz, voltages } = basis;
  const place = { nominalV: voltages.nominalV, frequencyHz, asOf: given?.asOf ?? null };
  const measured = given === null ? [] : stageHistories(given.bank, bank, place);
  const from = given?.bank.installed === true ? 'installed' : 'new';
  const left = bank.groups.map((group, g) => {
    const nameplateUf = deltaCapacitanceUf(group, frequencyHz);
    return leastLeft({ stage: given?.bank.stages[g] ?? null, factors: lastFactors(measured, g) }, from, nameplateUf);
  });
  const all = allAged(bank, left, from);
  const levels = bankLevels(all.bank, voltages.nominalV);
  const cases: AgedCase[] = [
    {
      ...described(all.bank, null, { frequencyHz, factor: all.factor, from: all.from }),
      ...judgedAged(judgeBank(model, all.bank, levels, basis), bank, null),
    },
  ];
  for (const [g, { factor, from: how }] of left.entries()) {
    const alone = aged(bank, g, factor);
    const judgement = ofStages(() => firmVerdict(model, alone, basis));
    cases.push({ ...described(alone, g, { frequencyHz, factor, from: how }), ...judgedAged(judgement, bank, g) });
  }
  // The search for a stage's end asks too often to look for peaks of |Z| as well.
  const verdictOf = (one: Bank): Verdict | null => ofStages(() => quickJudge(model, one, basis).verdict);
  return { cases, stages: bank.groups.map((_, g) => stageEnd(bank, g, { frequencyHz, verdictOf })), measured };
}

/** Capacitance left, and how it was come by. */
interface Left {
  factor: number;
  from: AgedCase['from'];
}

// The least of a group: what was measured, and the end of life for stages of an installed bank that were not.
function leastLeft(
  { stage, factors }: { stage: StageGroupInput | null; factors: ReadonlyMap<number, number> },
  from: 'new' | 'installed',
  nameplateUf: number,
): Left {
  const measured = [...factors.values()];
  if (stage?.measuredUf !== undefined) measured.push(stage.measuredUf / nameplateUf);
  const whole = stage?.measuredUf !== undefined || (stage !== null && factors.size >= stage.count);
  const least = Math.min(...measured);
  const unmeasured = END_OF_LIFE[from];
  if (measured.length > 0 && (whole || least < unmeasured)) return { factor: least, from: 'measured' };
  return { factor: unmeasured, from };
}

// With every group measured all stages are taken as they measure; else at the end of life.
function allAged(bank: Bank, left: readonly Left[], from: 'new' | 'installed'): Left & { bank: Bank } {
  if (left.some((one) => one.from !== 'measured')) {
    const factor = END_OF_LIFE[from];
    return { bank: aged(bank, null, factor), factor, from };
  }
  const groups = bank.groups.map((group, g) => agedGroup(group, left[g]!.factor));
  const kvar = (of: Bank['groups']): number => of.reduce((sum, group) => sum + group.count * group.ratedKvar, 0);
  return { bank: { ...bank, groups }, factor: kvar(groups) / kvar(bank.groups), from: 'measured' };
}

function described(
  bank: Bank,
  group: number | null,
  { frequencyHz, factor, from }: { frequencyHz: number; factor: number; from: AgedCase['from'] },
): Omit<AgedCase, 'verdict' | 'exceeded'> {
  const stages = group === null ? bank.groups : [bank.groups[bank.groups.length - 1]!];
  const ratios = new Set(stages.map(({ reactorPct }) => reactorPct));
  const reactorPct = ratios.size === 1 ? stages[0]!.reactorPct : null;
  return {
    group,
    capacitanceFactor: factor,
    from,
    capacitanceUf: group === null ? null : deltaCapacitanceUf(stages[0]!, frequencyHz),
    reactorPct,
    tunedOrderH: reactorPct === null ? null : tunedOrderH(reactorPct),
  };
}

/**
 * A bank with less capacitance: Q and p fall in proportion, the reactor stays as it is.
 * @param bank the bank
 * @param group group of which one stage has aged, moved to the end of the list; null for all stages
 * @param factor share of the nameplate's capacitance
 * @returns the bank as it has become
 * @source derived: X_C = 1/(ωC), p = X_L/X_C
 */
export function aged(bank: Bank, group: number | null, factor: number): Bank {
  if (group === null) return { ...bank, groups: bank.groups.map((of) => agedGroup(of, factor)) };
  const rest = bank.groups.flatMap((of, g) =>
    g !== group ? [of] : of.count > 1 ? [{ ...of, count: of.count - 1 }] : [],
  );
  return { ...bank, groups: [...rest, { ...agedGroup(bank.groups[group]!, factor), count: 1 }] };
}

/** What a judgement of an aged bank says, its groups those of the bank as it was. */
function judgedAged(
  judgement: { verdict: Verdict; duties: Duty[] } | null,
  bank: Bank,
  group: number | null,
): Pick<AgedCase, 'verdict' | 'exceeded'> {
  if (judgement === null) return { verdict: null, exceeded: [] };
  const entries = bank.groups.flatMap(({ count }, g) => (g === group && count === 1 ? [] : [g]));
  const ofGroup = group === null ? entries : [...entries, group];
  const over = judgement.duties.filter(({ verdict }) => verdict === 'avoid');
  const named = over.map(({ name, group: g }) => ({ name, group: g === null ? null : ofGroup[g]! }));
  const isFirst = (one: AgedCase['exceeded'][0], k: number): boolean =>
    named.findIndex(({ name, group: g }) => name === one.name && g === one.group) === k;
  return { verdict: judgement.verdict, exceeded: named.filter(isFirst) };
}

// An aged stage is a group of its own, and may make too many combinations.
function ofStages<Said>(judged: () => Said): Said | null {
  try {
    return judged();
  } catch (error) {
    if (error instanceof InputProblem && error.code === 'too-many-levels') return null;
    throw error;
  }
}

function stageEnd(
  bank: Bank,
  g: number,
  { frequencyHz, verdictOf }: { frequencyHz: number; verdictOf(bank: Bank): Verdict | null },
): StageEnd {
  const verdictAt = (factor: number): Verdict | null => verdictOf(aged(bank, g, factor));
  const whole = verdictAt(1);
  const none = { group: g, comesOutUf: null, comesOutPct: null };
  if (whole === null || whole === 'avoid') return none;
  const worse = (factor: number): boolean => {
    const verdict = verdictAt(factor);
    return verdict !== null && graver(whole, verdict) !== whole;
  };
  let high = 1;
  let low = 1 - FACTOR_STEP;
  while (low >= LEAST_FACTOR - 1e-9 && !worse(low)) {
    high = low;
    low -= FACTOR_STEP;
  }
  if (low < LEAST_FACTOR - 1e-9) return none;
  while (high - low > FACTOR_WIDTH) {
    const middle = (low + high) / 2;
    if (worse(middle)) low = middle;
    else high = middle;
  }
  // The end that is still within the verdict.
  return {
    group: g,
    comesOutUf: high * deltaCapacitanceUf(bank.groups[g]!, frequencyHz),
    comesOutPct: 100 * high,
  };
}
