// A record taken with a bank switching, made by simulating one on a known load, turned back: the load lies in the range.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  type Control,
  type LoadRecord,
  type MeteredWithBank,
  type Site,
  type SwitchedBank,
  simulate,
  type TurnedBack,
  turnBack,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

interface Made {
  bank: SwitchedBank;
  control: Control;
  metered: MeteredWithBank;
  /** the load's own [kvar], and what the bank gave */
  ownKvar: Float64Array;
  givenKvar: Float64Array;
}

const N = 200;

function made(random: Chance): Made {
  const sizes = [50, 25, 12.5].slice(0, random.whole(1, 3));
  const counts = sizes.map(() => random.whole(1, 4));
  let index = 0;
  const bank: SwitchedBank = {
    stageCount: counts.reduce((sum, count) => sum + count, 0),
    classes: sizes.map((kvar, c) => ({ kvar, stages: Int32Array.from({ length: counts[c]! }, () => index++) })),
    fixedKvar: random.oneOf([0, 0, 20]),
    smallestKvar: sizes[sizes.length - 1]!,
  };
  const control: Control = {
    setPointPowerFactor: random.oneOf([0.95, 0.97, 1]),
    mode: random.oneOf(['nearestLevel', 'oneByOne']),
    responseRatio: random.oneOf([0.5, 0.65, 0.9]),
    stepDelayS: random.oneOf([0, 10, 60, 300]),
    reconnectDelayS: random.oneOf([0, 60, 236, 900]),
    wear: 'even',
  };
  const tanSet = Math.sqrt(1 / control.setPointPowerFactor ** 2 - 1);
  const intervalS = random.oneOf([60, 300, 900]);
  const totalKvar = bank.fixedKvar + sizes.reduce((sum, kvar, c) => sum + kvar * counts[c]!, 0);
  const { activeKw, reactiveKvar } = driftingLoad(random, N, totalKvar * random.between(0.6, 2), 0.8);
  const voltageScale =
    random.next() < 0.3
      ? Float64Array.from(activeKw, () => (random.next() < 0.02 ? 0 : random.between(0.9, 1.1)))
      : null;
  const standby = random.next() < 0.3 ? Uint8Array.from(activeKw, () => (random.next() < 0.1 ? 1 : 0)) : null;
  const slots = activeKw.map((_, i) => i + (i > 90 ? 3 : 0));
  const beginS = Float64Array.from(slots, (slot) => 1_735_689_600 + slot * intervalS);
  const wantedKvar = Float64Array.from(reactiveKvar, (q, i) => q - activeKw[i]! * tanSet);
  const run = simulate(bank, control, { intervalS, beginS, wantedKvar, voltageScale, standby });
  const givenKvar = run.connectedKvar.map((kvar, i) => kvar * (voltageScale?.[i] ?? 1));
  const ownKvar = Float64Array.from(reactiveKvar);
  const metered: MeteredWithBank = {
    intervalS,
    beginS,
    targetKw: Float64Array.from(activeKw),
    netKvar: ownKvar.map((q, i) => q - givenKvar[i]!),
    tanSet,
    loadTan: null,
    voltageScale,
    standby,
  };
  return { bank, control, metered, ownKvar, givenKvar };
}

function outside(turned: TurnedBack, givenKvar: Float64Array): number {
  let count = 0;
  for (let i = 0; i < givenKvar.length; i++) {
    const width = 1e-6 * (1 + givenKvar[i]!);
    if (givenKvar[i]! < turned.lowKvar[i]! - width || givenKvar[i]! > turned.highKvar[i]! + width) count++;
  }
  return count;
}

