import { demoLoad } from '#apps/server/demo/demo-load.js';
import { DEMO_SITE } from '#apps/server/demo/demo-site.js';

// biome-ignore lint/suspicious/noExplicitAny: a site file as somebody typed it
type Typed = any;

/** One slip in an otherwise sound job: in the site file, in the meter file, or in what is said about it. */
export interface PlantedFault {
  what: string;
  site?: (site: Typed) => void;
  rows?: (rows: Row[]) => Row[];
  header?: string;
  /** code of the finding, or code and path of the refusal, that names the matter */
  code: string;
}

/** A line of the meter file. */
export interface Row {
  stamp: string;
  kw: number;
  kvar: number;
}

export const HEADER = 'begin,active (kW),reactive (kvar)';

/** The example's load, a row a quarter of an hour. */
export const DEMO_ROWS: readonly Row[] = [...demoLoad()].slice(1).map((line) => {
  const [stamp, kw, kvar] = line.trim().split(',');
  return { stamp: stamp!, kw: Number(kw), kvar: Number(kvar) };
});

/** The kWh of two months, to the whole number that a bill prints. */
const BILLS = ['2025-01', '2025-07'].map((month) => {
  const rows = DEMO_ROWS.filter(({ stamp }) => stamp.startsWith(month));
  const kwh = (of: 'kw' | 'kvar') => Math.round(rows.reduce((sum, row) => sum + row[of] / 4, 0));
  return { month, activeKwh: kwh('kw'), laggingKvarh: kwh('kvar'), maxKw: Math.max(...rows.map(({ kw }) => kw)) };
});

/** The example with a bank that is within its limits, its current transformer, its resistors and two bills entered. */
export function soundSite(): Typed {
  return structuredClone({
    ...DEMO_SITE,
    asOf: '2026-01-31',
    estimate: { bills: BILLS },
    bank: {
      stages: [
        { count: 1, ratedKvar: 25, ratedV: 480, reactorPct: 7, dischargeOhm: 120_000, reactorMaxA: 60 },
        { count: 5, ratedKvar: 50, ratedV: 480, reactorPct: 7, dischargeOhm: 60_000, reactorMaxA: 120 },
      ],
      interStageUh: 2,
    },
    control: {
      setPointPowerFactor: 0.98,
      stepDelayS: 10,
      reconnectDelayS: 240,
      currentTransformer: { place: 'incomer', ratioPrimaryA: 1500, ratioSecondaryA: 5, sensitivityA: 0.02 },
    },
  });
}

const scaled = (factor: number) => (rows: Row[]) =>
  rows.map(({ stamp, kw, kvar }) => ({ stamp, kw: kw * factor, kvar: kvar * factor }));

export const PLANTED: readonly PlantedFault[] = [
  { what: 'watts under a header of kW', rows: scaled(1000), code: 'record.aboveRating' },
  { what: 'energies of a quarter of an hour under a header of kW', rows: scaled(1 / 4), code: 'loads.aboveRecord' },
  {
    what: 'columns of kW and kvar exchanged',
    header: 'begin,reactive (kvar),active (kW)',
    code: 'record.moreKvarhThanKwh',
  },
  {
    what: 'the sign of kvar turned round',
    rows: (rows) => rows.map((row) => ({ ...row, kvar: -row.kvar })),
    code: 'sign.leadsByDay',
  },
  { what: 'a season missing', rows: (rows) => rows.slice(0, 24_000), code: 'record.partYear' },
  {
    what: 'an hour that stands twice, with other values',
    rows: (rows) => rows.flatMap((row, at) => (at >= 5000 && at < 5004 ? [row, { ...row, kw: row.kw * 1.3 }] : [row])),
    code: 'question',
  },
  {
    what: 'the meter’s multiplier counted twice from June on',
    rows: (rows) => rows.map((row, at) => (at < 14_500 ? row : { ...row, kw: row.kw * 2, kvar: row.kvar * 2 })),
    code: 'sign.stepKw',
  },
  { what: 'the record of another, smaller site', rows: scaled(0.12), code: 'loads.aboveRecord' },
  { what: 'limits of another edition', site: (site) => (site.rules = 'ieee'), code: 'site.rulesUnusual' },
  {
    what: 'a short-circuit impedance of 0.6 for 6 %',
    site: (site) => (site.supply.transformers[0].impedancePct = 0.6),
    code: 'inconsistent supply.transformers[0].loadLossKw',
  },
  {
    what: 'a transformer rated ten times as much',
    site: (site) => (site.supply.transformers[0].ratedKva = 10_000),
    code: 'supply.ratingUnusual',
  },
  {
    what: 'load loss and no-load loss exchanged',
    site: (site) => Object.assign(site.supply.transformers[0], { loadLossKw: 1.7, noLoadLossKw: 10.5 }),
    code: 'supply.lossesUnusual',
  },
  {
    what: 'a fault level in kA taken for MVA',
    site: (site) => (site.supply.faultLevelMva = { max: 14.4, min: 10.4 }),
    code: 'supply.faultLevelLow',
  },
  { what: 'the transformer left out', site: (site) => (site.supply.transformers = []), code: 'supply.busFaultUnusual' },
  { what: 'prices of last year', site: (site) => (site.asOf = '2027-01-31'), code: 'prices.outOfDate' },
  {
    what: 'a gap between tariff windows',
    site: (site) => (site.tariff.windows[0].hours = [[9, 23]]),
    code: 'inconsistent tariff.clauses[1].prices',
  },
  {
    what: 'the kvar of a stage at the voltage of the bus',
    site: (site) => (site.bank.stages[1].ratedV = 400),
    code: 'limit.exceeded',
  },
  {
    what: 'a ratio of 150/5 for 1500/5',
    site: (site) => (site.control.currentTransformer.ratioPrimaryA = 150),
    code: 'currentTransformer.unusual',
  },
  { what: 'the meter’s ratio taken once and a half', rows: scaled(1.5), code: 'record.unlikeBills' },
  {
    what: 'the target of another tariff, 0.90',
    site: (site) => (site.target.powerFactor = 0.9),
    code: 'target.belowTariff',
  },
];
