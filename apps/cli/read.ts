import { EXIT } from '#libs/contract/error-body.js';
import { InputProblem, summarizeRecord } from '#libs/engine/index.js';
import { keptBytes } from '#libs/meter-files/kept-record/write-kept-record.js';
import { recordColumns } from '#libs/meter-files/record-columns.js';
import { recordCsvChunks } from '#libs/meter-files/write-record-csv.js';
import { qualityInWords, recordInWords } from '#libs/present/put-in-words.js';
import { recordReport } from '#libs/present/terminal-report.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { readMeterRecord } from './meter-record.js';
import { say, write, writeJson } from './output.js';
import { formOf } from './plan-exports.js';
import { proposalTarget } from './proposal-target.js';

/** `read METER-FILE`: what a meter file holds. */
export async function run(line: CommandLine): Promise<number> {
  const { flags } = line;
  if (flags.has('csv') && (flags.has('json') || flags.has('intervals'))) {
    throw new InputProblem([usage('--csv alone', 'it beside --json or --intervals')]);
  }
  const keep = line.values.get('keep');
  const kept = keep === undefined ? null : { form: formOf(keep, 'keep'), target: await proposalTarget(keep, 'keep') };
  const { record, quality: stated } = await readMeterRecord(line, line.operand);
  const quality = qualityInWords(stated);
  const summary = recordInWords(summarizeRecord(record));
  if (kept !== null) {
    await kept.target.write(keptBytes(record, kept.form));
    say(`record written to ${keep}`);
  }
  if (flags.has('csv')) {
    for (const chunk of recordCsvChunks(record)) await write(chunk);
  } else if (flags.has('intervals')) {
    await writeJson({ record: summary, quality, columns: recordColumns(record) });
  } else if (flags.has('json')) {
    await writeJson({ record: summary, quality });
  } else {
    await write(recordReport(summary, quality));
  }
  return EXIT.done;
}
