import { setImmediate as nextTurn } from 'node:timers/promises';
import { EXIT } from '#libs/contract/error-body.js';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import { frozenSite } from '#libs/contract/frozen-site.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import { InputProblem, type LoadRecord, type Outcome, type Site } from '#libs/engine/index.js';
import { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import { sitesReport } from '#libs/present/sites-table.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import type { Judged, JudgeTask } from './judge-worker.js';
import { judgingProgress } from './judging-progress.js';
import { readMeterRecord } from './meter-record.js';
import { say, write, writeJson } from './output.js';
import { paperSheet } from './paper-sheet.js';
import { planExports } from './plan-exports.js';
import { proposalTarget } from './proposal-target.js';
import { inFile } from './refused-file.js';
import { readSiteDocument } from './site-document.js';

/** A site file with the meter file beside it, if there is one. */
interface Asked {
  file: string;
  site: Site;
  load: string | undefined;
}

/**
 * What `plan` and `assess` share: sites and records in, answers and a proposal out. Without a meter file the site's
 * estimate stands in for the record. Several sites give one table.
 * @param line what was typed
 * @param kind which of the two it is
 * @returns the exit code
 */
export async function judgeSite(line: CommandLine, kind: Outcome['kind']): Promise<number> {
  // The thread loads what it computes with while the files are read.
  const pool = new WorkerPool(new URL('./judge-worker.js', import.meta.url), (error) => say(`fault: ${error}`), 1);
  try {
    return await judgeWith(pool, line, kind);
  } finally {
    await pool.close();
  }
}

async function judgeWith(pool: WorkerPool, line: CommandLine, kind: Outcome['kind']): Promise<number> {
  const pdf = line.values.get('pdf');
  const sheet = await paperSheet(line);
  const target = pdf === undefined ? null : await proposalTarget(pdf);
  const exports = await planExports(line);
  const asked: Asked[] = [];
  for (const [at, file] of line.operands.entries()) asked.push(await askedOf(line, kind, file, line.loads[at]));
  const of = { kind, sheet: target === null ? null : sheet, wantsOutcome: exports.areWanted };
  const judged: Judged[] = [];
  for (const one of asked) judged.push(await judge(line, pool, one, of));
  await nextTurn(); // an interruption that came meanwhile is heard here
  const [first] = judged;
  if (target !== null && first?.proposal) {
    await target.write(first.proposal);
    say(`proposal written to ${pdf}`);
  }
  const { result, outcome, inputs } = first ?? {};
  if (result && outcome && inputs) {
    for (const path of await exports.write({ result, outcome, inputs })) say(`written: ${path}`);
  }
  await tell(line, asked, judged);
  return judged.some(({ result }) => result.verdict === 'avoid') ? EXIT.avoid : EXIT.done;
}

async function askedOf(
  line: CommandLine,
  kind: Outcome['kind'],
  file: string,
  load: string | undefined,
): Promise<Asked> {
  const given = await inFile(file, async () => readSiteWithMathjs(await readSiteDocument(file)));
  await inFile(file, async () => needOwnPapers(given));
  const site = frozenSite(given, Date.now() / 1000);
  if (load === undefined && site.estimate === undefined) {
    throw new InputProblem([usage('--load METER-FILE, or a site file with an estimate', 'none')]);
  }
  if (load === undefined) needNoReading(line);
  if (kind === 'assess') await inFile(file, async () => needBank(site));
  return { file, site, load };
}

async function judge(
  line: CommandLine,
  pool: WorkerPool,
  { file, site, load }: Asked,
  of: Pick<JudgeTask, 'kind' | 'sheet' | 'wantsOutcome'>,
): Promise<Judged> {
  const report = judgingProgress((progress) => say(`${file}: ${progress}`));
  const run = (record: LoadRecord | null): Promise<Judged> => {
    const zone = record === null ? estimateZone(site) : zoneTableOf(site.timeZone, record);
    const handedOver = record === null ? [] : columnsOf(record);
    return pool.run<Judged>('judgeTask', { ...of, site, record, zone } satisfies JudgeTask, { report, handedOver });
  };
  if (load === undefined) return inFile(file, () => run(null));
  return run((await readMeterRecord(line, load, site.timeZone)).record);
}

/** What takes up room of a record; the thread alone has need of it. */
function columnsOf(record: LoadRecord): (Float64Array | Uint8Array | null)[] {
  const { beginS, activeKw, laggingKvar, leadingKvar, voltageV, connectedKvar, standby } = record;
  return [beginS, activeKw, laggingKvar, leadingKvar, voltageV, connectedKvar, standby];
}

async function tell(line: CommandLine, asked: readonly Asked[], judged: readonly Judged[]): Promise<void> {
  const wantsJson = line.flags.has('json');
  if (judged.length === 1) {
    const { result, report } = judged[0]!;
    return wantsJson ? writeJson(result) : write(report);
  }
  const sites = judged.map(({ result }, at) => ({ file: asked[at]!.file, name: asked[at]!.site.name, result }));
  return wantsJson ? writeJson({ sites }) : write(sitesReport(judged.map(({ row }) => row)));
}

/** What says how a meter file is read has nothing to read. */
function needNoReading({ values }: CommandLine): void {
  const idle = ['format', 'map', 'time-zone'].filter((name) => values.has(name));
  if (idle.length === 0) return;
  throw new InputProblem(idle.map((name) => usage(`--load METER-FILE beside --${name}`, 'none')));
}

/** Shared papers are kept by a server; the command has none to ask. */
function needOwnPapers({ papers }: Site): void {
  const missing = (['tariff', 'prices'] as const).filter((kind) => papers?.[kind] !== undefined);
  if (missing.length === 0) return;
  throw new InputProblem(
    missing.map((kind) => ({
      code: 'missing',
      path: kind,
      expected: `"${kind}" in the file itself: shared papers are kept by a server`,
      found: `the name of one, ${JSON.stringify(papers?.[kind]?.name)}`,
    })),
  );
}

function needBank(site: Site): void {
  if (site.bank !== undefined) return;
  throw new InputProblem([{ code: 'missing', path: 'bank', expected: 'the bank to judge', found: 'nothing' }]);
}
