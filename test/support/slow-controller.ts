/** A controller's settings, as the site file names them. */
export interface SlowControl {
  mode: 'nearestLevel' | 'oneByOne';
  responseRatio: number;
  stepDelayS: number;
  reconnectDelayS: number;
  wear: 'even' | 'inOrder';
}

/** One valid interval as the controller sees it. */
export interface SlowInterval {
  beginS: number;
  /** Q − P⁺·tan φ of the set point [kvar] */
  wantedKvar: number;
  /** (U/U_nom)² */
  scale: number;
  standby: boolean;
}

/** One change of one stage. */
export interface SwitchingEvent {
  stage: number;
  atS: number;
  to: 'on' | 'off';
}

/** Protections that a control may take out, to see that a test would notice. */
export interface Sabotage {
  ignoreReconnectDelay?: boolean;
  ignoreStepDelay?: boolean;
  ignoreStandby?: boolean;
}

interface SlowStage {
  index: number;
  kvar: number;
  on: boolean;
  offSinceS: number;
  switchings: number;
}

/** The bank as switched by the slow controller. */
export interface SlowRun {
  connectedKvar: number[];
  switchings: number[];
  events: SwitchingEvent[];
}

/**
 * The controller read again from its description, one object a stage and every subset tried; slow and plain.
 * @param stagesKvar effective kvar of every switchable stage, at nominal voltage
 * @param control settings
 * @param intervals valid intervals in time order
 * @param options length of an interval [s], and what to sabotage
 * @returns connected kvar (nominal voltage), switchings per stage and every event
 */
export function slowController(
  stagesKvar: readonly number[],
  control: SlowControl,
  intervals: readonly SlowInterval[],
  options: { intervalS: number; sabotage?: Sabotage },
): SlowRun {
  const bank = new SlowBank(stagesKvar, control, options.intervalS, options.sabotage ?? {});
  const connectedKvar = intervals.map((interval) => {
    bank.pass(interval);
    return bank.connectedKvar();
  });
  return { connectedKvar, switchings: bank.stages.map((stage) => stage.switchings), events: bank.events };
}

class SlowBank {
  readonly stages: SlowStage[];
  readonly events: SwitchingEvent[] = [];
  readonly #control: SlowControl;
  readonly #smallestKvar: number;
  readonly #mostSwitchings: number;
  readonly #sabotage: Sabotage;

  constructor(stagesKvar: readonly number[], control: SlowControl, intervalS: number, sabotage: Sabotage) {
    this.stages = stagesKvar.map((kvar, index) => ({ index, kvar, on: false, offSinceS: -Infinity, switchings: 0 }));
    this.#control = control;
    this.#sabotage = sabotage;
    this.#smallestKvar = Math.min(...stagesKvar);
    const bound = control.stepDelayS === 0 ? Infinity : Math.max(1, Math.floor(intervalS / control.stepDelayS));
    this.#mostSwitchings = sabotage.ignoreStepDelay ? Infinity : bound;
  }

  connectedKvar(): number {
    return this.stages.filter((stage) => stage.on).reduce((sum, stage) => sum + stage.kvar, 0);
  }

  pass(interval: SlowInterval): void {
    if (this.stages.length === 0) return;
    if (interval.standby && !this.#sabotage.ignoreStandby) {
      for (const stage of this.stages.filter(({ on }) => on)) this.#change(stage, interval.beginS);
      return;
    }
    const d = interval.wantedKvar - this.connectedKvar() * interval.scale;
    if (Math.abs(d) <= this.#control.responseRatio * this.#smallestKvar) return;
    const wanted = this.#control.mode === 'nearestLevel' ? this.#nearest(interval) : this.#oneByOne(interval);
    this.#follow(wanted, interval.beginS);
  }

  #isFree(stage: SlowStage, beginS: number): boolean {
    if (stage.on) return false;
    return this.#sabotage.ignoreReconnectDelay || beginS >= stage.offSinceS + this.#control.reconnectDelayS;
  }

