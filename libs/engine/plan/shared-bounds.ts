import type { Build, SearchSpace } from '../layout/search-space.js';
import { rangeTariff } from '../money/bill-range.js';
import type { PreparedTariff } from '../money/prepare-tariff.js';
import { type ControllerPace, controlReach } from '../operation/control-reach.js';
import type { ControllerView } from '../operation/controller-view.js';
import { CellBounds, type CellSize } from './bound-cell.js';
import { boundRest, type WorthGround } from './candidate-worth.js';
import { leastOfLast } from './least-of-last.js';
import { MonthCells } from './month-cell.js';
import type { Candidate, SharedBound } from './search.js';
import type { Study } from './study.js';

/** Totals, reaches and paces within these ratios share their bounds; a pace counts in few intervals. */
const RATIO = { about: 1.2, size: 1.05, reach: 1.3, pace: 4 } as const;
/** Keys of bounds: room for steps of size, of reach and of pace, each from −600 on, and for the intervals of a wait. */
const STEPS = 2000;
const STEP_ZERO = 600;
const WAITS = 1000;

/** Bounds by size and controller; whatever many candidates ask for is formed once. */
export class SharedBounds {
  readonly #study: Study;
  readonly #space: SearchSpace;
  readonly #worth: WorthGround;
  readonly #cells: Pick<CellBounds, 'cell'>;
  readonly #bounds = new Map<number, SharedBound>();
  /** by the columns they are taken from, then by the intervals looked back */
  readonly #leastWanted = new Map<Float64Array, Map<number, Float64Array>>();

  /**
   * @param ground what every candidate is valued with
   * @param prepared the tariff on its record
   * @param space all candidates
   */
  constructor(ground: WorthGround, prepared: PreparedTariff, space: SearchSpace) {
    this.#study = ground.study;
    this.#space = space;
    this.#worth = ground;
    const ranged = rangeTariff(prepared);
    this.#cells = MonthCells.of(ground.study, ranged) ?? new CellBounds(ground.study, ranged);
  }

  /**
   * Bounds that look at no more than a total.
   * @param build the build
   * @param width how near its total is looked at
   * @returns the bounds
   */
  bySize({ totalKvar }: Build, width: 'about' | 'size'): SharedBound {
    const step = stepOf(totalKvar, RATIO[width]);
    const key = keyOf(step, width === 'about' ? 0 : 1, 0) * WAITS * STEPS;
    return this.#bound(key, () => sizeOf(totalKvar, width));
  }

  /**
   * Bounds that look at a total, a set point, and how near the controller keeps to what it wants.
   * @param candidate the candidate
   * @param control settings of its controller
   * @param view what the controller sees at its set point
   * @returns the bounds; those by size where the controller may be held back
   */
  byController(candidate: Candidate, control: ControllerPace, view: ControllerView): SharedBound {
    const build = this.#space.builds[candidate.build]!;
    const reach = controlReach({ ...build, stageCount: build.stages }, control, view);
    if (!Number.isFinite(reach.aboveKvar)) return this.bySize(build, 'size');
    const near = stepOf(reach.aboveKvar, RATIO.reach);
    const pace = Number.isFinite(reach.paceKvar) ? Math.floor(Math.log(reach.paceKvar) / Math.log(RATIO.pace)) : null;
    const held = Number.isFinite(reach.belowKvar) ? 0 : 1;
    const byReach = keyOf(stepOf(build.totalKvar, RATIO.size), 2 + 2 * candidate.setPoint + held, near);
    const key = (byReach * WAITS + reach.waitIntervals) * STEPS + (pace === null ? 0 : pace + STEP_ZERO);
    return this.#bound(key, () => {
      const kvar = RATIO.reach ** near * (1 + 1e-9);
      const wide = {
        aboveKvar: kvar,
        belowKvar: held === 0 ? kvar : Number.POSITIVE_INFINITY,
        paceKvar: pace === null ? Number.POSITIVE_INFINITY : RATIO.pace ** pace * (1 - 1e-9),
      };
      const { wantedKvar } = view;
      const leastWantedKvar = this.#leastOf(wantedKvar, reach.waitIntervals);
      return { ...sizeOf(build.totalKvar, 'size'), wantedKvar, leastWantedKvar, reach: wide };
    });
  }

  #leastOf(wantedKvar: Float64Array, before: number): Float64Array {
    if (before === 0) return wantedKvar;
    const known = this.#leastWanted.get(wantedKvar) ?? new Map<number, Float64Array>();
    this.#leastWanted.set(wantedKvar, known);
    const made = known.get(before) ?? leastOfLast(wantedKvar, before);
    known.set(before, made);
    return made;
  }

  #bound(key: number, size: () => CellSize): SharedBound {
    const known = this.#bounds.get(key);
    if (known !== undefined) return known;
    const cell = this.#cells.cell(size());
    const rest = boundRest(this.#worth, cell);
    const made = { ...rest, mostLowestFactor: cell.mostLowestFactor };
    this.#bounds.set(key, made);
    return made;
  }
}

function keyOf(size: number, kind: number, near: number): number {
  return (kind * STEPS + size + STEP_ZERO) * STEPS + near + STEP_ZERO;
}

function stepOf(kvar: number, ratio: number): number {
  return Math.ceil(Math.log(kvar) / Math.log(ratio) - 1e-9);
}

function sizeOf(totalKvar: number, width: 'about' | 'size'): CellSize {
  const ratio = RATIO[width];
  const step = stepOf(totalKvar, ratio);
  const infinite = Number.POSITIVE_INFINITY;
  const unheld = { aboveKvar: infinite, belowKvar: infinite, paceKvar: infinite };
  // a little room for the powers of the ratio
  const mostKvar = Math.max(totalKvar, ratio ** step * (1 + 1e-9));
  const leastKvar = ratio ** (step - 1) * (1 - 1e-9);
  return { mostKvar, leastKvar, wantedKvar: null, leastWantedKvar: null, reach: unheld };
}
