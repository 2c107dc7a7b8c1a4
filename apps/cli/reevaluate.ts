import { createHash } from 'node:crypto';
import { setImmediate as nextTurn } from 'node:timers/promises';
import { EXIT } from '#libs/contract/error-body.js';
import { frozenSite } from '#libs/contract/frozen-site.js';
import { planContent } from '#libs/contract/plan-content.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import {
  ENGINE_VERSION,
  InputProblem,
  type LoadRecord,
  type Reevaluated,
  reevaluateBank,
  type Site,
  type SiteThen,
  withRobustness,
} from '#libs/engine/index.js';
import { putInWords } from '#libs/present/put-in-words.js';
import { reevaluationReport } from '#libs/present/reevaluation-report.js';
import { resultReport } from '#libs/present/terminal-report.js';
import { withTonight } from '#libs/present/tonight-words.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { frozenInputs } from './frozen-inputs.js';
import { readMeterRecord } from './meter-record.js';
import { say, write, writeJson } from './output.js';
import { type PaperSheet, paperSheet } from './paper-sheet.js';
import { planExports } from './plan-exports.js';
import { proposalTarget } from './proposal-target.js';
import { inFile } from './refused-file.js';
import { readSiteDocument } from './site-document.js';

/**
 * `assess SITE --load METER-FILE --before SITE [--before-load METER-FILE]`: judges the site's bank again, beside what it
 * was. The earlier site is judged on the same record where no earlier one is given.
 * @param line what was typed
 * @returns the exit code, by the verdict as it is now
 */
export async function reevaluate(line: CommandLine): Promise<number> {
  const load = line.values.get('load');
  if (load === undefined) throw new InputProblem([usage('--load METER-FILE beside --before', 'none')]);
  const pdf = line.values.get('pdf');
  const sheet = await paperSheet(line);
  const target = pdf === undefined ? null : await proposalTarget(pdf);
  const exports = await planExports(line);
  const now = await siteIn(line.operand);
  const then = await siteIn(line.values.get('before')!);
  const { record } = await readMeterRecord(line, load, now.timeZone);
  const earlier = line.values.get('before-load');
  const earlierRecord = earlier === undefined ? record : await earlierRecordOf(line, earlier, then.timeZone);
  const before = atThatTime(then, earlierRecord);
  const after = atThatTime(now, record);
  const judged = inWords(reevaluateBank(before, after));
  await nextTurn(); // an interruption that came meanwhile is heard here
  if (target !== null) {
    await target.write(await paperOf(judged, [after, before], sheet));
    say(`proposal written to ${pdf}`);
  }
  const result = withTonight(judged.after.result, judged.reevaluation);
  const inputs = frozenInputs({ kind: 'assess', ...after });
  for (const path of await exports.write({ result, outcome: judged.after, inputs })) say(`written: ${path}`);
  if (line.flags.has('json')) await writeJson({ ...result, reevaluation: judged.reevaluation });
  else await write(`${reevaluationReport(judged)}\n${resultReport(judged.after)}`);
  return result.verdict === 'avoid' ? EXIT.avoid : EXIT.done;
}

function siteIn(path: string): Promise<Site> {
  return inFile(path, async () => {
    const site = frozenSite(await readSiteWithMathjs(await readSiteDocument(path)), Date.now() / 1000);
    if (site.bank !== undefined) return site;
    throw new InputProblem([
      { code: 'missing', path: 'bank', expected: 'the bank that stands there', found: 'nothing' },
    ]);
  });
}

// What extends the record extends the later one.
async function earlierRecordOf(line: CommandLine, path: string, timeZone: string): Promise<LoadRecord> {
  return (await readMeterRecord({ ...line, lists: new Map() }, path, timeZone)).record;
}

function atThatTime(site: Site, record: LoadRecord): SiteThen {
  return { site, record, zone: zoneTableOf(site.timeZone, record) };
}

function inWords({ reevaluation, before, after }: Reevaluated): Reevaluated {
  const firm = withRobustness(after);
  return {
    reevaluation,
    before: { ...before, result: putInWords(before.result) },
    after: { ...firm, result: putInWords(firm.result) },
  };
}

async function paperOf(
  { reevaluation, after }: Reevaluated,
  inputs: readonly SiteThen[],
  sheet: PaperSheet,
): Promise<Uint8Array> {
  const { renderProposal } = await import('#libs/proposal/render-proposal.js');
  const hash = createHash('sha256');
  for (const { site, record, zone } of inputs) {
    hash.update(planContent(frozenInputs({ kind: 'assess', site, record, zone })));
  }
  const contentHash = hash.digest('hex');
  return renderProposal(after, {
    number: contentHash.slice(0, 8),
    revision: 0,
    state: 'draft, not reviewed',
    preparedBy: null,
    contentHash,
    engineVersion: ENGINE_VERSION,
    date: after.site.asOf,
    reevaluation,
    ...sheet,
  });
}
