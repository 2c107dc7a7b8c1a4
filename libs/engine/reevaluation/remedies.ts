import type { Bank, BankInput, StageGroupInput } from '../layout/bank.js';
import { COMMON_CATALOGUE } from '../layout/candidates.js';
import { MOST_VECTORS } from '../layout/levels.js';
import { effectiveKvar, nameplateKvar } from '../layout/stage.js';
import { type CostBasis, capitalOf } from '../money/capital.js';
import { siteSwitchKind } from '../plan/money-study.js';
import { TRIED_REACTOR_PCT, voltageFor } from '../plan/reactor-choice.js';
import { settleBank } from '../plan/settle-bank.js';
import type { SiteAsMeasured } from './site-as-measured.js';
import { keptBank, type StagesOut } from './stages-out.js';
import { type Ground, type StagesVerdict, type WeighedStages, weighStages } from './weigh-stages.js';

/** Ways to mend an installed bank; where prices don't decide, in this order. */
export const REMEDY_KINDS = ['setPoint', 'remove', 'replace', 'restore', 'renew', 'add', 'detune'] as const;

/** One way to mend a bank, with its figures. */
export interface Remedy extends WeighedStages {
  kind: (typeof REMEDY_KINDS)[number];
  /** stages touched: out, replaced, put back, added, new with reactors; 0 for a set point */
  stages: number;
  /** nameplate of a stage that is bought, and reactor ratio of a detuned bank; null where nothing is */
  ratedKvar: number | null;
  ratedV: number | null;
  reactorPct: number | null;
  /** stages out of each entry of the bank as it measures; null for other kinds */
  out: number[] | null;
  /** the bank it leads to */
  bank: BankInput;
  /** parts that are bought; null without prices */
  capital: number | null;
  /** within limits and the target met in every billing month */
  mends: boolean;
}

/** What remedies are looked for with. */
export interface RemedyBasis {
  ground: Ground;
  measured: SiteAsMeasured;
  /** the bank at its nameplates */
  nameplate: BankInput;
  /** the bank of the earlier site, null where it had none */
  earlier: BankInput | null;
  /** least stages out that leave nothing near a limit, where the bank is over one */
  out: StagesOut | null;
  /** the network's verdict of the bank as it stands */
  standing: StagesVerdict;
}

/** Most stages that are added. */
const MOST_ADDED = 3;
/** A stage that has lost less than this is not replaced [share]. */
const WORTH_REPLACING = 0.95;
/** Parts that are bought for a stage; installation and the bank's own are left to an offer. */
const PARTS: readonly string[] = ['capacitors', 'stages', 'reactors', 'switches'];

/**
 * What would mend a bank, each way by itself, weighed by the same engine: another set point, stages left out, measured
 * stages replaced, lost ones put back, more of a kind, reactors. Those that mend it first, then those over no limit,
 * then those that meet the target; among equals the cheapest, then in the order of `REMEDY_KINDS`.
 * @param basis the bank as it stands, and what it was
 * @returns ways, the best first
 * @source method-reevaluation
 */
export function remedies(basis: RemedyBasis): Remedy[] {
  const found = [
    ...setPointRemedy(basis),
    ...removeRemedy(basis),
    ...replaceRemedies(basis),
    ...restoreRemedy(basis),
    ...addRemedies(basis),
    ...detuneRemedies(basis),
  ];
  const rank = (one: Remedy): number => REMEDY_KINDS.indexOf(one.kind);
  const over = (one: Remedy): number => Number(one.verdict === 'avoid');
  return found.sort(
    (a, b) =>
      Number(b.mends) - Number(a.mends) ||
      over(a) - over(b) ||
      Number(b.meetsTarget) - Number(a.meetsTarget) ||
      (a.capital ?? 0) - (b.capital ?? 0) ||
      rank(a) - rank(b),
  );
}

type Head = Pick<Remedy, 'kind' | 'stages'> & Partial<Pick<Remedy, 'ratedKvar' | 'ratedV' | 'reactorPct' | 'out'>>;

function remedyOf(basis: RemedyBasis, bank: BankInput, head: Head, more: Buys = { bought: [] }): Remedy {
  const weighed = weighStages(basis.ground, bank, more.known);
  return {
    ratedKvar: null,
    ratedV: null,
    reactorPct: null,
    out: null,
    ...head,
    ...weighed,
    bank,
    capital: capitalFor(basis, bank, more.bought),
    mends: weighed.verdict === 'clear' && weighed.meetsTarget,
  };
}

/** What is bought, and the verdict where it is known. */
interface Buys {
  bought: StageGroupInput[];
  known?: StagesVerdict;
}

