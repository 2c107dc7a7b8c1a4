import type { Corner } from '../network/corners.js';
import { WORSE_SHARE } from '../network/network-check.js';
import { graver, type Verdict } from './rules.js';

/** What a part or the network carries, beside its limit. */
export interface Duty {
  name: string;
  /** entry of `bank.stages`, null for the bank as a whole */
  group: number | null;
  value: number;
  limit: number | null;
  unit: string;
  ratio: number | null;
  levelKvar: number | null;
  corner: Corner | null;
  orderH: number | null;
  /** bus, in a network of several */
  bus?: string;
  /** name of the network's own capacitors, where the row is about those */
  capacitors?: string;
  source: string;
  /** null: not judged */
  verdict: Verdict | null;
}

/** A ratio above this exceeds its limit. */
export const EXCEEDED_RATIO = 1 + 1e-9;

/** Share of a limit from which a duty is near it: voltages, and everything else. */
export const NEAR_RATIO = { voltage: 0.95, other: 0.8 } as const;

/** A limit exceeded without the bank already counts against the bank only beyond this share of the limit. */
export const BASELINE_SHARE = 0.01;

/** Where a value was met. */
export interface Place {
  levelKvar: number | null;
  corner: Corner | null;
  orderH: number | null;
  /** bus, in a network of several */
  bus?: string;
}

/** What a row is about. */
export interface DutyHead {
  name: string;
  group: number | null;
  unit: string;
  source: string;
  nearRatio: number;
}

/**
 * Verdict of one value against one limit, network baseline left out.
 * @param ratio value/limit
 * @param nearRatio share from which it is near the limit
 * @returns clear, watch or avoid
 * @source method-limits
 */
export function ratioVerdict(ratio: number, nearRatio: number): Verdict {
  if (ratio > EXCEEDED_RATIO) return 'avoid';
  return ratio > nearRatio ? 'watch' : 'clear';
}

/** One row of the duties: keeps the largest ratio met and the worst verdict met anywhere. */
export class DutyRow {
  readonly head: DutyHead;
  #worst: { value: number; limit: number | null; ratio: number | null; place: Place } | null = null;
  #verdict: Verdict | null = null;
  /** a ratio beyond this is the worst so far */
  #leastKept = -1;

  /** @param head name, group, unit, source and threshold of the row */
  constructor(head: DutyHead) {
    this.head = head;
  }

  /**
   * Takes a value with a limit.
   * @param value in the row's unit
   * @param limit in the row's unit, > 0
   * @param place where it was met
   * @param judge verdict of a ratio; the row's own threshold where absent
   */
  take(value: number, limit: number, place: Place, judge?: (ratio: number) => Verdict): void {
    const ratio = value / limit;
    const verdict = judge === undefined ? ratioVerdict(ratio, this.head.nearRatio) : judge(ratio);
    if (this.counts(ratio, verdict)) this.keep(value, limit, place);
  }

  /**
   * Counts a verdict. Apart from `keep`, so that a place is made up only for what is kept: rows are met at every flow.
   * @param ratio value/limit
   * @param verdict of the value
   * @returns true where the ratio is the largest so far, and `keep` is to follow
   */
  counts(ratio: number, verdict: Verdict): boolean {
    if (verdict !== this.#verdict) this.#verdict = this.#verdict === null ? verdict : graver(this.#verdict, verdict);
    return ratio > this.#leastKept;
  }

  /**
   * Keeps a value as the worst so far.
   * @param value in the row's unit
   * @param limit in the row's unit, > 0
   * @param place where it was met
   */
  keep(value: number, limit: number, place: Place): void {
    const ratio = value / limit;
    this.#worst = { value, limit, ratio, place };
    this.#leastKept = ratio * (1 + WORSE_SHARE);
  }

  /**
   * Takes a value whose limit is unknown: shown, not judged.
   * @param value in the row's unit
   * @param place where it was met
   */
  takeUnjudged(value: number, place: Place): void {
    if (this.isMost(value)) this.#worst = { value, limit: null, ratio: null, place };
  }

  /**
   * @param value in the row's unit
   * @returns true where it is the largest so far of a row that isn't judged
   */
  isMost(value: number): boolean {
    return this.#worst === null || value > this.#worst.value * (1 + WORSE_SHARE);
  }

  /** @returns the row, or null where nothing was taken */
  duty(): Duty | null {
    if (this.#worst === null) return null;
    const { value, limit, ratio, place } = this.#worst;
    const { name, group, unit, source } = this.head;
    return { name, group, value, limit, unit, ratio, ...place, source, verdict: this.#verdict };
  }
}
