import { createHash } from 'node:crypto';
import { canonicalJson } from '#libs/contract/canonical-json.js';
import { EXIT } from '#libs/contract/error-body.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { documentFile } from '#libs/meter-files/site-document.js';
import { plainName } from '#libs/present/plain-name.js';
import type { CommandLine } from './command.js';
import { say, write, writeJson } from './output.js';
import { formOf } from './plan-exports.js';
import { proposalTarget } from './proposal-target.js';
import { inFile } from './refused-file.js';
import { readSiteDocument } from './site-document.js';

/** `site SITE`: a site file checked, and written in another form. */
export async function run(line: CommandLine): Promise<number> {
  const out = line.values.get('export');
  const form = out === undefined ? null : formOf(out, 'export');
  const target = out === undefined ? null : await proposalTarget(out, 'export');
  const { document, name } = await inFile(line.operand, async () => {
    const read = await readSiteDocument(line.operand);
    return { document: read, name: (await readSiteWithMathjs(read)).name };
  });
  if (target !== null && form !== null) {
    await target.write(documentFile(document, form));
    say(`site written to ${out}`);
  }
  const documentHash = createHash('sha256').update(canonicalJson(document)).digest('hex');
  if (line.flags.has('json')) await writeJson({ name, documentHash });
  else await write(`${plainName(name)}\ncontent ${documentHash}\n`);
  return EXIT.done;
}
