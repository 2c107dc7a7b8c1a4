import { EXIT } from '#libs/contract/error-body.js';
import { siteDocumentOf, type TakenCalculation, type TakenPlan } from '#libs/contract/plan-document.js';
import { ENGINE_VERSION, InputProblem, type LoadRecord } from '#libs/engine/index.js';
import { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import { MOST_PLAN_BYTES, readPlanFile } from '#libs/meter-files/read-plan-file.js';
import { documentFile } from '#libs/meter-files/site-document.js';
import type { TableForm } from '#libs/meter-files/write-tables.js';
import { againLines, takenLines } from '#libs/present/export-words.js';
import { planTables } from '#libs/present/result-tables.js';
import { type FieldDifference, fieldDifferences } from '#libs/review/field-differences.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { recordHashOf, textHash } from './frozen-inputs.js';
import { readSmall } from './input-file.js';
import type { Judged, JudgeTask } from './judge-worker.js';
import { judgingProgress } from './judging-progress.js';
import { readMeterRecord } from './meter-record.js';
import { say, write, writeJson } from './output.js';
import { formOf, tablesOf } from './plan-exports.js';
import { type ProposalTarget, proposalTarget } from './proposal-target.js';
import { inFile } from './refused-file.js';

const OUTPUTS = ['site', 'export', 'calculation'] as const;
type Output = (typeof OUTPUTS)[number];

interface Target {
  output: Output;
  path: string;
  form: TableForm;
  target: ProposalTarget;
}

/** `import FILE`: an exported plan or calculation sheet taken back, written in other forms, computed again. */
export async function run(line: CommandLine): Promise<number> {
  needFitting(line);
  const targets = await targetsOf(line);
  const taken = await inFile(line.operand, async () => {
    const bytes = await readSmall(line.operand, MOST_PLAN_BYTES);
    return readPlanFile(bytes, { hash: textHash, tablesOf: planTables });
  });
  if (taken.kind === 'calculation') return tellSheet(line, taken, targets);
  const again = line.flags.has('again') ? await computedAgain(line, taken) : null;
  for (const { output, path, form, target } of targets) {
    const { inputs, result } = taken;
    await target.write(
      output === 'site'
        ? documentFile(siteDocumentOf(inputs.site), form)
        : await tablesOf({ result, inputs }, output, form),
    );
    say(`written: ${path}`);
  }
  await tellPlan(line, taken, again);
  return again === null || again.length === 0 ? EXIT.done : EXIT.avoid;
}

function needFitting({ flags, values, lists }: CommandLine): void {
  if (flags.has('again')) return;
  const idle = ['load', 'format', 'map', 'time-zone', 'extend'].filter((name) => values.has(name) || lists.has(name));
  if (idle.length > 0) throw new InputProblem(idle.map((name) => usage(`--again beside --${name}`, 'none')));
}

async function targetsOf({ values }: CommandLine): Promise<Target[]> {
  const targets: Target[] = [];
  for (const output of OUTPUTS) {
    const path = values.get(output);
    if (path === undefined) continue;
    targets.push({ output, path, form: formOf(path, output), target: await proposalTarget(path, output) });
  }
  return targets;
}

async function tellSheet(line: CommandLine, sheet: TakenCalculation, targets: readonly Target[]): Promise<number> {
  const { contentHash, sheetHash, figures } = sheet;
  const wanted = [...targets.map(({ output }) => output), ...(line.flags.has('again') ? ['again'] : [])];
  const idle = wanted.filter((name) => name !== 'calculation');
  if (idle.length > 0) {
    const expected = 'a plan, which holds its inputs';
    throw new InputProblem(idle.map((name) => usage(`--${name} with ${expected}`, 'a calculation sheet')));
  }
  const { calculationFile } = await import('#libs/meter-files/plan-file.js');
  const { calculationDocument } = await import('#libs/contract/plan-document.js');
  const { calculationTable } = await import('#libs/present/result-tables.js');
  for (const { path, form, target } of targets) {
    const document = calculationDocument({ figures }, contentHash, textHash);
    await target.write(calculationFile(document, calculationTable({ figures }), form));
    say(`written: ${path}`);
  }
  if (line.flags.has('json')) await writeJson({ kind: 'calculation', contentHash, sheetHash, figures });
  else await write(takenLines({ kind: 'calculation', contentHash, ownHash: sheetHash, figures: figures.length }));
  return EXIT.done;
}

async function tellPlan(line: CommandLine, taken: TakenPlan, again: FieldDifference[] | null): Promise<void> {
  const { contentHash, resultHash, inputs, result } = taken;
  const { kind, recordHash, engineVersion, site } = inputs;
  const { verdict } = result;
  if (line.flags.has('json')) {
    const told = { kind, name: site.name, contentHash, resultHash, recordHash, engineVersion, verdict };
    const compared =
      again === null ? null : { engineVersion: ENGINE_VERSION, isSame: again.length === 0, differences: again };
    return writeJson({ ...told, again: compared });
  }
  await write(
    takenLines({ kind, contentHash, ownHash: resultHash, name: site.name, verdict, engineVersion, recordHash }) +
      (again === null ? '' : againLines(again, ENGINE_VERSION)),
  );
}

/** What this engine makes of the same inputs, where it is not what the file holds. */
async function computedAgain(line: CommandLine, { inputs, result }: TakenPlan): Promise<FieldDifference[]> {
  const record = await recordFor(line, inputs);
  const { kind, site, zone } = inputs;
  const pool = new WorkerPool(new URL('./judge-worker.js', import.meta.url), (error) => say(`fault: ${error}`), 1);
  try {
    const task: JudgeTask = { kind, site, zone, record, sheet: null, wantsOutcome: false };
    const report = judgingProgress((progress) => say(`${line.operand}: ${progress}`));
    const { result: now } = await pool.run<Judged>('judgeTask', task, { report });
    return fieldDifferences(result, JSON.parse(JSON.stringify(now)));
  } finally {
    await pool.close();
  }
}

async function recordFor(line: CommandLine, { recordHash, site }: TakenPlan['inputs']): Promise<LoadRecord | null> {
  const load = line.values.get('load');
  if (recordHash === null && load === undefined) return null;
  if (recordHash === null) throw new InputProblem([usage('no --load: the plan rests on an estimate', '--load')]);
  if (load === undefined) throw new InputProblem([usage('--load METER-FILE beside --again', 'none')]);
  const { record } = await readMeterRecord(line, load, site.timeZone);
  const found = recordHashOf(record);
  if (found === recordHash) return record;
  const expected = `the record the plan was made from, ${recordHash.slice(0, 16)}`;
  return inFile(load, async () => {
    throw new InputProblem([{ code: 'inconsistent', expected, found: `another, ${found.slice(0, 16)}` }]);
  });
}
