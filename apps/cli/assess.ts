import { InputProblem } from '#libs/engine/index.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { judgeSite } from './judge-site.js';

/** `assess SITE [--load METER-FILE] [--before SITE]`: judges the site's own bank, beside what it was. */
export async function run(line: CommandLine): Promise<number> {
  if (line.values.has('before')) return (await import('./reevaluate.js')).reevaluate(line);
  if (line.values.has('before-load')) throw new InputProblem([usage('--before SITE beside --before-load', 'none')]);
  return judgeSite(line, 'assess');
}
