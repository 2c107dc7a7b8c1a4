import { firmVerdict } from '../duty/quick-judge.js';
import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import { tunedOrderH } from '../layout/stage.js';
import { bankColumn, busColumns, seenSquareInto } from '../network/bus-columns.js';
import { PeakFinder } from '../network/peaks.js';
import { stageAdmittance, stageBranch } from '../network/stage-admittance.js';
import type { Control } from '../operation/control.js';
import { basisOf, type Judged, overallVerdict } from './judge-basis.js';

/** Reactor ratios that are tried beside the bank's own [%]; common practice, no source. */
export const TRIED_REACTOR_PCT = [0, 5.67, 7, 12.5, 14] as const;

/** A bank may take this much of the network's ripple-control signal before it is said; common practice, no source. */
export const RIPPLE_FLOOR = 0.8;

/** The bank's stages built with one reactor ratio. */
export interface ReactorTrial {
  reactorPct: number;
  /** voltage the stages were tried at [V] */
  ratedV: number;
  chosen: boolean;
  tunedOrderH: number | null;
  /** least and greatest parallel order over levels above 0, nominal */
  lowestPeakH: number | null;
  highestPeakH: number | null;
  verdict: Verdict;
  worstDuty: string | null;
  worstRatio: number | null;
  /** least share of a ripple-control signal that is left with the bank in, or null where there is none */
  rippleShare: number | null;
}

/**
 * The bank's stages tried plain and with the customary reactor ratios, each at the least listed voltage that carries
 * the fundamental: which ratio would be within limits, and why the others are not.
 * @param study site and record
 * @param bank the bank
 * @param control settings
 * @param ratedV voltages to choose from, ascending [V]
 * @returns one row a ratio, ascending; the bank's own marked
 * @source method-network
 */
export function reactorTrials(study: Judged, bank: Bank, control: Control, ratedV: readonly number[]): ReactorTrial[] {
  const own = new Set(bank.groups.map(({ reactorPct }) => reactorPct));
  if (own.size !== 1) return [];
  const ownPct = [...own][0]!;
  const ratios = [...new Set([...TRIED_REACTOR_PCT, ownPct])].sort((a, b) => a - b);
  return ratios.map((reactorPct) => {
    const chosen = reactorPct === ownPct;
    const voltage = chosen ? bank.groups[0]!.ratedV : voltageFor(study, reactorPct, ratedV);
    const tried = chosen
      ? bank
      : { ...bank, groups: bank.groups.map((group) => ({ ...group, reactorPct, ratedV: voltage })) };
    return trial(study, tried, control, { reactorPct, ratedV: voltage, chosen });
  });
}

/**
 * Rated voltage of capacitors behind a reactor: the fundamental alone with a twentieth to spare, as the layout has it.
 * @param study site and network
 * @param reactorPct p [%]
 * @param ratedV voltages to choose from, ascending [V]
 * @returns the least listed voltage that will do, else the voltage needed [V]
 * @source method-layout
 */
export function voltageFor(study: Judged, reactorPct: number, ratedV: readonly number[]): number {
  const { nominalV, highestV } = study.site;
  const rise = 1 / (1 - (1.1 * 1.03 * reactorPct) / 100);
  const needV = Math.max((nominalV * rise) / 0.95, (highestV * rise) / 1.1 / 0.95);
  return ratedV.find((v) => v >= needV) ?? needV;
}

function trial(
  study: Judged,
  bank: Bank,
  control: Control,
  head: Pick<ReactorTrial, 'reactorPct' | 'ratedV' | 'chosen'>,
): ReactorTrial {
  const found = firmVerdict(study.model, bank, basisOf(study, control));
  const finder = new PeakFinder(study.model, bank);
  const nominal = study.model.corners.corners[0]!;
  const levels = bankLevels(bank, study.site.nominalV).slice(1);
  const peaks = levels.flatMap(({ vectors }) => finder.greatest(vectors[0]!, nominal)?.orderH ?? []);
  return {
    ...head,
    tunedOrderH: tunedOrderH(head.reactorPct),
    lowestPeakH: peaks.length === 0 ? null : Math.min(...peaks),
    highestPeakH: peaks.length === 0 ? null : Math.max(...peaks),
    verdict: overallVerdict(study, found),
    worstDuty: found.worst?.name ?? null,
    worstRatio: found.worst?.ratio ?? null,
    rippleShare: rippleShare(
      study,
      bank,
      levels.map(({ vectors }) => vectors[0]!),
    ),
  };
}

// What is left of a signal behind the source: |Z|/|Z₀| at its frequency, the least over levels and corners.
function rippleShare(study: Judged, bank: Bank, vectors: readonly Int32Array[]): number | null {
  const { rippleHz } = study.site.supply;
  if (rippleHz === null) return null;
  const ordersH = Float64Array.of(rippleHz / study.site.frequencyHz);
  const { corners, factors, networks } = study.model.corners;
  const exponent = networks[0]!.path.resistanceExponent;
  const square = new Float64Array(1);
  let least = 1;
  for (const corner of corners) {
    const columns = busColumns(study.model, corner.network, study.model.bankBus, ordersH);
    const stages = bank.groups.map((group) =>
      stageAdmittance(stageBranch(group, factors[corner.factors]!, exponent), ordersH),
    );
    const without = columns.bank.re[0]! ** 2 + columns.bank.im[0]! ** 2;
    for (const vector of vectors) {
      seenSquareInto(columns, bankColumn(stages, vector, 1), square);
      least = Math.min(least, Math.sqrt(without / square[0]!));
    }
  }
  return least;
}
