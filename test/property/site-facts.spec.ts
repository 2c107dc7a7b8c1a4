// Devices, limits by edition, measurement and ageing on whole assessments of invented sites.
import { describe, expect, it } from 'vitest';
import { assessBank, type BankInput, planBank, type Result, type Site, UTC_TABLE } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

const record = madeRecord(driftingLoad(chance(SEED), 96, 300, 0.9));
const bank: BankInput = {
  stages: [
    { count: 2, ratedKvar: 25, ratedV: 480, reactorPct: 7 },
    { count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 },
  ],
};
const loads: Site['loads'] = {
  distorting: [{ name: 'drives', fundamentalA: 250, spectrum: 'six-pulse-choke' }],
  backgroundPct: [{ orderH: 5, pct: 1 }],
};

function assessed(parts: Partial<Site> = {}): Result {
  return assessBank(madeSite({ bank, loads, ...parts }), record, UTC_TABLE).result;
}

const plain = assessed();
const stateOf = (result: Result, device: string, group: number | null = null) =>
  result.devices.find((row) => row.device === device && row.group === group)?.state;
const codes = (result: Result) => result.reasons.map(({ code }) => code);

describe('the table of devices', () => {
  it('leaves verdict, duties and network as they are where nothing is entered', () => {
    expect(plain.devices.some(({ state }) => state === 'short')).toBe(false);
    expect(plain.devices.filter(({ state }) => state === 'open').length).toBeGreaterThan(15);
    expect(plain.verdict).toBe('clear');
  });

  it('has every device once a group or once for the bank', () => {
    const keys = plain.devices.map(({ device, group }) => `${device} ${group}`);
    expect(new Set(keys).size).toBe(keys.length);
  });

  it('asks each stage’s switch for its effective kvar, and its fuse for 1.6 to 2 times its rated current', () => {
    const kvar = plain.devices.find(({ device, group }) => device === 'switch.kvar' && group === 1)!;
    expect(kvar.least).toBeCloseTo(plain.bank.stages[2]!.effectiveKvar, 9);
    const fuse = plain.devices.find(({ device, group }) => device === 'fuse.rating' && group === 1)!;
    const ratedA = 50_000 / (Math.sqrt(3) * 480);
    expect([Number(fuse.least) / ratedA, Number(fuse.most) / ratedA].map((x) => x.toFixed(9))).toEqual([
      '1.600000000',
      '2.000000000',
    ]);
  });

  it('asks reactors for what they were judged at', () => {
    const duty = plain.duties.find(({ name, group }) => name === 'reactor current' && group === 1)!;
    const row = plain.devices.find(({ device, group }) => device === 'reactor.current' && group === 1)!;
    expect(row.least).toBeCloseTo(duty.value, 9);
  });

  it('counts the rise of the level on the capacitor: more than the duty by about Q/S_k', () => {
    const duty = plain.duties.find(({ name, group }) => name === 'capacitor voltage, highest' && group === 1)!;
    const row = plain.devices.find(({ device, group }) => device === 'capacitor.voltage' && group === 1)!;
    const rise = plain.bank.effectiveKvar / (plain.network.shortCircuitMinMva * 1000);
    expect(Number(row.value) / duty.value).toBeGreaterThan(1);
    expect(Number(row.value) / duty.value).toBeLessThanOrEqual(1 + rise + 1e-9);
  });

  it.each<[what: string, parts: Partial<BankInput>, device: string, verdict: string]>([
    [
      'a breaker that cannot break the fault current',
      { mainDevice: { breakingKa: 20 } },
      'mainDevice.breaking',
      'avoid',
    ],
    ['busbars that do not stand its peak', { mainDevice: { withstandKa: 40 } }, 'busbar.withstand', 'avoid'],
    ['a conductor under 1.43 times the current', { conductorA: 250 }, 'conductor.rating', 'avoid'],
    ['no over-pressure disconnection', { protection: { overPressure: false } }, 'protection.overPressure', 'watch'],
    ['an earthed star, which triplens flow through', { connection: 'earthedStar' }, 'capacitor.connection', 'watch'],
  ])('holds %s against the bank', (_what, parts, device, verdict) => {
    const result = assessed({ bank: { ...bank, ...parts } });
    expect(stateOf(result, device)).toBe('short');
    expect(result.verdict).toBe(verdict);
    expect(codes(result)).toContain(verdict === 'avoid' ? 'device.short' : 'device.shortByPractice');
  });

  it('would pass the breaker by the fault level of resonance, and the conductor by the bare current (control)', () => {
    const row = (device: string) => plain.devices.find((one) => one.device === device)!;
    const resonanceKa = plain.network.shortCircuitMva / (Math.sqrt(3) * 0.4);
    expect(resonanceKa).toBeLessThan(Number(row('mainDevice.breaking').least));
    const between = { breakingKa: (resonanceKa + Number(row('mainDevice.breaking').least)) / 2 };
    expect(assessed({ bank: { ...bank, mainDevice: between } }).verdict).toBe('avoid');
    expect(Number(row('conductor.rating').value)).toBeLessThan(250);
  });

  it('passes ratings that are enough', () => {
    const enough = assessed({
      bank: {
        ...bank,
        conductorA: 500,
        mainDevice: { ratedA: 500, settingA: 450, instantaneousA: 4000, breakingKa: 50, withstandKa: 105 },
        protection: { earthFault: true, overTemperature: true, overPressure: true, undervoltage: true },
        connection: 'delta',
      },
    });
    expect(enough.verdict).toBe('clear');
    expect(enough.devices.filter(({ state }) => state === 'short')).toEqual([]);
  });

  it.each([
    [{ ambientMaxC: 42, ambientDayC: 30 }, 'B', 'fits'],
    [{ ambientMaxC: 42, ambientDayC: 36 }, 'B', 'short'],
    [{ ambientMaxC: 40, ambientDayC: 30, ambientYearC: 20 }, 'A', 'fits'],
    [{ ambientMaxC: 40, ambientYearC: 21 }, 'A', 'short'],
    [{ ambientMaxC: 56 }, 'D', 'short'],
  ] as const)('holds the place %j against category %s: %s', (place, ambientCategory, state) => {
    const result = assessed({ place, bank: { ...bank, ambientCategory } });
    expect(stateOf(result, 'capacitor.ambient')).toBe(state);
  });

  it.each([
    [{ indoors: true, enclosureIp: 'IP31' }, 'fits'],
    [{ indoors: true, enclosureIp: 'IP54' }, 'fits'],
    [{ indoors: true, enclosureIp: 'IP3X' }, 'short'],
    [{ indoors: false, enclosureIp: 'IP31' }, 'short'],
    [{ indoors: false }, 'open'],
    [{ enclosureIp: 'IP54' }, 'open'],
  ] as const)('holds the enclosure %j: %s', (place, state) => {
    expect(stateOf(assessed({ place }), 'cabinet.enclosure')).toBe(state);
  });

  it('says whether a stage blocks the ripple signal', () => {
    const at = (rippleHz: number) => assessed({ supply: { ...madeSite().supply, rippleHz } });
    expect(stateOf(at(216.7), 'stage.ripple', 1)).toBe('fits'); // 189 Hz is under 0.9 · 216.7 = 195 Hz
    expect(stateOf(at(175), 'stage.ripple', 1)).toBe('noted'); // tuned above it: a capacitor for the signal
    expect(at(175).verdict).toBe(plain.verdict);
  });

  it('of a plan asks for everything: what the site’s own bank has says nothing of another', () => {
    const site = madeSite({ loads, bank: { ...bank, conductorA: 1, mainDevice: { breakingKa: 1 } } });
    const { result } = planBank(site, record, UTC_TABLE);
    expect(result.devices.filter(({ device }) => device.startsWith('mainDevice')).map(({ state }) => state)).toEqual(
      Array.from({ length: 4 }, () => 'open'),
    );
  });
});

