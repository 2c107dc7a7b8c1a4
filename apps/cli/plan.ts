import type { CommandLine } from './command.js';
import { judgeSite } from './judge-site.js';

/** `plan SITE … [--load METER-FILE …]`: designs a bank for each site and judges it. */
export function run(line: CommandLine): Promise<number> {
  return judgeSite(line, 'plan');
}
