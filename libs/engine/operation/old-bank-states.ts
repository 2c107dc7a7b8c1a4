import { MOST_VECTORS } from '../layout/levels.js';
import { InputProblem } from '../problem.js';
import type { Control } from './control.js';
import type { SwitchedBank } from './switched-bank.js';

/** A metered value may be off by this share of the smallest stage: files are rounded. */
const SLACK_SHARE = 0.01;
/** Above this many vectors the bound on switchings an interval is left out, which only widens the range. */
const MOST_BOUNDED = 256;

/** What one interval tells of the old bank. */
export interface IntervalSeen {
  beginS: number;
  /** deviation the controller was left with, Q_net − P⁺·tan φ_set [kvar] */
  residualKvar: number;
  /** kvar one nominal kvar gives, (U/U_nom)² */
  scale: number;
  /** kvar the old bank gave lies between these, by what is known of the load [kvar] */
  leastGivenKvar: number;
  mostGivenKvar: number;
}

/**
 * The states of an old bank, before the first interval any of them.
 * @param bank the old bank as its controller saw it
 * @param control its settings
 * @param intervalS length of an interval [s]
 * @returns the states, to be taken through the record in time order
 * @throws InputProblem where there are more than 4 096 vectors
 * @source method-recorded-bank
 */
export function oldBankStates(bank: SwitchedBank, control: Control, intervalS: number): OldBankStates {
  const total = bank.classes.reduce((product, { stages }) => product * (stages.length + 1), 1);
  if (total > MOST_VECTORS) {
    const expected = `at most ${MOST_VECTORS} combinations of stages; give equal stages as one group with a count`;
    throw new InputProblem([{ code: 'too-many-levels', path: 'recordedBank.bank', expected, found: `${total}` }]);
  }
  return new OldBankStates(bank, control, intervalS, total);
}

/**
 * Which count vectors an old bank can stand at, interval by interval: never fewer than it can, so that the range holds.
 *
 * Vector w follows v, q the size of a stage, e the residual, b = a·q_min:
 * held, w = v, where |e| ≤ b; else gone to, where |e + (B_w − B_v)·s| > b, in at most the switchings an interval allows,
 * and nothing better was in reach: `nearestLevel`, −q⁻/2 ≤ e/s ≤ q⁺/2 with q⁻ the smallest connected and q⁺ the smallest
 * free stage; `oneByOne`, no connected q ≤ |e| + b where e < −b and no free q ≤ e + b where e > b. Where the bound on
 * switchings is used up, more may have been in reach. A stage is surely free where none of its size can have been
 * disconnected within the reconnection delay: none can while e > q/2 (`oneByOne`: b), since one disconnection fewer
 * would have come nearer.
 * @source method-recorded-bank
 */
export class OldBankStates {
  /** every level of the old bank, ascending [kvar] */
  readonly levelsKvar: Float64Array;
  readonly #bank: SwitchedBank;
  readonly #control: Control;
  readonly #bandKvar: number;
  readonly #slackKvar: number;
  /** connected stages, vector after vector, one a class */
  readonly #counts: Int32Array;
  readonly #kvar: Float64Array;
  readonly #down: Float64Array;
  readonly #up = new Map<number, Float64Array>();
  readonly #mostSwitchings: number;
  /** every stage off at the beginning of an interval is free in the next */
  readonly #alwaysFree: boolean;
  readonly #lastOffS: Float64Array;
  #possible: Uint8Array;
  #next: Uint8Array;
  #leastKvar = 0;
  #mostKvar = 0;