describe('limits by edition', () => {
  it('are named with every figure they were held against', () => {
    const result = assessed({ limits: { edition: 'EN 50160:2010', own: { name: 'agreement', distortionPct: 1 } } });
    expect(result.limits).toMatchObject({
      voltage: 'EN 50160:2010 and agreement',
      points: ['main'],
      atCouplingPoint: true,
    });
    const row = result.duties.find(({ name }) => name === 'voltage distortion')!;
    expect([row.limit, row.source]).toEqual([1, 'EN 50160:2010 and agreement']);
    expect(row.verdict).not.toBe('clear');
  });

  it('judge what has a row: an own table without a total leaves the total unjudged', () => {
    const result = assessed({ limits: { edition: 'own', own: { voltage: [{ orderH: 7, pct: 5 }] } } });
    const rows = Object.fromEntries(result.duties.map((duty) => [duty.name, duty]));
    expect(rows['voltage distortion']).toMatchObject({ limit: null, ratio: null, verdict: null });
    expect(rows['harmonic voltage']).toMatchObject({ orderH: 7, limit: 5 });
  });

  it('say it where the point judged is not the point of coupling', () => {
    const result = assessed({ meteredAt: 'primary' });
    expect(result.limits).toMatchObject({ couplingPoint: 'primary', atCouplingPoint: false });
    expect(codes(result)).toContain('limits.notCouplingPoint');
    expect(codes(plain)).not.toContain('limits.notCouplingPoint');
  });

  it('with a current row of the site’s own hold the supply’s current under iec rules too', () => {
    const result = assessed({ limits: { own: { current: [{ orderH: 5, pct: 1 }] } } });
    const row = result.duties.find(({ name }) => name === 'harmonic current')!;
    expect(row).toMatchObject({ orderH: 5, limit: 1 });
    expect(row.ratio!).toBeGreaterThan(1);
  });
});