// Parts with the price book's contingency, and the cabinets a larger bank needs more.
function capitalFor({ ground, measured }: RemedyBasis, bank: BankInput, bought: StageGroupInput[]): number | null {
  const prices = ground.money?.prices ?? null;
  if (prices === null) return null;
  if (bought.length === 0) return 0;
  const { site } = ground;
  const basis: CostBasis = { ...prices, switchKind: siteSwitchKind(site) };
  const linesOf = (input: BankInput) => capitalOf(settleBank(input, site.frequencyHz).bank, basis).lines;
  const amount = (input: BankInput, items: readonly string[]): number =>
    linesOf(input).reduce((sum, line) => sum + (items.includes(line.item) ? line.amount : 0), 0);
  const cabinets = amount(bank, ['cabinets']) - amount(measured.site.bank, ['cabinets']);
  const parts = amount({ ...bank, stages: bought }, PARTS);
  return (parts + Math.max(cabinets, 0)) * (1 + (prices.prices.contingencyPct ?? 0) / 100);
}

// The bank as it stands with the set point that meets the target; nothing to do where its own does.
function setPointRemedy(basis: RemedyBasis): Remedy[] {
  const found = remedyOf(basis, basis.measured.site.bank, { kind: 'setPoint', stages: 0 });
  const own = basis.ground.site.control?.setPointPowerFactor ?? basis.ground.study.site.targetPowerFactor;
  return found.setPointPowerFactor === own ? [] : [found];
}

function removeRemedy(basis: RemedyBasis): Remedy[] {
  const { out } = basis;
  if (out === null || out.stagesOut === 0 || out.keptKvar === 0) return [];
  const kept = keptBank(
    basis.measured.site.bank,
    basis.measured.site.bank.stages.map(({ count }, g) => count - out.out[g]!),
  );
  return [remedyOf(basis, kept, { kind: 'remove', stages: out.stagesOut, out: out.out })];
}

// The stages that have lost most, one more at a time until the bank is mended.
function replaceRemedies(basis: RemedyBasis): Remedy[] {
  const { measured, nameplate } = basis;
  const lost = [...measured.factor.keys()]
    .filter((k) => measured.ofStage[k] !== null && measured.factor[k]! < WORTH_REPLACING)
    .sort((a, b) => measured.factor[a]! - measured.factor[b]!);
  let last: Remedy | null = null;
  for (let count = 1; count <= lost.length; count++) {
    const replaced = new Set(lost.slice(0, count));
    const fresh = (k: number): StageGroupInput => {
      return { ...plateOf(nameplate.stages[measured.ofGroup[k]!]!), count: 1 };
    };
    const stages = measured.site.bank.stages.map((stage, k) => (replaced.has(k) ? fresh(k) : stage));
    const [first] = lost;
    const { ratedKvar, ratedV, reactorPct } = fresh(first!);
    last = remedyOf(
      basis,
      { ...measured.site.bank, stages: alike(stages) },
      { kind: 'replace', stages: count, ratedKvar, ratedV, reactorPct: reactorPct ?? 0 },
      { bought: [...replaced].map(fresh) },
    );
    if (last.mends) break;
  }
  return last === null ? [] : [last];
}

// Equal entries beside each other are one, so that the count of combinations stays small.
function alike(stages: readonly StageGroupInput[]): StageGroupInput[] {
  const entries = new Map<string, StageGroupInput>();
  for (const { count, ...rest } of stages) {
    const key = JSON.stringify(Object.entries(rest).sort(([a], [b]) => (a < b ? -1 : 1)));
    entries.set(key, { ...rest, count: count + (entries.get(key)?.count ?? 0) });
  }
  return [...entries.values()];
}

