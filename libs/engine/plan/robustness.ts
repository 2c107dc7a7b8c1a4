import type { Duty } from '../duty/duty-row.js';
import { closingDuties } from '../duty/judge-bank.js';
import { couplesAtPrimary } from '../duty/limits-point.js';
import { firmVerdict, LimitWitnesses } from '../duty/quick-judge.js';
import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import type { Loads } from '../network/loads.js';
import { siteNetwork } from '../network/network-model.js';
import type { Control } from '../operation/control.js';
import { changeTowards } from './change-towards.js';
import { basisOf, type Judged, overallVerdict } from './judge-basis.js';
import type { SettledSite } from './settled-site.js';

/** What is moved to see how far the verdict stands. */
export const MOVED_QUANTITIES = ['fault level', 'load', 'background', 'capacitance'] as const;

export type MovedQuantity = (typeof MOVED_QUANTITIES)[number];

/** The range of one quantity, relative to its value, within which the verdict stays the same. */
export interface StandingRange {
  quantity: MovedQuantity;
  /** factor at which the verdict changes going down; null where it stands to the least that was tried */
  lowFactor: number | null;
  highFactor: number | null;
  /** verdict beyond each end */
  verdictBelow: Verdict | null;
  verdictAbove: Verdict | null;
  /** least and greatest factor that were tried */
  leastTried: number;
  mostTried: number;
}

/** The bank with one stage of a group out. */
export interface StageOut {
  group: number;
  verdict: Verdict;
  worstDuty: string | null;
  worstRatio: number | null;
}

/** How firm the verdict is. */
export interface Robustness {
  ranges: StandingRange[];
  stageOut: StageOut[];
}

const TRIED: Record<MovedQuantity, [number, number]> = {
  'fault level': [0.25, 4],
  load: [0.25, 4],
  background: [0, 4],
  capacitance: [0.6, 1.2],
};
/** Steps of the search for a change of verdict, on either side, before it is closed in on. */
const STEPS = 8;
/** A change is closed in on to this share. */
const CLOSED_IN = 1e-3;

/**
 * How far fault level, load, background and capacitance can move before the verdict changes. The change nearest to
 * the present value is looked for outwards in even steps of the logarithm, and closed in on by bisection.
 * @param study site and record
 * @param bank the bank
 * @param control settings
 * @returns ranges, and the bank with one stage of each group out
 * @source method-robustness
 */
export function robustness(study: Judged, bank: Bank, control: Control): Robustness {
  const closing = closingDuties(study.model, bank, bankLevels(bank, study.site.nominalV), basisOf(study, control));
  const witnesses = new LimitWitnesses();
  const judgedAt = (quantity: MovedQuantity, factor: number): Verdict =>
    overallVerdict(study, judgeMoved(study, bank, control, { quantity, factor, closing, witnesses }));
  const present = judgedAt('load', 1);
  return {
    ranges: MOVED_QUANTITIES.filter((quantity) => applies(study.site, quantity)).map((quantity) => {
      const verdictAt = (factor: number): Verdict => judgedAt(quantity, factor);
      const [leastTried, mostTried] = TRIED[quantity];
      const down = changeTowards(verdictAt, present, { end: leastTried, steps: STEPS, closedIn: CLOSED_IN });
      const up = changeTowards(verdictAt, present, { end: mostTried, steps: STEPS, closedIn: CLOSED_IN });
      return {
        quantity,
        lowFactor: down?.factor ?? null,
        highFactor: up?.factor ?? null,
        verdictBelow: down?.value ?? null,
        verdictAbove: up?.value ?? null,
        leastTried,
        mostTried,
      };
    }),
    stageOut: bank.groups.map((_, g) => stageOut(study, bank, control, g)),
  };
}

function applies(site: SettledSite, quantity: MovedQuantity): boolean {
  return quantity !== 'background' || (site.loads.backgroundPct ?? []).length > 0;
}

/** A quantity moved by a factor. */
interface Move {
  quantity: MovedQuantity;
  factor: number;
  closing?: readonly Duty[];
  witnesses?: LimitWitnesses;
}

/**
 * The bank judged with one quantity moved; the record itself is not simulated again, since duties rest on the network.
 * @param study site and network
 * @param bank the bank
 * @param control settings
 * @param moved what is moved, by which factor; rows of exact inrush where they are known; corners that are worth looking
 *   at first
 * @returns the verdict
 * @source method-robustness
 */
export function judgeMoved(
  study: Judged,
  bank: Bank,
  control: Control,
  { quantity, factor, closing, witnesses }: Move,
): { verdict: Verdict } {
  const { site, model } = study;
  const loads =
    quantity === 'load' || quantity === 'background' ? movedLoads(site.loads, quantity, factor) : site.loads;
  const { max, min } = site.supply.faultLevelMva;
  const strength = quantity === 'fault level' ? factor : 1;
  const supply = { ...site.supply, faultLevelMva: { max: max * strength, min: min * strength } };
  const loadA = quantity === 'load' ? model.loadA * factor : model.loadA;
  const moved = siteNetwork(supply, loads, {
    nominalV: site.nominalV,
    loadA,
    topology: site.topology,
    primary: couplesAtPrimary(site),
  });
  const aged = quantity === 'capacitance' ? withCapacitance(bank, factor) : bank;
  const basis = { ...basisOf(study, control), supply, loads };
  // Harmonics have no part in a closing.
  const closes = quantity === 'load' || quantity === 'background' ? closing : undefined;
  if (witnesses?.speakAgainst(moved, aged, basis) === true) return { verdict: 'avoid' };
  const found = firmVerdict(moved, aged, basis, closes);
  witnesses?.learn(moved, found);
  return found;
}

function movedLoads(loads: Loads, quantity: 'load' | 'background', factor: number): Loads {
  if (quantity === 'background') {
    const backgroundPct = loads.backgroundPct?.map(({ orderH, pct }) => ({ orderH, pct: pct * factor })) ?? null;
    return { ...loads, backgroundPct };
  }
  return {
    ...loads,
    distorting: loads.distorting?.map((load) => ({ ...load, fundamentalA: load.fundamentalA * factor })) ?? null,
    dampingKw: { max: loads.dampingKw.max * factor, min: loads.dampingKw.min * factor },
  };
}

/**
 * A bank whose capacitance has changed: kvar and reactor ratio both go with C, since the reactor stays.
 * @param bank the bank
 * @param factor C relative to the nameplate
 * @returns the bank as it would measure
 * @source method-robustness
 */
export function withCapacitance(bank: Bank, factor: number): Bank {
  return {
    ...bank,
    groups: bank.groups.map((group) => ({
      ...group,
      ratedKvar: group.ratedKvar * factor,
      reactorPct: group.reactorPct * factor,
    })),
  };
}

/**
 * A bank without one stage of a group.
 * @param bank the bank
 * @param g index of the group
 * @returns what is left, its group gone where it had one stage
 */
export function withoutStage(bank: Bank, g: number): Bank {
  const groups = bank.groups.flatMap((group, k) => {
    if (k !== g) return [group];
    return group.count > 1 ? [{ ...group, count: group.count - 1 }] : [];
  });
  return { ...bank, groups };
}

function stageOut(study: Judged, bank: Bank, control: Control, g: number): StageOut {
  const rest = withoutStage(bank, g);
  const judged = firmVerdict(study.model, rest, basisOf(study, control));
  return {
    group: g,
    verdict: overallVerdict(study, judged),
    worstDuty: judged.worst?.name ?? null,
    worstRatio: judged.worst?.ratio ?? null,
  };
}
