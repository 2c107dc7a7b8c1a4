import {
  type BankInput,
  type MonthlyBill,
  type Problem,
  type StageGroupInput,
  tanFromPowerFactor,
} from '#libs/engine/index.js';
import type { Station } from '../address.js';
import type {
  JobShown,
  RecordShown,
  ReviewShown,
  RevisionHeadShown,
  RevisionShown,
  SiteDocument,
  SiteShown,
} from '../api/shown.js';
import { valueAt } from '../field/document-path.js';
import { type HeldPapers, withHeldPapers } from './held-papers.js';
import type { Look, LookAsked, Picks, StationCharts } from './look.js';

/** Everything the page of one site shows. */
export interface DeskState {
  stage: 'opening' | 'open' | 'unknown' | 'unreachable';
  site: SiteShown | null;
  /** the site file as typed, kept or not */
  document: SiteDocument | null;
  /** the bank under the hand; null: the kept plan's, or the site's own */
  trial: BankInput | null;
  /** shared papers the document names */
  held: HeldPapers;
  records: RecordShown[];
  revisions: RevisionHeadShown[];
  kept: RevisionShown | null;
  /** of the kept revision */
  review: ReviewShown | null;
  /** what the engine says of the document as typed */
  look: Look | null;
  charts: StationCharts;
  picks: Picks;
  /** refusals by the engine or the API, each with its path */
  problems: readonly Problem[];
  /** what could not be computed, where it is no refusal */
  fault: string | null;
  /** fields whose text is no value yet */
  typed: Readonly<Record<string, string>>;
  job: JobShown | null;
  saving: boolean;
  /** when the connection was lost, local clock */
  offlineSince: string | null;
  /** the site as another window saved it meanwhile */
  theirs: SiteShown | null;
  /** time from the hand to the figures, of the last quick look [ms] */
  followedMs: number | null;
}

export const NOTHING_YET: DeskState = {
  stage: 'opening',
  site: null,
  document: null,
  trial: null,
  held: {},
  records: [],
  revisions: [],
  kept: null,
  review: null,
  look: null,
  charts: {},
  picks: { momentS: null, cursorS: 11 * 3600 + 900, levelKvar: null },
  problems: [],
  fault: null,
  typed: {},
  job: null,
  saving: false,
  offlineSince: null,
  theirs: null,
  followedMs: null,
};

/** The stages of a kept plan as groups of equal ones. */
export function groupsOfPlan({ result }: RevisionShown): StageGroupInput[] {
  const groups: StageGroupInput[] = [];
  for (const { ratedKvar, ratedV, reactorPct } of result.bank.stages) {
    const last = groups.at(-1);
    if (last?.ratedKvar === ratedKvar && last.ratedV === ratedV && last.reactorPct === reactorPct) last.count++;
    else groups.push({ count: 1, ratedKvar, ratedV, reactorPct });
  }
  return groups;
}

/** The bank under study: the hand's, else the kept plan's, else the site's own. */
export function bankOf({ trial, kept, document }: DeskState): BankInput | null {
  if (trial !== null) return trial;
  if (kept?.kind === 'plan') {
    const stages = groupsOfPlan(kept);
    return stages.length === 0 ? null : { stages };
  }
  return (document?.bank as BankInput | undefined) ?? null;
}

/** The site file as the engine looks at it: as typed, with the bank under study and the kept plan's set point. */
export function studiedDocument(state: DeskState): SiteDocument | null {
  const { document, kept } = state;
  if (document === null) return null;
  const { bank: _, ...rest } = withHeldPapers(document, state.held);
  const bank = bankOf(state);
  const studied: SiteDocument = bank === null || bank.stages.length === 0 ? rest : { ...rest, bank };
  const setPoint = kept?.kind === 'plan' ? kept.result.control.setPointPowerFactor : undefined;
  if (setPoint === undefined || valueAt(document, 'control.setPointPowerFactor') !== undefined) return studied;
  return { ...studied, control: { ...(document.control as object), setPointPowerFactor: setPoint } };
}

/**
 * The site file as it is saved. A bank under the hand becomes the site's own, with the set point it was looked at with; a
 * plan's bank stays the plan's.
 */
export function documentToKeep(state: DeskState, kind: 'plan' | 'assess'): SiteDocument | null {
  const { document, trial } = state;
  const studied = studiedDocument(state);
  if (document === null || studied === null || trial === null || kind === 'plan') return document;
  const { control } = studied;
  return { ...document, bank: studied.bank ?? trial, ...(control === undefined ? {} : { control }) };
}

/** What the engine is asked for the open station. */
export function lookAsked(state: DeskState, station: Station): LookAsked {
  const { kept, trial, picks } = state;
  const kind = kept !== null && trial === null ? kept.kind : 'assess';
  return { document: studiedDocument(state)!, kind, station, picks, depth: 'full' };
}

/** Whether anything was typed or moved that is not kept. */
export function isChanged({ site, document, trial, typed }: DeskState): boolean {
  if (site === null || document === null) return false;
  return trial !== null || Object.keys(typed).length > 0 || JSON.stringify(site.site) !== JSON.stringify(document);
}

/** Keys of the site file by the station at which they are entered, left to right. */
const STATION_KEYS: [Station, readonly string[]][] = [
  ['record', ['timeZone', 'recordedBank', 'estimate']],
  ['supply', ['bus', 'supply', 'loads', 'limits', 'rules', 'frequencyHz', 'meteredAt']],
  ['need', ['target']],
  ['bank', ['control', 'catalogue', 'bank']],
  ['money', ['tariff', 'prices', 'finance', 'currency']],
];

/**
 * The first station whose inputs are not those of the kept revision; null where all are.
 * @param state what is typed and what was kept
 */
export function staleFrom(state: DeskState): Station | null {
  const { kept, records, trial } = state;
  const document = state.document === null ? null : withHeldPapers(state.document, state.held);
  if (kept === null || document === null) return null;
  if (records[0] !== undefined && records[0].id !== kept.recordId) return 'record';
  const frozen = kept.inputs.site;
  const differs = (key: string) =>
    JSON.stringify(canonical(frozen[key])) !== JSON.stringify(canonical(asFrozen(key, document[key])));
  for (const [station, keys] of STATION_KEYS) {
    if (
      keys.some((key) => (key === 'bank' ? trial !== null || (kept.kind === 'assess' && differs(key)) : differs(key)))
    ) {
      return station;
    }
  }
  return null;
}

/** What is typed in the form it is frozen in: a bill's power factor as kvarh. */
function asFrozen(key: string, part: unknown): unknown {
  if (key !== 'estimate' || part === null || typeof part !== 'object') return part;
  const { bills, ...rest } = part as { bills?: (Partial<MonthlyBill> & { powerFactor?: number })[] };
  if (!Array.isArray(bills)) return part;
  return {
    ...rest,
    bills: bills.map(({ powerFactor, ...bill }) => {
      if (bill.laggingKvarh !== undefined || powerFactor === undefined || bill.activeKwh === undefined) return bill;
      return { ...bill, laggingKvarh: bill.activeKwh * tanFromPowerFactor(powerFactor) };
    }),
  };
}

/** The same with its keys sorted: the server froze them so. */
function canonical(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(canonical);
  if (value === null || typeof value !== 'object') return value;
  return Object.fromEntries(
    Object.entries(value)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, part]) => [key, canonical(part)]),
  );
}
