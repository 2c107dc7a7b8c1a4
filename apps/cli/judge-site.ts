import { createHash } from 'node:crypto';
import { setImmediate as nextTurn } from 'node:timers/promises';
import { EXIT } from '#libs/contract/error-body.js';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import { frozenSite } from '#libs/contract/frozen-site.js';
import { type PlanInputs, planContent } from '#libs/contract/plan-content.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { recordBytes } from '#libs/contract/record-hash.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import {
  ENGINE_VERSION,
  type EstimateOutcome,
  InputProblem,
  type LoadRecord,
  type Outcome,
  type Site,
  withRobustness,
  type ZoneTable,
} from '#libs/engine/index.js';
import { putEstimateInWords, putInWords } from '#libs/present/put-in-words.js';
import { estimateReport, resultReport } from '#libs/present/terminal-report.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { readMeterRecord } from './meter-record.js';
import { say, write, writeJson } from './output.js';
import { type PaperSheet, paperSheet } from './paper-sheet.js';
import { planExports } from './plan-exports.js';
import { proposalTarget } from './proposal-target.js';
import { inFile } from './refused-file.js';
import { readSiteDocument } from './site-document.js';

/** The engine's two functions of one command: from a meter's record, and from the site's own estimate. */
interface Judges {
  record(site: Site, record: LoadRecord, zone: ZoneTable): Outcome;
  estimate(site: Site, zone: ZoneTable): EstimateOutcome;
}

/** An answer in words, with what prints it. */
interface Told {
  outcome: Outcome | EstimateOutcome;
  report: string;
  contentHash: string;
  recordHash: string | null;
}

/**
 * What `plan` and `assess` share: site and record in, answer and proposal out. Without a meter file the site's estimate
 * stands in for the record.
 * @param line what was typed
 * @param kind which of the two it is
 * @param judges the engine's functions
 * @returns the exit code
 */
export async function judgeSite(line: CommandLine, kind: Outcome['kind'], judges: Judges): Promise<number> {
  const load = line.values.get('load');
  const pdf = line.values.get('pdf');
  const sheet = await paperSheet(line);
  const target = pdf === undefined ? null : await proposalTarget(pdf);
  const exports = await planExports(line);
  const given = await inFile(line.operand, async () => readSiteWithMathjs(await readSiteDocument(line.operand)));
  const site = frozenSite(given, Date.now() / 1000);
  if (load === undefined && site.estimate === undefined) {
    throw new InputProblem([usage('--load METER-FILE, or a site file with an estimate', 'none')]);
  }
  if (load === undefined) needNoReading(line);
  if (kind === 'assess') await inFile(line.operand, async () => needBank(site));
  const told =
    load === undefined
      ? await inFile(line.operand, async () => byEstimate(site, kind, judges))
      : byRecord(site, kind, judges, (await readMeterRecord(line, load, site.timeZone)).record);
  await nextTurn(); // an interruption that came meanwhile is heard here
  if (target !== null) {
    await target.write(await proposalOf(told, sheet));
    say(`proposal written to ${pdf}`);
  }
  for (const path of await exports.write(told.outcome)) say(`written: ${path}`);
  const { result } = told.outcome;
  if (line.flags.has('json')) await writeJson(result);
  else await write(told.report);
  return result.verdict === 'avoid' ? EXIT.avoid : EXIT.done;
}

function byRecord(site: Site, kind: Outcome['kind'], judges: Judges, record: LoadRecord): Told {
  const zone = zoneTableOf(site.timeZone, record);
  const computed = withRobustness(judges.record(site, record, zone));
  const outcome: Outcome = { ...computed, result: putInWords(computed.result) };
  const recordHash = sha256(recordBytes(record));
  const contentHash = contentHashOf({ kind, site, recordHash, zone });
  return { outcome, report: resultReport(outcome), contentHash, recordHash };
}

function byEstimate(site: Site, kind: Outcome['kind'], judges: Judges): Told {
  const zone = estimateZone(site);
  const computed = withRobustness(judges.estimate(site, zone));
  const outcome: EstimateOutcome = { ...computed, result: putEstimateInWords(computed.result) };
  return {
    outcome,
    report: estimateReport(outcome),
    contentHash: contentHashOf({ kind, site, recordHash: null, zone }),
    recordHash: null,
  };
}

function contentHashOf(inputs: Omit<PlanInputs, 'engineVersion'>): string {
  return sha256([planContent({ ...inputs, engineVersion: ENGINE_VERSION })]);
}

/** What says how a meter file is read has nothing to read. */
function needNoReading({ values }: CommandLine): void {
  const idle = ['format', 'map', 'time-zone'].filter((name) => values.has(name));
  if (idle.length === 0) return;
  throw new InputProblem(idle.map((name) => usage(`--load METER-FILE beside --${name}`, 'none')));
}

function needBank(site: Site): void {
  if (site.bank !== undefined) return;
  throw new InputProblem([{ code: 'missing', path: 'bank', expected: 'the bank to judge', found: 'nothing' }]);
}

/** The drawing of papers is loaded only where one is wanted. */
async function proposalOf({ outcome, contentHash, recordHash }: Told, sheet: PaperSheet): Promise<Uint8Array> {
  const { renderProposal } = await import('#libs/proposal/render-proposal.js');
  return renderProposal(outcome, {
    number: contentHash.slice(0, 8),
    revision: 0,
    state: 'draft, not reviewed',
    preparedBy: null,
    contentHash,
    recordHash,
    engineVersion: ENGINE_VERSION,
    date: outcome.site.asOf,
    ...sheet,
  });
}

function sha256(chunks: Iterable<string | Uint8Array>): string {
  const hash = createHash('sha256');
  for (const chunk of chunks) hash.update(chunk);
  return hash.digest('hex');
}
