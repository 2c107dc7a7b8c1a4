import type { Site } from '#libs/engine/index.js';
import { chance } from './chance.js';
import { type MadeLoad, madeSite } from './outcome.js';
import { SEED } from './soak.js';

/** Names that break careless layouts: long, unbroken, of other scripts, with marks, quotes, markup and controls. */
const NAMES = [
  'Ostrava Casting, hall 7',
  'Łódź „Walcownia” – Ωμέγα & Söhne GmbH / Werk Süd-Ost',
  'Donaudampfschifffahrtselektrizitätenhauptbetriebswerkbauunterbeamtengesellschaft-Zweigniederlassung/Ybbs',
  'Завод «Ћирилица» №3, корпус 12',
  'Ελληνική Χαλυβουργία',
  '<b>Bold & "quoted" \\ (works)</b> {0} %s $1',
  'Cafe\u0301 Nai\u0308f, Çeşme İşletmesi',
  '  two   spaces,\ttabs and\r\nlines  ',
  'reversed \u202egnp.exe\u202c and hidden \u200b\u2060\ufeff marks',
  'φ ≥ 0.95 · √3 · 1\u202f250 kvar −15.4° µ Ω ² ₁ → €',
  'x'.repeat(180),
  'A name of very many words '.repeat(9).trim(),
  '工場 日本 (works) 한국',
  'שלום עולם Steel',
  '0',
];

const SPECTRA = [
  'six-pulse',
  'six-pulse-choke',
  'six-pulse-no-choke',
  'twelve-pulse',
  'active-front-end',
  'single-phase-electronic',
] as const;

/** A generated site with its load; the number chooses everything. */
export function generatedCase(number: number): { parts: Partial<Site>; load: MadeLoad } {
  const random = chance(SEED + number);
  const ieee = random.next() < 0.3;
  const nominalV = ieee ? random.oneOf([480, 600]) : random.oneOf([400, 415, 690]);
  const transformers = Array.from({ length: random.whole(0, 3) }, () => ({
    ratedKva: random.oneOf([400, 630, 1000, 1600]),
    impedancePct: random.oneOf([4, 5.75, 6]),
    ...(random.next() < 0.6 ? { loadLossKw: random.between(4, 14), noLoadLossKw: 1.1, noLoadCurrentPct: 0.9 } : {}),
  }));
  const meanKw = random.between(60, 320);
  const parts: Partial<Site> = {
    name: NAMES[number % NAMES.length]!,
    timeZone: random.oneOf(['Europe/Dublin', 'America/Chicago', 'Asia/Kolkata', 'UTC', 'Australia/Lord_Howe']),
    rules: ieee ? 'ieee' : 'iec',
    frequencyHz: ieee ? 60 : 50,
    bus: { nominalV, highestV: nominalV * random.between(1.02, 1.08) },
    meteredAt: transformers.length > 0 && random.next() < 0.4 ? 'primary' : 'bus',
    target: { powerFactor: random.oneOf([0.9, 0.92, 0.95, 0.98]) },
    supply: {
      faultLevelMva:
        transformers.length === 0
          ? { max: random.between(15, 30), min: 12 }
          : { max: random.between(150, 400), min: 120 },
      ...(transformers.length > 1 ? { arrangement: 'parallel' as const } : {}),
      transformers,
    },
    loads: loadsOf(random, number),
    ...(random.next() < 0.6 ? { bank: bankOf(random, nominalV) } : {}),
  };
  const load = {
    days: random.whole(9, 34),
    intervalS: random.oneOf([900, 1800]),
    meanKw,
    powerFactor: random.between(0.62, 0.97),
    missingShare: random.oneOf([0, 0, 0.03]),
    solarKw: number % 6 === 4 ? 2 * meanKw : 0,
    seed: number + 1,
  };
  return { parts: madeSite(parts), load };
}

type Random = ReturnType<typeof chance>;

function loadsOf(random: Random, number: number): Site['loads'] {
  if (random.next() < 0.15) return {};
  const distorting = Array.from({ length: random.whole(0, 5) }, (_, at) => ({
    name: at === 0 ? NAMES[(number + 5) % NAMES.length]! : `drive ${at + 1}`,
    fundamentalA: random.between(10, 260),
    spectrum: random.oneOf(SPECTRA),
  }));
  return {
    distorting,
    backgroundPct: random.next() < 0.5 ? [] : [{ orderH: 5, pct: random.between(0.3, 2) }],
    ...(random.next() < 0.5 ? { dampingKw: { max: random.between(20, 90), min: 0 } } : {}),
  };
}

function bankOf(random: Random, nominalV: number): NonNullable<Site['bank']> {
  const reactorPct = random.oneOf([0, 5.67, 7, 14]);
  const ratedV = nominalV * random.oneOf([1.1, 1.2, 1.25]);
  const sizes = [random.oneOf([6.25, 10, 12.5]), random.oneOf([20, 25, 50])];
  return {
    stages: sizes.map((ratedKvar, at) => ({
      count: random.whole(1, at === 0 ? 2 : 7),
      ratedKvar,
      ratedV: Math.round(ratedV),
      reactorPct,
      ...(random.next() < 0.3 ? { dischargeOhm: random.between(2e4, 4e5) } : {}),
      ...(random.next() < 0.3 ? { reactorMaxA: random.between(40, 120) } : {}),
    })),
    ...(random.next() < 0.5 ? { interStageUh: random.between(1, 8) } : {}),
  };
}