describe('a measurement', () => {
  const level = plain.network.levels.find(({ levelKvar, case: name }) => levelKvar === 0 && name === 'nominal')!;
  const read = (factor: number, extra: { orderH: number; pct: number }[] = []) => ({
    bankKvar: 0,
    voltagePct: [...level.orders.map(({ orderH, voltagePct }) => ({ orderH, pct: factor * voltagePct })), ...extra],
    currentA: level.orders.map(({ orderH, sourceA }) => ({ orderH, a: factor * sourceA })),
  });
  const measured = (given: ReturnType<typeof read>) => assessed({ loads: { ...loads, measured: given } });

  it('of what the model computes agrees with it in every row', () => {
    const { measured: check, verdict } = measured(read(1));
    expect(check!.rows).toHaveLength(2 * level.orders.length);
    for (const row of check!.rows) {
      expect(row.standing).toBe('within');
      expect(Math.abs(row.differencePct!)).toBeLessThan(1e-9);
    }
    expect(verdict).toBe('clear');
  });

  it('above every corner is a finding, and the verdict never better than near a limit', () => {
    const result = measured(read(3));
    expect(result.measured!.rows.some(({ standing }) => standing === 'above')).toBe(true);
    expect(codes(result)).toContain('measured.above');
    expect(result.verdict).toBe('watch');
  });

  it('of an order the model has nothing at is above it', () => {
    const result = measured(read(1, [{ orderH: 3, pct: 2 }]));
    expect(result.measured!.rows.find(({ orderH }) => orderH === 3)).toMatchObject({ computed: 0, standing: 'above' });
  });

  it('is never summed with the sources: whatever it reads, network and duties stay to the bit', () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(4, 40); k++) {
      const result = measured(
        read(
          random.between(0, 20),
          [{ orderH: random.whole(2, 49), pct: random.between(0, 9) }].filter(
            ({ orderH }) => !level.orders.some((order) => order.orderH === orderH),
          ),
        ),
      );
      expect(result.network).toEqual(plain.network);
      expect(result.duties).toEqual(plain.duties);
    }
  });

  it('would show in the network if it were summed (control)', () => {
    const more = [...loads!.distorting!, { name: 'as read', fundamentalA: 100, orders: [{ orderH: 5, pct: 20 }] }];
    expect(assessed({ loads: { ...loads, distorting: more } }).network).not.toEqual(plain.network);
  });

  it('with a bank in is compared at that level, and at no other', () => {
    const kvar = plain.bank.levelsKvar[2]!;
    const at = (bankKvar: number) => assessed({ loads: { ...loads, measured: { ...read(1), bankKvar } } });
    expect(at(kvar + 0.3).measured!.levelKvar).toBe(kvar);
    expect(at(kvar + 5).measured).toMatchObject({ levelKvar: null, rows: [] });
    expect(codes(at(kvar + 5))).toContain('measured.noLevel');
  });
});

