import { presentWeights, type SiteSearch, search, switchLife } from '#libs/engine/index.js';
import { buildTwin, type CTwin } from './c-twin.js';
import { ms } from './compare-twins.js';
import {
  SEARCH_CASES,
  type SearchCase,
  type SearchedWorks,
  searchByMoneyAlone,
  searchedWorks,
} from './searched-works.js';
import { median, timeNs } from './stopwatch.js';

/** How many times faster than the loop over every candidate a search is at least. */
const LEAST: Record<SearchCase, number> = {
  'kvarh beyond a ratio': 100,
  'wear decides': 40,
  'no lagging energy free': 5,
};
const ROUNDS = 3;
const RUNS = 7;
const NONE = Float64Array.of(0);
/** Values nearer than this are one value: the written order chooses among them. */
const NEAR_VALUE = 0.005;

/** The search for the bank that pays against a loop in C that simulates every candidate, the optimum of both the same. */
export function benchSearch(): boolean {
  const twin = buildTwin('search');
  try {
    return SEARCH_CASES.map((name) => benchCase(name, twin)).every((met) => met);
  } finally {
    twin?.remove();
  }
}

function benchCase(name: SearchCase, twin: CTwin | null): boolean {
  const works = searchedWorks(name);
  const made = searchByMoneyAlone(works);
  const title = `search of ${made.space.candidates} candidates, ${works.study.record.beginS.length} intervals, ${name}`;
  const input = twinInput(works, made);
  const [oursNs, twinNs]: [number[], number[]] = [[], []];
  for (let round = 0; round < ROUNDS; round++) {
    oursNs.push(timeNs(RUNS, () => bestOf(works)));
    if (twin === null) continue;
    const { ns, output } = twin.run(input, 1);
    twinNs.push(ns);
    insistSameOptimum(title, bestOf(works), output);
  }
  const ours = median(oursNs);
  if (twinNs.length === 0) {
    console.log(`${title}: ${ms(ours)}; no C compiler here, so no ratio`);
    return true;
  }
  const times = median(twinNs) / ours;
  const met = times >= LEAST[name];
  const said = `${times.toFixed(0)} times as fast, at least ${LEAST[name]}: ${met ? 'met' : 'MISSED'}`;
  console.log(`${title}: ${ms(ours)}, C over every candidate ${ms(median(twinNs))}; ${said}`);
  return met;
}

function bestOf(works: SearchedWorks): { npv: number; build: number; setPoint: number } {
  const { space, judge } = searchByMoneyAlone(works);
  const { best } = search(space, judge);
  if (best === null) throw new Error('a candidate pays or not, but there is one');
  return best;
}

function insistSameOptimum(title: string, ours: ReturnType<typeof bestOf>, output: Float64Array): void {
  const [npv, build, setPoint] = [output[0]!, output[1]!, output[2]!];
  const same = ours.build === build && ours.setPoint === setPoint;
  // the twin adds 35 040 intervals up as they come, ours by months and with what was lost
  if (Math.abs(ours.npv - npv) <= (same ? 1e-10 * Math.abs(npv) : NEAR_VALUE)) return;
  throw new Error(`${title}: ours ${ours.npv} (${ours.build}, ${ours.setPoint}), C ${npv} (${build}, ${setPoint})`);
}

/** What a candidate costs whatever it does, and a kvarh it is connected, as the worth of a bank that saves nothing. */
function costsOf(judge: SiteSearch['judge'], build: number): [certain: number, perKvarh: number] {
  const worth = (kvarh: number): number =>
    judge
      .worth(build, 0)
      .upperBound(
        { mostSaving: NONE, leastKvarh: Float64Array.of(kvarh), leastSwitchings: { after: () => 0 } },
        null,
        0,
      );
  return [-worth(0), worth(0) - worth(1)];
}

function twinInput({ site, study, money }: SearchedWorks, { space, judge }: SiteSearch): Float64Array {
  const { record } = study;
  const { months } = money.prepared.calendar;
  const weights = presentWeights(months, money.finance);
  const horizon = 12 * money.finance.horizonYears;
  const [clause] = site.tariff?.clauses ?? [];
  if (clause?.kind !== 'kvarhBeyondRatio') throw new Error('the loop in C knows one kind of clause');
  const [kind] = space.kinds;
  const price = site.prices?.switches?.[0];
  const lifeSwitchings = price?.lifeSwitchings ?? Number.POSITIVE_INFINITY;
  const sizes = [...space.stageKvar].reverse();
  const amounts = sizes.map((kvar) => switchLife(price, kvar, 1, site.prices?.replacementFactor ?? 1).amount);
  const head = [
    record.beginS.length,
    months.length,
    sizes.length,
    space.builds.length,
    space.setPoints.length,
    horizon,
  ];
  const control = [site.control?.responseRatio ?? 0.65, kind?.stepDelayS ?? 0, kind?.reconnectDelayS ?? 0];
  return Float64Array.from([
    ...head,
    ...control,
    record.intervalS,
    clause.freeRatio ?? 0,
    clause.pricePerUnit ?? 0,
    lifeSwitchings,
    ...months.map(({ from }) => from),
    record.beginS.length,
    ...weights.savingOfMonth,
    ...money.before.months.map(({ total }) => total),
    ...weights.replacementIn,
    ...space.setPoints.map((point) => Math.sqrt(1 / point ** 2 - 1)),
    // the bus has the rated voltage of the stages, so that what is rated is what is effective
    ...sizes,
    ...amounts,
    ...space.builds.flatMap(({ counts }, build) => [...[...counts].reverse(), ...costsOf(judge, build)]),
    ...record.beginS,
    ...record.activeKw,
    ...record.laggingKvar,
  ]);
}
