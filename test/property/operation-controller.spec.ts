// Second method: the controller read again from its description (test/support/slow-controller.ts), one object a stage
// and every subset of stages tried, against the engine's simulation of the same generated records and banks.
import { describe, expect, it } from 'vitest';
import { type Control, type ControllerView, type SwitchedBank, simulate } from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { type Sabotage, type SlowControl, type SlowRun, slowController } from '../support/slow-controller.js';
import { runs, SEED } from '../support/soak.js';

const INTERVAL_S = 300;
const FIRST_S = 1_735_689_600;

interface Case {
  stagesKvar: number[];
  fixedKvar: number;
  control: SlowControl;
  wantedKvar: number[];
  slots: number[];
  voltageScale: number[] | null;
  standby: number[] | null;
}

// Whole and dyadic numbers make ties and exact thresholds common; the other half is uneven on purpose.
function madeCase(random: Chance): Case {
  const even = random.next() < 0.5;
  const sizes = even ? [8, 16, 32, 24] : [12.37, 25.11, 31.9, 50.003];
  const kinds = random.whole(1, 3);
  const chosen = Array.from({ length: kinds }, () => random.oneOf(sizes));
  const stagesKvar = Array.from({ length: random.whole(1, 7) }, () => random.oneOf(chosen));
  const control: SlowControl = {
    mode: random.oneOf(['nearestLevel', 'oneByOne']),
    responseRatio: even ? random.oneOf([0.5, 0.625, 0.75]) : random.oneOf([0.6, 0.65, 0.9, 0.3]),
    stepDelayS: random.oneOf([0, 10, 100, 150, 300, 900]),
    reconnectDelayS: random.oneOf([0, 60, 236.17, 300, 600, 1000]),
    wear: random.oneOf(['even', 'inOrder']),
  };
  const slots: number[] = [];
  for (let slot = 0; slots.length < 60; slot += random.next() < 0.1 ? random.whole(2, 5) : 1) slots.push(slot);
  const totalKvar = stagesKvar.reduce((sum, kvar) => sum + kvar, 0);
  let level = 0.4 * totalKvar;
  const wantedKvar = slots.map(() => {
    level += random.between(-0.5, 0.5) * totalKvar * (random.next() < 0.3 ? 1 : 0.1);
    level = Math.min(1.3 * totalKvar, Math.max(-0.3 * totalKvar, level));
    return even ? Math.round(level) : level;
  });
  return {
    stagesKvar,
    fixedKvar: random.next() < 0.2 ? 8 : 0,
    control,
    wantedKvar,
    slots,
    voltageScale:
      random.next() < 0.3 ? slots.map(() => (random.next() < 0.03 ? 0 : random.between(0.85, 1.1) ** 2)) : null,
    standby: random.next() < 0.3 ? slots.map(() => (random.next() < 0.15 ? 1 : 0)) : null,
  };
}

function bankOf({ stagesKvar, fixedKvar }: Case): SwitchedBank {
  const sizes = [...new Set(stagesKvar)].sort((a, b) => b - a);
  return {
    stageCount: stagesKvar.length,
    classes: sizes.map((kvar) => ({
      kvar,
      stages: Int32Array.from(stagesKvar.flatMap((other, k) => (other === kvar ? [k] : []))),
    })),
    fixedKvar,
    smallestKvar: sizes[sizes.length - 1]!,
  };
}

function viewOf({ slots, wantedKvar, voltageScale, standby }: Case): ControllerView {
  return {
    intervalS: INTERVAL_S,
    beginS: Float64Array.from(slots, (slot) => FIRST_S + slot * INTERVAL_S),
    wantedKvar: Float64Array.from(wantedKvar),
    voltageScale: voltageScale === null ? null : Float64Array.from(voltageScale),
    standby: standby === null ? null : Uint8Array.from(standby),
  };
}

function slowRun(made: Case, sabotage: Sabotage = {}): SlowRun {
  const intervals = made.slots.map((slot, i) => {
    const scale = made.voltageScale?.[i] ?? 1;
    // What is always in takes its share of what is wanted.
    const wantedKvar = made.wantedKvar[i]! - made.fixedKvar * scale;
    return { beginS: FIRST_S + slot * INTERVAL_S, wantedKvar, scale, standby: made.standby?.[i] === 1 };
  });
  return slowController(made.stagesKvar, made.control, intervals, { intervalS: INTERVAL_S, sabotage });
}

function differences(made: Case, sabotage: Sabotage = {}): string[] {
  const fast = simulate(bankOf(made), { setPointPowerFactor: 0.95, ...made.control } satisfies Control, viewOf(made));
  const slow = slowRun(made, sabotage);
  const found: string[] = [];
  slow.connectedKvar.forEach((kvar, i) => {
    const off = Math.abs(kvar + made.fixedKvar - fast.connectedKvar[i]!);
    if (off > 1e-9 * (1 + kvar)) found.push(`interval ${i}: ${fast.connectedKvar[i]} against ${kvar + made.fixedKvar}`);
  });
  if (String([...fast.switchings]) !== String(slow.switchings)) {
    found.push(`switchings ${[...fast.switchings]} against ${slow.switchings}`);
  }
  return found;
}

describe(`the controller against a plain second reading of its rules (seed ${SEED})`, () => {
  const cases = Array.from({ length: runs(400, 20_000) }, (_, k) => madeCase(chance(SEED + k)));

  it('connects the same kvar in every interval and switches every stage as often, in both modes', () => {
    for (const made of cases) expect(differences(made), JSON.stringify(made)).toEqual([]);
  });

  it('meets every rule often enough in these cases for a difference to show', () => {
    const traced = cases.map((made) => ({ made, run: slowRun(made) }));
    const count = (holds: (entry: (typeof traced)[number]) => boolean): number => traced.filter(holds).length;
    const share = cases.length / 40;
    for (const mode of ['nearestLevel', 'oneByOne'] as const) {
      expect(count(({ made, run }) => made.control.mode === mode && run.events.length > 5)).toBeGreaterThan(share * 5);
    }
    expect(count(({ made }) => new Set(made.stagesKvar).size > 1)).toBeGreaterThan(share);
    expect(count(({ made }) => made.control.reconnectDelayS > INTERVAL_S)).toBeGreaterThan(share);
    expect(count(({ made }) => made.control.stepDelayS > 100)).toBeGreaterThan(share);
    expect(count(({ made }) => made.standby?.includes(1) ?? false)).toBeGreaterThan(share);
    expect(count(({ made }) => made.voltageScale !== null)).toBeGreaterThan(share);
    expect(count(({ made }) => made.slots[59]! > 70)).toBeGreaterThan(share);
  });

  it.each([
    ['the reconnection delay', { ignoreReconnectDelay: true }],
    ['the delay between steps', { ignoreStepDelay: true }],
    ['the standby column', { ignoreStandby: true }],
  ] satisfies [string, Sabotage][])('control: a second method that ignores %s is told apart', (_, sabotage) => {
    const apart = cases.filter((made) => differences(made, sabotage).length > 0);
    expect(apart.length).toBeGreaterThan(cases.length / 100);
  });
});