  // Every subset of stages that the interval could reach; then the rules of choice one after another.
  #nearest({ wantedKvar, scale, beginS }: SlowInterval): Map<number, number> {
    const tolerance = 1e-9 * this.#smallestKvar;
    let left: { on: boolean[]; d: number; changes: number; level: number }[] = [];
    for (let subset = 0; subset < 2 ** this.stages.length; subset++) {
      const on = this.stages.map((_, k) => Math.floor(subset / 2 ** k) % 2 === 1);
      if (this.stages.some((stage, k) => on[k] && !stage.on && !this.#isFree(stage, beginS))) continue;
      const changes = this.stages.filter((stage, k) => stage.on !== on[k]).length;
      if (changes > this.#mostSwitchings) continue;
      const level = this.stages.reduce((sum, stage, k) => sum + (on[k] ? stage.kvar * scale : 0), 0);
      left.push({ on, d: Math.abs(wantedKvar - level), changes, level });
    }
    const leastD = Math.min(...left.map(({ d }) => d));
    left = left.filter(({ d }) => d <= leastD + tolerance);
    const leastChanges = Math.min(...left.map(({ changes }) => changes));
    left = left.filter(({ changes }) => changes === leastChanges);
    const leastLevel = Math.min(...left.map(({ level }) => level));
    left = left.filter(({ level }) => level <= leastLevel + tolerance);
    const counts = left.map(({ on }) => this.#countsBySize((stage) => on[stage.index]!));
    return counts.reduce((first, other) => (comesBefore(other, first) ? other : first));
  }

  #countsBySize(isIn: (stage: SlowStage) => boolean): Map<number, number> {
    const counts = new Map<number, number>();
    for (const kvar of this.#sizes()) {
      counts.set(kvar, this.stages.filter((stage) => sameSize(stage.kvar, kvar) && isIn(stage)).length);
    }
    return counts;
  }

  // Largest first; sizes within 1e-9 are one.
  #sizes(): number[] {
    const sizes: number[] = [];
    for (const { kvar } of this.stages) if (!sizes.some((size) => sameSize(size, kvar))) sizes.push(kvar);
    return sizes.sort((a, b) => b - a);
  }

  #oneByOne({ wantedKvar, scale, beginS }: SlowInterval): Map<number, number> {
    const band = this.#control.responseRatio * this.#smallestKvar;
    const tolerance = 1e-9 * this.#smallestKvar;
    const before = this.#countsBySize((stage) => stage.on);
    const free = this.#countsBySize((stage) => this.#isFree(stage, beginS));
    const counts = new Map(before);
    // with no voltage a stage brings nothing nearer
    if (scale === 0) return counts;
    const d = (): number => wantedKvar - [...counts].reduce((sum, [kvar, count]) => sum + count * kvar * scale, 0);
    let changes = 0;
    while (d() > band && changes < this.#mostSwitchings) {
      const size = this.#sizes().find(
        (kvar) => counts.get(kvar)! - before.get(kvar)! < free.get(kvar)! && d() - kvar * scale >= -band - tolerance,
      );
      if (size === undefined) break;
      counts.set(size, counts.get(size)! + 1);
      changes++;
    }
    while (d() < -band && changes < this.#mostSwitchings) {
      const size = this.#sizes().find(
        (kvar) =>
          counts.get(kvar)! > 0 && counts.get(kvar)! <= before.get(kvar)! && d() + kvar * scale <= band + tolerance,
      );
      if (size === undefined) break;
      counts.set(size, counts.get(size)! - 1);
      changes++;
    }
    return counts;
  }

  #follow(counts: Map<number, number>, beginS: number): void {
    for (const [kvar, count] of counts) {
      const ofSize = (): SlowStage[] => this.stages.filter((stage) => sameSize(stage.kvar, kvar));
      const present = (): number => ofSize().filter(({ on }) => on).length;
      while (present() < count) this.#change(this.#toConnect(ofSize(), beginS), beginS);
      while (present() > count) this.#change(this.#toDisconnect(ofSize()), beginS);
    }
  }

  #toConnect(stages: SlowStage[], beginS: number): SlowStage {
    const free = stages.filter((stage) => this.#isFree(stage, beginS));
    if (this.#control.wear === 'inOrder') return free[0]!;
    const fewest = Math.min(...free.map(({ switchings }) => switchings));
    return free.find(({ switchings }) => switchings === fewest)!;
  }

  #toDisconnect(stages: SlowStage[]): SlowStage {
    const connected = stages.filter(({ on }) => on);
    if (this.#control.wear === 'inOrder') return connected[connected.length - 1]!;
    const most = Math.max(...connected.map(({ switchings }) => switchings));
    return connected.find(({ switchings }) => switchings === most)!;
  }

  #change(stage: SlowStage, atS: number): void {
    stage.on = !stage.on;
    stage.switchings++;
    if (!stage.on) stage.offSinceS = atS;
    this.events.push({ stage: stage.index, atS, to: stage.on ? 'on' : 'off' });
  }
}

function sameSize(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-9 * Math.max(a, b);
}

function comesBefore(a: Map<number, number>, b: Map<number, number>): boolean {
  for (const [kvar, count] of a) if (count !== b.get(kvar)) return count < b.get(kvar)!;
  return false;
}
