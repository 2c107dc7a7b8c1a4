import type { MoneyStudy } from './money-study.js';
import type { Outcome } from './outcome.js';
import type { Study } from './study.js';

/** An outcome with what it was judged on, so that moving its inputs needn't study the site again. */
export interface JudgedOn {
  outcome: Outcome;
  study: Study;
  /** null without a tariff */
  money: MoneyStudy | null;
}