describe('ageing', () => {
  it('moves ratio and tuned order with the capacitance: 7 % at 80 % left is order 4.23', () => {
    const { cases } = assessed({ bank: { ...bank, installed: true } }).ageing;
    expect(cases.map(({ group }) => group)).toEqual([null, 0, 1]);
    for (const aged of cases) {
      expect(aged.capacitanceFactor).toBe(0.8);
      expect(aged.reactorPct).toBeCloseTo(5.6, 9);
      expect(aged.tunedOrderH).toBeCloseTo(4.226, 3);
    }
  });

  it('takes 90 % for a new bank, and what was measured where it was', () => {
    expect(plain.ageing.cases.map(({ capacitanceFactor, from }) => [capacitanceFactor, from])).toEqual(
      Array.from({ length: 3 }, () => [0.9, 'new']),
    );
    const [first, second] = bank.stages as [BankInput['stages'][0], BankInput['stages'][0]];
    const nameplateUf = plain.charge.stages[1]!.capacitanceUf;
    const stages = [first, { ...second, measuredUf: 0.7 * nameplateUf }];
    const aged = assessed({ bank: { stages } }).ageing.cases[2]!;
    expect(aged).toMatchObject({ from: 'measured', group: 1 });
    expect(aged.capacitanceFactor).toBeCloseTo(0.7, 12);
  });

  it('leaves the verdict alone: it stands beside the corners, not among them', () => {
    const { installed, ...result } = { installed: assessed({ bank: { ...bank, installed: true } }), ...plain };
    expect(installed.verdict).toBe(result.verdict);
    expect(installed.duties).toEqual(result.duties);
  });

  // Second method: the aged bank written out as a site of its own and assessed whole.
  it('finds the capacitance at which a stage must come out: worse just below it, as it was just above', () => {
    const { stages } = plain.ageing;
    const verdictAt = (pct: number): string => {
      const [first, second] = bank.stages as [BankInput['stages'][0], BankInput['stages'][0]];
      const left = { ...second, count: 1, ratedKvar: (second.ratedKvar * pct) / 100, reactorPct: (7 * pct) / 100 };
      const { duties } = assessed({ bank: { stages: [first, { ...second, count: 2 }, left], interStageUh: 2 } });
      return duties.some(({ verdict }) => verdict === 'avoid' || verdict === 'watch') ? 'worse' : 'clear';
    };
    const { comesOutPct, comesOutUf } = stages[1]!;
    expect(comesOutPct).not.toBeNull();
    expect(verdictAt(comesOutPct! + 0.05)).toBe('clear');
    expect(verdictAt(comesOutPct! - 0.05)).toBe('worse');
    expect(comesOutUf! / plain.charge.stages[1]!.capacitanceUf).toBeCloseTo(comesOutPct! / 100, 12);
  });

  it('tells of a stage that was measured below that', () => {
    const [first, second] = bank.stages as [BankInput['stages'][0], BankInput['stages'][0]];
    const atPct = (pct: number) => {
      const measuredUf = (plain.charge.stages[1]!.capacitanceUf * pct) / 100;
      return codes(assessed({ bank: { stages: [first, { ...second, measuredUf }] } }));
    };
    expect(atPct(plain.ageing.stages[1]!.comesOutPct! - 1)).toContain('ageing.takeOut');
    expect(atPct(plain.ageing.stages[1]!.comesOutPct! + 1)).not.toContain('ageing.takeOut');
  });
});