  /**
   * @param bank the old bank as its controller saw it
   * @param control its settings
   * @param intervalS length of an interval [s]
   * @param total count vectors
   */
  constructor(bank: SwitchedBank, control: Control, intervalS: number, total: number) {
    const classes = bank.classes.length;
    this.#bank = bank;
    this.#control = control;
    this.#bandKvar = control.responseRatio * bank.smallestKvar;
    this.#slackKvar = SLACK_SHARE * bank.smallestKvar;
    this.#counts = countsOf(bank, total);
    this.#kvar = new Float64Array(total).fill(bank.fixedKvar);
    this.#down = new Float64Array(total).fill(Number.POSITIVE_INFINITY);
    for (let w = 0; w < total; w++) {
      for (let c = 0; c < classes; c++) {
        const connected = this.#counts[w * classes + c]!;
        this.#kvar[w]! += connected * bank.classes[c]!.kvar;
        if (connected > 0) this.#down[w] = Math.min(this.#down[w]!, bank.classes[c]!.kvar);
      }
    }
    const switchable = bank.classes.reduce((sum, { stages }) => sum + stages.length, 0);
    const perInterval = Math.max(1, Math.floor(intervalS / control.stepDelayS));
    const bounded = control.stepDelayS > 0 && perInterval < switchable;
    this.#mostSwitchings = bounded ? perInterval : Number.POSITIVE_INFINITY;
    this.#alwaysFree = control.reconnectDelayS <= intervalS;
    this.#lastOffS = new Float64Array(classes);
    this.#possible = new Uint8Array(total).fill(1);
    this.#next = new Uint8Array(total);
    this.levelsKvar = Float64Array.from(new Set(this.#kvar)).sort();
    this.#span();
  }

  /**
   * Begins a record: any level, and any stage may have been disconnected just before.
   * @param beginS first moment [s]
   */
  begin(beginS: number): void {
    this.#lastOffS.fill(beginS);
    this.#possible.fill(1);
    this.#span();
  }

  /** least level that is possible now, at nominal voltage [kvar] */
  get leastKvar(): number {
    return this.#leastKvar;
  }

  /** greatest level that is possible now, at nominal voltage [kvar] */
  get mostKvar(): number {
    return this.#mostKvar;
  }

  /**
   * The bank is held off by a standby contact.
   * @param beginS moment [s]
   */
  holdOff(beginS: number): void {
    this.#lastOffS.fill(beginS);
    this.#possible.fill(0);
    this.#possible[0] = 1;
    this.#span();
  }

  /**
   * Goes on by one interval.
   * @param seen what the interval tells
   * @returns false where no level explains it; every level is possible then
   */
  next(seen: IntervalSeen): boolean {
    // On a dead bus every level is as far off, and nothing is switched.
    if (seen.scale === 0) return true;
    const up = this.#upGaps(seen.beginS);
    const next = this.#next;
    const held = Math.abs(seen.residualKvar) <= this.#bandKvar + this.#slackKvar;
    let any = 0;
    for (let w = 0; w < next.length; w++) {
      const can = this.#isKnown(w, seen) && ((held && this.#possible[w] === 1) || this.#isGoneTo(w, up[w]!, seen));
      next[w] = can ? 1 : 0;
      any |= next[w]!;
    }
    this.#noteDisconnections(seen);
    if (any === 0) next.fill(1);
    this.#next = this.#possible;
    this.#possible = next;
    this.#span();
    return any === 1;
  }

  #isKnown(w: number, { scale, leastGivenKvar, mostGivenKvar }: IntervalSeen): boolean {
    const given = this.#kvar[w]! * scale;
    return given >= leastGivenKvar - this.#slackKvar && given <= mostGivenKvar + this.#slackKvar;
  }

  #isGoneTo(w: number, upKvar: number, seen: IntervalSeen): boolean {
    const nearest = this.#isNearest(w, upKvar, seen);
    if (Number.isFinite(this.#mostSwitchings)) return this.#withinReach(w, nearest, seen);
    return nearest && this.#triggered(w, seen);
  }

  // Is nothing one stage away nearer.
  #isNearest(w: number, upKvar: number, { residualKvar, scale }: IntervalSeen): boolean {
    const slack = this.#slackKvar;
    const band = this.#bandKvar;
    const down = this.#down[w]! * scale;
    const up = upKvar * scale;
    if (this.#control.mode === 'nearestLevel')
      return residualKvar >= -down / 2 - slack && residualKvar <= up / 2 + slack;
    return residualKvar >= -Math.max(band, down - band) - slack && residualKvar <= Math.max(band, up - band) + slack;
  }

  // From some possible level the deviation passed the threshold: it fails only where all of them lie within it.
  #triggered(w: number, { residualKvar, scale }: IntervalSeen): boolean {
    const wanted = residualKvar + this.#kvar[w]! * scale;
    const band = this.#bandKvar - this.#slackKvar;
    return wanted - this.#leastKvar * scale > band || this.#mostKvar * scale - wanted > band;
  }

  #withinReach(w: number, nearest: boolean, seen: IntervalSeen): boolean {
    const total = this.#possible.length;
    if (total > MOST_BOUNDED) return this.#triggered(w, seen);
    const { residualKvar, scale } = seen;
    const wanted = residualKvar + this.#kvar[w]! * scale;
    const band = this.#bandKvar - this.#slackKvar;
    for (let v = 0; v < total; v++) {
      if (this.#possible[v] === 0 || !(Math.abs(wanted - this.#kvar[v]! * scale) > band)) continue;
      const changes = this.#changes(v, w);
      if (changes === this.#mostSwitchings || (changes < this.#mostSwitchings && nearest)) return true;
    }
    return false;
  }

  #changes(v: number, w: number): number {
    const classes = this.#bank.classes.length;
    let changes = 0;
    for (let c = 0; c < classes; c++)
      changes += Math.abs(this.#counts[v * classes + c]! - this.#counts[w * classes + c]!);
    return changes;
  }

  #noteDisconnections({ beginS, residualKvar, scale }: IntervalSeen): void {
    if (this.#alwaysFree) return;
    const nearest = this.#control.mode === 'nearestLevel';
    for (let c = 0; c < this.#lastOffS.length; c++) {
      const threshold = nearest ? (this.#bank.classes[c]!.kvar * scale) / 2 : this.#bandKvar;
      if (residualKvar <= threshold + this.#slackKvar) this.#lastOffS[c] = beginS;
    }
  }

  // Smallest stage per vector that is off and surely free.
  #upGaps(beginS: number): Float64Array {
    const { classes } = this.#bank;
    let mask = 0;
    for (let c = 0; c < classes.length; c++) {
      if (this.#alwaysFree || beginS >= this.#lastOffS[c]! + this.#control.reconnectDelayS) mask += 2 ** c;
    }
    const known = this.#up.get(mask);
    if (known !== undefined) return known;
    const gaps = new Float64Array(this.#possible.length).fill(Number.POSITIVE_INFINITY);
    for (let w = 0; w < gaps.length; w++) {
      for (const [c, { kvar, stages }] of classes.entries()) {
        const isFree = Math.floor(mask / 2 ** c) % 2 === 1;
        if (isFree && this.#counts[w * classes.length + c]! < stages.length) gaps[w] = Math.min(gaps[w]!, kvar);
      }
    }
    this.#up.set(mask, gaps);
    return gaps;
  }

  #span(): void {
    this.#leastKvar = Number.POSITIVE_INFINITY;
    this.#mostKvar = Number.NEGATIVE_INFINITY;
    for (let w = 0; w < this.#possible.length; w++) {
      if (this.#possible[w] === 0) continue;
      this.#leastKvar = Math.min(this.#leastKvar, this.#kvar[w]!);
      this.#mostKvar = Math.max(this.#mostKvar, this.#kvar[w]!);
    }
  }
}

// Vector 0 has every switchable stage off.
function countsOf(bank: SwitchedBank, total: number): Int32Array {
  const classes = bank.classes.length;
  const counts = new Int32Array(total * classes);
  for (let w = 0; w < total; w++) {
    let rest = w;
    for (let c = 0; c < classes; c++) {
      const size = bank.classes[c]!.stages.length + 1;
      counts[w * classes + c] = rest % size;
      rest = Math.floor(rest / size);
    }
  }
  return counts;
}
