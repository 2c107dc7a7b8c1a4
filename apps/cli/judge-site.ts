import { createHash } from 'node:crypto';
import { setImmediate as nextTurn } from 'node:timers/promises';
import { EXIT } from '#libs/contract/error-body.js';
import { frozenSite } from '#libs/contract/frozen-site.js';
import { planContent } from '#libs/contract/plan-content.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { recordBytes } from '#libs/contract/record-hash.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import {
  ENGINE_VERSION,
  InputProblem,
  type LoadRecord,
  type Outcome,
  type Site,
  withRobustness,
  type ZoneTable,
} from '#libs/engine/index.js';
import { putInWords } from '#libs/present/put-in-words.js';
import { resultReport } from '#libs/present/terminal-report.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { readJson } from './input-file.js';
import { readMeterRecord } from './meter-record.js';
import { say, write, writeJson } from './output.js';
import { proposalTarget } from './proposal-target.js';
import { inFile } from './refused-file.js';

type Judge = (site: Site, record: LoadRecord, zone: ZoneTable) => Outcome;

/**
 * What `plan` and `assess` share: site and record in, answer and proposal out.
 * @param line what was typed
 * @param kind which of the two it is
 * @param judge the engine's function
 * @returns the exit code
 */
export async function judgeSite(line: CommandLine, kind: Outcome['kind'], judge: Judge): Promise<number> {
  const load = line.values.get('load');
  if (load === undefined) throw new InputProblem([usage('--load METER-FILE', 'none')]);
  const pdf = line.values.get('pdf');
  const target = pdf === undefined ? null : await proposalTarget(pdf);
  const given = await inFile(line.operand, async () => readSiteWithMathjs(await readJson(line.operand)));
  const site = frozenSite(given, Date.now() / 1000);
  if (kind === 'assess') await inFile(line.operand, async () => needBank(site));
  const { record } = await readMeterRecord(line, load, site.timeZone);
  const zone = zoneTableOf(site.timeZone, record);
  const outcome = withRobustness(judge(site, record, zone));
  await nextTurn(); // an interruption that came meanwhile is heard here
  const told: Outcome = { ...outcome, result: putInWords(outcome.result) };
  if (target !== null) {
    const contentHash = sha256([
      planContent({ kind, site, recordHash: sha256(recordBytes(record)), zone, engineVersion: ENGINE_VERSION }),
    ]);
    await target.write(await proposalOf(told, contentHash));
    say(`proposal written to ${pdf}`);
  }
  if (line.flags.has('json')) await writeJson(told.result);
  else await write(resultReport(told));
  return told.result.verdict === 'avoid' ? EXIT.avoid : EXIT.done;
}

function needBank(site: Site): void {
  if (site.bank !== undefined) return;
  throw new InputProblem([{ code: 'missing', path: 'bank', expected: 'the bank to judge', found: 'nothing' }]);
}

/** The drawing of papers is loaded only where one is wanted. */
async function proposalOf(outcome: Outcome, contentHash: string): Promise<Uint8Array> {
  const { renderProposal } = await import('#libs/proposal/render-proposal.js');
  return renderProposal(outcome, {
    number: contentHash.slice(0, 8),
    revision: 0,
    state: 'draft, not reviewed',
    preparedBy: null,
    contentHash,
    engineVersion: ENGINE_VERSION,
  });
}

function sha256(chunks: Iterable<string | Uint8Array>): string {
  const hash = createHash('sha256');
  for (const chunk of chunks) hash.update(chunk);
  return hash.digest('hex');
}