describe('a record taken with a bank switching', () => {
  it(`turned back holds the load in its range, whatever the bank and its settings (seed ${SEED})`, () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(150, 3000); k++) {
      const { bank, control, metered, givenKvar } = made(random);
      const turned = turnBack(bank, control, metered);
      expect({ k, outside: outside(turned, givenKvar), unexplained: turned.unexplained }).toEqual({
        k,
        outside: 0,
        unexplained: 0,
      });
      for (let i = 0; i < N; i++) {
        expect(turned.kvar[i]!).toBeGreaterThanOrEqual(turned.lowKvar[i]! - 1e-9);
        expect(turned.kvar[i]!).toBeLessThanOrEqual(turned.highKvar[i]! + 1e-9);
      }
    }
  });

  it('with a nameplate or a set point that is not the bank’s does not (control)', () => {
    const random = chance(SEED + 1);
    let wrong = 0;
    let tried = 0;
    for (let k = 0; k < 60; k++) {
      const { bank, control, metered, givenKvar } = made(random);
      const half: SwitchedBank = {
        ...bank,
        classes: bank.classes.map(({ kvar, stages }) => ({ kvar: kvar / 2, stages })),
        fixedKvar: bank.fixedKvar / 2,
        smallestKvar: bank.smallestKvar / 2,
      };
      const other = { ...metered, tanSet: metered.tanSet + 1.5 };
      for (const turned of [turnBack(half, control, metered), turnBack(bank, control, other)]) {
        tried++;
        if (outside(turned, givenKvar) + turned.unexplained > 0) wrong++;
      }
    }
    // A few records stay within every level of either.
    expect(wrong).toBeGreaterThan(0.75 * tried);
  });

  it('is narrower, and still holds the load, where its own power factor is known', () => {
    const random = chance(SEED + 2);
    let open = 0;
    let narrowed = 0;
    let off = 0;
    for (let k = 0; k < 60; k++) {
      const { bank, control, metered, givenKvar, ownKvar } = made(random);
      const tans = ownKvar.map((q, i) => q / metered.targetKw[i]!);
      const loadTan = { least: Math.min(...tans), most: Math.max(...tans) };
      const free = turnBack(bank, control, metered);
      const turned = turnBack(bank, control, { ...metered, loadTan });
      expect(outside(turned, givenKvar)).toBe(0);
      for (let i = 0; i < N; i++) {
        open += free.highKvar[i]! - free.lowKvar[i]!;
        narrowed += turned.highKvar[i]! - turned.lowKvar[i]!;
        off += Math.abs(turned.kvar[i]! - givenKvar[i]!);
      }
    }
    expect(narrowed).toBeLessThan(0.6 * open);
    // What is taken lies nearer than the width of the range, and than nothing at all.
    expect(off).toBeLessThan(0.5 * narrowed);
  });
});

/** A drifting load, and what its meter reads with the bank of a site in. */
function withOldBank(site: Site): { own: LoadRecord; metered: LoadRecord } {
  const load = driftingLoad(chance(SEED), 672, 400, 0.85);
  const own = madeRecord(load);
  const { series } = assessBank(site, own, UTC_TABLE);
  const reactiveKvar = load.reactiveKvar.map((q, i) => q - series.connectedKvar[i]!);
  return { own, metered: madeRecord({ activeKw: load.activeKw, reactiveKvar }) };
}

describe('a site whose record was taken with its own bank switching', () => {
  const bank = { stages: [{ count: 4, ratedKvar: 50, ratedV: 400 }], installed: true };
  const site = madeSite({ bank });
  const { own, metered } = withOldBank(site);
  const plain = assessBank(site, own, UTC_TABLE).result;

  it('is judged on the load’s own need, between the ends of its range', () => {
    const switching = { state: 'switching' as const, loadPowerFactor: { min: 0.68, max: 0.85 } };
    const { result } = assessBank(madeSite({ bank, recordedBank: switching }), metered, UTC_TABLE);
    const { recordedBank } = result;
    expect(recordedBank!.unexplained).toBe(0);
    expect(recordedBank!.maxNeedLowKvar).toBeLessThanOrEqual(plain.requirement.maxKvar + 1e-6);
    expect(recordedBank!.maxNeedHighKvar).toBeGreaterThanOrEqual(plain.requirement.maxKvar - 1e-6);
    expect(Math.abs(result.requirement.meanKvar - plain.requirement.meanKvar)).toBeLessThan(12.5);
    expect(result.record.laggingKvarh).toBeLessThan(plain.record.laggingKvarh);
    expect(result.reasons.map(({ code }) => code)).toContain('recordedBank.turnedBack');
  });

  it('taken for the load itself needs less than it does (control)', () => {
    const { result } = assessBank(site, metered, UTC_TABLE);
    expect(result.requirement.meanKvar).toBeLessThan(0.5 * plain.requirement.meanKvar);
    expect(result.recordedBank).toBeNull();
  });

  it('may name another bank than the one that is judged, and the same one twice makes no difference', () => {
    const control = { setPointPowerFactor: 0.95 };
    const named = assessBank(
      madeSite({ bank, recordedBank: { state: 'switching', bank, control } }),
      metered,
      UTC_TABLE,
    ).result;
    const own = assessBank(madeSite({ bank, recordedBank: { state: 'switching' } }), metered, UTC_TABLE).result;
    expect(named.requirement).toEqual(own.requirement);
    const smaller = { stages: [{ count: 1, ratedKvar: 25, ratedV: 400 }] };
    const other = assessBank(
      madeSite({ bank: smaller, recordedBank: { state: 'switching', bank } }),
      metered,
      UTC_TABLE,
    );
    expect(other.result.requirement).toEqual(own.requirement);
    expect(other.result.bank.effectiveKvar).toBeCloseTo(25, 9);
  });
});
