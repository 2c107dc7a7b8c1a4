import { InputProblem } from '../problem.js';
import { type GrownColumns, grownColumns, grownStudy } from './grown-study.js';
import type { RunColumns } from './run-columns.js';
import { controllerView, meterColumns } from './study.js';
import { type Scale, scaleOf, type WorthAgain, weighAgain, workOn } from './weigh-again.js';
import type { WeighedBank } from './weighed-bank.js';

/** Weighs ways on a record whose load is moved; every factor is written over the one before. */
export class MovedLoads {
  readonly #scale: Scale;
  #grownColumns: GrownColumns | null = null;
  #runColumns: RunColumns | null = null;
  /** by set point */
  readonly #wantedKvar = new Map<number, Float64Array>();

  /** @param scale the record as metered */
  constructor(scale: Scale) {
    this.#scale = scale;
  }

  /**
   * Ways under a factor on the load.
   * @param ways with a bank each
   * @param factor on the load
   * @returns their worths, null where the transformers can't carry the load
   * @source method-robustness
   */
  under(ways: readonly WeighedBank[], factor: number): (WorthAgain | null)[] {
    const grown = nullWhereTooLarge(() => this.#grown(ways, factor));
    if (grown === null) return ways.map(() => null);
    return ways.map((way) => nullWhereTooLarge(() => weighAgain(grown, way, workOn(grown, way.bank, way.control))));
  }

  #grown(ways: readonly WeighedBank[], factor: number): Scale {
    const { study, money } = this.#scale;
    this.#grownColumns ??= grownColumns(study);
    const grown = grownStudy(study, factor, this.#grownColumns);
    this.#runColumns ??= meterColumns(grown);
    const scale = scaleOf(grown, money, this.#runColumns);
    for (const { control } of ways) {
      const { setPointPowerFactor } = control;
      if (scale.views.has(setPointPowerFactor)) continue;
      const view = controllerView(grown, setPointPowerFactor, this.#wantedKvar.get(setPointPowerFactor));
      this.#wantedKvar.set(setPointPowerFactor, view.wantedKvar);
      scale.views.set(setPointPowerFactor, view);
    }
    return scale;
  }
}

function nullWhereTooLarge<T>(work: () => T): T | null {
  try {
    return work();
  } catch (problem) {
    if (problem instanceof InputProblem && problem.code === 'load-too-large') return null;
    throw problem;
  }
}
