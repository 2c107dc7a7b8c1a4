/// <reference lib="webworker" />
import { zoneTableOf } from '#libs/contract/time-zone.js';
import { createLoadRecord, InputProblem, type Outcome, type Site, withRobustness } from '#libs/engine/index.js';
import { findings } from '#libs/present/findings.js';
import { proposedWords } from '#libs/present/proposed-words.js';
import { putInWords } from '#libs/present/put-in-words.js';
import { takeReadersMark } from '../readers-mark.js';
import { fullLook, type Looked, quickLook } from './compute-look.js';
import type { DeskAnswered, DeskAsked, Look, LookAsked, Trace } from './look.js';
import { stationCharts } from './station-charts.js';
import { StudyCache } from './study-cache.js';

/** Columns as the API sends them. */
interface ColumnsSent {
  beginS: number[];
  activeKw: number[];
  laggingKvar: number[];
  leadingKvar: number[];
  voltageV?: number[];
  connectedKvar?: number[];
  standby?: number[];
}

takeReadersMark();

const scope = self as unknown as DedicatedWorkerGlobalScope;
let cache: StudyCache | null = null;
let last: Outcome | null = null;
/** what was looked at last, so that another station or another day needs no new simulation */
let memo: { text: string; depth: Look['depth']; looked: Looked } | null = null;

scope.onmessage = async ({ data }: MessageEvent<DeskAsked>) => {
  const { ticket } = data;
  try {
    scope.postMessage(await answerOf(data));
  } catch (error) {
    const answer: DeskAnswered =
      error instanceof InputProblem
        ? { ticket, problems: error.problems }
        : { ticket, fault: error instanceof Error ? error.message : String(error) };
    scope.postMessage(answer);
  }
};

async function answerOf(asked: DeskAsked): Promise<DeskAnswered> {
  const { ticket } = asked;
  switch (asked.ask) {
    case 'open':
      [cache] = await Promise.all([openRecord(asked), schemas()]);
      last = null;
      memo = null;
      return { ticket, opened: true };
    case 'look':
      return { ticket, look: await look(opened(), asked.look) };
    case 'firm': {
      const { outcome } = fullLook(opened(), await read(asked.look));
      const { assumptions, reactorTrials, robustness, money } = putInWords(withRobustness(outcome).result);
      return { ticket, firm: { assumptions, reactorTrials, robustness, money } };
    }
    case 'warm':
      await warmUp(opened(), asked.look);
      return { ticket, warm: true };
    case 'trace':
      return { ticket, trace: traceOf(opened()) };
  }
}

function opened(): StudyCache {
  if (cache === null) throw new Error('no record is open');
  return cache;
}

async function openRecord({ columnsUrl, summary, timeZone }: Extract<DeskAsked, { ask: 'open' }>): Promise<StudyCache> {
  const response = await fetch(columnsUrl).catch(() => null);
  if (response === null) throw new Error('The record did not come. It is asked for again.');
  if (!response.ok) throw new Error(`The record did not come (${response.status}). It is asked for again.`);
  const sent = (await response.json()) as ColumnsSent;
  const column = (values: number[] | undefined) => (values === undefined ? null : Float64Array.from(values));
  const record = createLoadRecord({
    intervalS: summary.intervalS,
    beginS: Float64Array.from(sent.beginS),
    activeKw: Float64Array.from(sent.activeKw),
    laggingKvar: Float64Array.from(sent.laggingKvar),
    leadingKvar: Float64Array.from(sent.leadingKvar),
    voltageV: column(sent.voltageV),
    connectedKvar: column(sent.connectedKvar),
    standby: sent.standby === undefined ? null : Uint8Array.from(sent.standby),
    repaired: summary.repaired,
    duplicates: summary.duplicates,
    notes: summary.notes,
  });
  return new StudyCache(record, zoneTableOf(timeZone, record));
}

/** The schemas come beside the record: a desk that is open needs no connection any more. */
const schemas = () => import('#libs/contract/read-site.js');

async function read({ document }: LookAsked): Promise<Site> {
  const { readSite } = await schemas();
  return readSite(document);
}

async function look(studies: StudyCache, asked: LookAsked): Promise<Look> {
  const text = JSON.stringify(asked.document);
  const isKnown = memo !== null && memo.text === text && (memo.depth === 'full' || asked.depth === 'quick');
  const site = isKnown ? null : await read(asked);
  const fromMs = performance.now();
  if (site !== null) memo = { text, ...judged(studies, site, asked.depth) };
  const { looked, depth } = memo!;
  const { outcome, study } = looked;
  return {
    depth,
    result: outcome.result,
    proposed: proposedWords({ ...outcome, kind: asked.kind }),
    findings: findings(outcome),
    highestV: outcome.site.highestV,
    charts: stationCharts(looked, asked.station, asked.picks, () => studies.sweep(study)),
    tookMs: performance.now() - fromMs,
  };
}

function judged(studies: StudyCache, site: Site, wanted: Look['depth']): { looked: Looked; depth: Look['depth'] } {
  if (last !== null && wanted === 'quick') return { looked: quickLook(studies, site, last), depth: 'quick' };
  const { outcome, study } = fullLook(studies, site);
  last = { ...outcome, result: putInWords(outcome.result) };
  return { looked: { outcome: last, study }, depth: 'full' };
}

/** Runs what follows the hand a few times beforehand: the first runs of any code are slow ones. */
async function warmUp(studies: StudyCache, asked: LookAsked): Promise<void> {
  const site = await read(asked);
  const { outcome } = judged(studies, site, 'full').looked;
  for (let run = 0; run < 3; run++) {
    const looked = quickLook(studies, site, outcome);
    for (const station of ['bank', 'need', 'network'] as const) {
      stationCharts(looked, station, asked.picks, () => studies.sweep(looked.study));
    }
  }
}

function traceOf({ record, zone }: StudyCache): Trace {
  const { beginS, intervalS } = record;
  const firstS = beginS[0]!;
  const slots = Math.round((beginS.at(-1)! - firstS) / intervalS) + 1;
  const activeKw = new Float32Array(slots).fill(Number.NaN);
  const reactiveKvar = new Float32Array(slots).fill(Number.NaN);
  const gaps: Trace['gaps'] = [];
  let next = 0;
  for (let i = 0; i < beginS.length; i++) {
    const slot = Math.round((beginS[i]! - firstS) / intervalS);
    if (slot > next) gaps.push([next, slot]);
    activeKw[slot] = record.activeKw[i]!;
    reactiveKvar[slot] = record.laggingKvar[i]! - record.leadingKvar[i]!;
    next = slot + 1;
  }
  return { zone, firstS, intervalS, activeKw, reactiveKvar, gaps };
}
