import {
  type Bank,
  bankLevels,
  type CornerCase,
  type Loads,
  type NetworkModel,
  networkModel,
  type StageGroup,
  type Supply,
} from '#libs/engine/index.js';
import type { Chance } from './chance.js';
import type { SlowNetwork } from './slow-network.js';

/** A supply, loads and a bank with every part given. */
export interface MadeNetwork {
  nominalV: number;
  supply: Supply;
  loads: Loads;
  bank: Bank;
}

/**
 * A group of stages with the parts a test is not about filled in.
 * @param parts what the test is about
 * @returns the group
 */
export function madeGroup(parts: Partial<StageGroup> = {}): StageGroup {
  return {
    count: 1,
    ratedKvar: 50,
    ratedV: 400,
    reactorPct: 0,
    reactorQuality: 30,
    dischargeOhm: null,
    reactorMaxA: null,
    switchPeakA: null,
    fixed: false,
    ...parts,
  };
}

/**
 * A bank of groups.
 * @param groups its groups
 * @returns the bank, its inductance between stages customary
 */
export function madeBank(groups: StageGroup[]): Bank {
  return { groups, interStageUh: 2, interStageGiven: false, ambientCategory: null };
}

/**
 * A network of chance: weak or strong, with or without transformers, plain and tuned groups mixed.
 * @param random where the numbers come from
 * @param quality reactor qualities to draw from
 * @returns the network
 */
export function randomNetwork(random: Chance, quality: readonly number[] = [10, 30, 80]): MadeNetwork {
  const nominalV = random.oneOf([400, 480, 690]);
  const max = random.between(8, 400);
  const transformer = (): Supply['transformers'][number] => ({
    ratedKva: random.oneOf([400, 630, 1000, 1600]),
    impedancePct: random.between(4, 7),
    impedanceTolerancePct: random.oneOf([0, 7.5, 10]),
    loadLossKw: random.between(2, 12),
    noLoadLossKw: 1,
    noLoadCurrentPct: 1,
  });
  const groups = Array.from({ length: random.whole(1, 3) }, () =>
    madeGroup({
      count: random.whole(1, 3),
      ratedKvar: random.oneOf([5, 12.5, 25, 50, 100]),
      ratedV: nominalV * random.oneOf([1, 1.2, 1.31]),
      reactorPct: random.oneOf([0, 5.67, 7, 7.01, 12.5, 14]),
      reactorQuality: random.oneOf(quality),
    }),
  );
  return {
    nominalV,
    supply: {
      faultLevelMva: { max, min: max * random.between(0.3, 1) },
      rOverX: random.oneOf([0.05, 0.1, 0.4]),
      resistanceExponent: random.oneOf([0, 0.5, 1]),
      rippleHz: null,
      transformers: Array.from({ length: random.whole(0, 2) }, transformer),
    },
    loads: {
      motorSharePct: random.oneOf([0, 60, 100]),
      distorting: [],
      backgroundPct: [],
      dampingKw: { min: 0, max: random.oneOf([0, 50, 300]) },
      summation: 'exponent',
    },
    bank: madeBank(groups),
  };
}

/**
 * The engine's model of a network.
 * @param made the network
 * @returns model and levels of the bank
 */
export function modelOf(made: MadeNetwork): { model: NetworkModel; levels: ReturnType<typeof bankLevels> } {
  return {
    model: networkModel(made.supply, made.loads, made.nominalV, 100),
    levels: bankLevels(made.bank, made.nominalV),
  };
}

/**
 * The same network in one corner with one count of stages, from the nameplates alone.
 * @param made the network
 * @param at the engine's corner, its place in the list (nominal first, then greatest, then least fault level), the counts
 * @returns the network for the second methods
 */
export function slowNetwork(
  made: MadeNetwork,
  at: { corner: CornerCase['corner']; index: number; corners: number; vector: ArrayLike<number> },
): SlowNetwork {
  const sign = at.index === 0 ? 0 : at.index <= (at.corners - 1) / 2 ? -1 : 1;
  return {
    nominalV: made.nominalV,
    faultLevelMva: at.corner.faultLevelMva,
    rOverX: made.supply.rOverX,
    exponent: made.supply.resistanceExponent,
    transformers: made.supply.transformers.map(({ ratedKva, impedancePct, impedanceTolerancePct, loadLossKw }) => ({
      ratedKva,
      loadLossKw,
      impedancePct: impedancePct * (1 + (sign * impedanceTolerancePct) / 100),
    })),
    motorSharePct: made.loads.motorSharePct,
    dampingKw: at.corner.dampingKw,
    capacitanceFactor: at.corner.capacitanceFactor,
    inductanceFactor: at.corner.inductanceFactor,
    stages: made.bank.groups.map((stage, g) => ({ stage, count: at.vector[g]! })),
  };
}
