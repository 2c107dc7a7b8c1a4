import type { Verdict } from '../duty/rules.js';
import type { BankInput } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import { settleBank } from '../plan/settle-bank.js';
import { type NetworkGround, networkVerdict, type StagesVerdict, shortDevicesOf, withDevices } from './weigh-stages.js';

/** Stages to keep out, and what is left. */
export interface StagesOut {
  /** stages out of each entry of `bank.stages` */
  out: number[];
  stagesOut: number;
  /** effective, at nominal bus voltage [kvar] */
  outKvar: number;
  keptKvar: number;
  /** of the stages that are left, at every level and in every corner */
  verdict: Verdict;
  worstDuty: string | null;
  worstRatio: number | null;
}

/**
 * The least stages to keep out so that every level that is left is within limits: fewest stages, then least kvar, then
 * the first in order. Every choice of stages is looked at, except those that hold another already found wanting: what a
 * bank can do wrong with fewer stages it can do with more.
 * @param ground site and its network
 * @param input the bank
 * @param atWorst the gravest verdict that will do
 * @returns the stages to keep out; all of them where nothing else will do, none where nothing need
 * @source method-reevaluation
 */
export function leastStagesOut(ground: NetworkGround, input: BankInput, atWorst: 'clear' | 'watch'): StagesOut {
  const search = new KeptSearch(ground, input, atWorst);
  search.seed();
  for (const kept of search.choices()) {
    const found = search.judged(kept);
    if (found !== null) return outOf(search, kept, found);
  }
  const nothing = input.stages.map(() => 0);
  return outOf(search, nothing, { verdict: 'clear', worstDuty: null, worstGroup: null, worstRatio: null });
}

/**
 * A bank with some of its stages.
 * @param input the bank
 * @param kept stages left of each entry
 * @returns the bank without the entries of which nothing is left
 */
export function keptBank(input: BankInput, kept: readonly number[]): BankInput {
  return {
    ...input,
    stages: input.stages.flatMap((stage, g) => (kept[g]! > 0 ? [{ ...stage, count: kept[g]! }] : [])),
  };
}

function outOf(search: KeptSearch, kept: readonly number[], found: StagesVerdict): StagesOut {
  const out = search.input.stages.map(({ count }, g) => count - kept[g]!);
  const { verdict, worstDuty, worstRatio } = found;
  return {
    out,
    stagesOut: out.reduce((sum, count) => sum + count, 0),
    outKvar: search.kvarOf(out),
    keptKvar: search.kvarOf(kept),
    verdict,
    worstDuty,
    worstRatio,
  };
}

class KeptSearch {
  readonly input: BankInput;
  readonly #ground: NetworkGround;
  readonly #atWorst: 'clear' | 'watch';
  readonly #stageKvar: number[];
  /** choices the network rules out */
  readonly #wanting: number[][] = [];
  /** devices that fall short with every stage in */
  readonly #short: Set<string>;

  constructor(ground: NetworkGround, input: BankInput, atWorst: 'clear' | 'watch') {
    this.input = input;
    this.#ground = ground;
    this.#atWorst = atWorst;
    const { bank } = settleBank(input, ground.site.frequencyHz);
    this.#stageKvar = bank.groups.map((group) => effectiveKvar(group, ground.site.bus.nominalV));
    this.#short = new Set(shortDevicesOf(ground, input).map(({ device }) => device));
  }

  kvarOf(counts: readonly number[]): number {
    return counts.reduce((sum, count, g) => sum + count * this.#stageKvar[g]!, 0);
  }

  /** One stage of each entry alone: where that is wanting already, so is whatever holds it. */
  seed(): void {
    for (const g of this.input.stages.keys()) this.judged(this.input.stages.map((_, k) => (k === g ? 1 : 0)));
  }

  /** Every choice of at least one stage, the least to keep out first. */
  choices(): number[][] {
    let all: number[][] = [[]];
    for (const { count } of this.input.stages) {
      all = all.flatMap((kept) => Array.from({ length: count + 1 }, (_, n) => [...kept, n]));
    }
    const total = (kept: number[]): number => kept.reduce((sum, n) => sum + n, 0);
    return all
      .filter((kept) => total(kept) > 0)
      .sort((a, b) => total(b) - total(a) || this.kvarOf(b) - this.kvarOf(a) || firstDifference(b, a));
  }

  /** @returns the verdict where it will do, null where it is wanting */
  judged(kept: number[]): StagesVerdict | null {
    if (this.#wanting.some((known) => this.#holds(kept, known))) return null;
    const input = keptBank(this.input, kept);
    const found = networkVerdict(this.#ground, input);
    if (!this.#willDo(found)) {
      this.#wanting.push(kept);
      return null;
    }
    // A device that falls short only because stages are out, such as a setting then too high, keeps nothing out.
    const short = shortDevicesOf(this.#ground, input).filter(({ device }) => this.#short.has(device));
    const whole = withDevices(found, short);
    return this.#willDo(whole) ? whole : null;
  }

  #willDo({ verdict }: StagesVerdict): boolean {
    return verdict === 'clear' || (verdict === 'watch' && this.#atWorst === 'watch');
  }

  // A stage that is never switched is part of every level: banks with other counts of those have other levels.
  #holds(kept: number[], known: number[]): boolean {
    return this.input.stages.every(({ fixed }, g) => (fixed === true ? kept[g] === known[g] : kept[g]! >= known[g]!));
  }
}

function firstDifference(a: readonly number[], b: readonly number[]): number {
  const at = a.findIndex((n, k) => n !== b[k]);
  return at < 0 ? 0 : a[at]! - b[at]!;
}