// Stages the earlier bank had and this one has not, alone and with the measured ones new.
function restoreRemedy(basis: RemedyBasis): Remedy[] {
  const { earlier, measured, nameplate } = basis;
  const missing = (earlier?.stages ?? []).flatMap((stage) => {
    const plate = plateOf(stage);
    const same = nameplate.stages
      .filter((now) => now.ratedKvar === stage.ratedKvar && now.ratedV === stage.ratedV)
      .filter((now) => (now.reactorPct ?? 0) === (stage.reactorPct ?? 0));
    const count = stage.count - same.reduce((sum, now) => sum + now.count, 0);
    return count > 0 ? [{ ...plate, count }] : [];
  });
  if (missing.length === 0) return [];
  const [{ ratedKvar, ratedV, reactorPct }] = missing as [StageGroupInput];
  const lost = measured.site.bank.stages.flatMap((_, k) =>
    measured.ofStage[k] !== null && measured.factor[k]! < WORTH_REPLACING
      ? [{ ...plateOf(nameplate.stages[measured.ofGroup[k]!]!), count: 1 }]
      : [],
  );
  const whole = nameplate.stages.map(plateOf);
  const ways: { kind: 'restore' | 'renew'; kept: StageGroupInput[]; bought: StageGroupInput[] }[] = [
    { kind: 'restore', kept: measured.site.bank.stages, bought: missing },
    ...(lost.length === 0 ? [] : [{ kind: 'renew' as const, kept: whole, bought: [...missing, ...lost] }]),
  ];
  return ways.map(({ kind, kept, bought }) => {
    const stages = bought.reduce((sum, { count }) => sum + count, 0);
    const head: Head = { kind, stages, ratedKvar, ratedV, reactorPct: reactorPct ?? 0 };
    return remedyOf(basis, { ...measured.site.bank, stages: alike([...kept, ...missing]) }, head, { bought });
  });
}

function plateOf(stage: StageGroupInput): StageGroupInput {
  const { measurements: _, commissioned: __, measuredUf: ___, ...plate } = stage;
  return plate;
}

// More stages like those there are; of no use where the bank is over a limit as it stands, or meets its target.
function addRemedies(basis: RemedyBasis): Remedy[] {
  const { measured, nameplate, standing, ground } = basis;
  if (standing.verdict === 'avoid' || weighStages(ground, measured.site.bank, standing).meetsTarget) return [];
  return nameplate.stages.flatMap((stage) => {
    const plate = plateOf(stage);
    let last: Remedy | null = null;
    for (let added = 1; added <= MOST_ADDED; added++) {
      const more = { ...plate, count: added };
      const bank = { ...measured.site.bank, stages: alike([...measured.site.bank.stages, more]) };
      if (vectorsOf(bank) > MOST_VECTORS) break;
      const head: Head = {
        kind: 'add',
        stages: added,
        ratedKvar: plate.ratedKvar,
        ratedV: plate.ratedV,
        reactorPct: plate.reactorPct ?? 0,
      };
      last = remedyOf(basis, bank, head, { bought: [more] });
      if (last.mends) break;
    }
    return last === null ? [] : [last];
  });
}

function vectorsOf({ stages }: BankInput): number {
  return stages.reduce((product, { count, fixed }) => product * (fixed === true ? 1 : count + 1), 1);
}

// Every stage new with the reactor ratio that mends it first, its output at the bus kept; with more of them where the
// target asks for it.
function detuneRemedies(basis: RemedyBasis): Remedy[] {
  const { ground, nameplate, standing } = basis;
  if (standing.verdict === 'clear') return [];
  const { bank } = settleBank(nameplate, ground.site.frequencyHz);
  const own = Math.min(...bank.groups.map(({ reactorPct }) => reactorPct));
  let last: Remedy | null = null;
  for (const reactorPct of TRIED_REACTOR_PCT.filter((pct) => pct > own + 0.1)) {
    const tried = detuned(basis, bank, reactorPct, 0);
    if (last === null || tried.verdict !== 'avoid') last = tried;
    for (let added = 1; added <= MOST_ADDED && last === tried && missesTargetOnly(last); added++) {
      const more = detuned(basis, bank, reactorPct, added);
      if (more.mends) last = more;
    }
    if (last.mends) break;
  }
  return last === null ? [] : [last];
}

function missesTargetOnly({ verdict, meetsTarget }: Remedy): boolean {
  return verdict === 'clear' && !meetsTarget;
}

function detuned(basis: RemedyBasis, bank: Bank, reactorPct: number, added: number): Remedy {
  const { ground, nameplate } = basis;
  const { nominalV } = ground.study.site;
  const ratedV = voltageFor(ground.study, reactorPct, COMMON_CATALOGUE.ratedV);
  const output = bank.groups.map((group) => effectiveKvar(group, nominalV));
  const largest = output.indexOf(Math.max(...output));
  const stages = bank.groups.map((group, g) => ({
    count: group.count + (g === largest ? added : 0),
    ratedKvar: nameplateKvar(output[g]!, { ratedV, nominalV, reactorPct }, 'effective'),
    ratedV,
    reactorPct,
    ...(group.fixed ? { fixed: true } : {}),
  }));
  const count = stages.reduce((sum, stage) => sum + stage.count, 0);
  const head: Head = { kind: 'detune', stages: count, ratedV, reactorPct };
  return remedyOf(basis, { ...nameplate, stages: alike(stages) }, head, { bought: stages });
}
