import { planBank, planEstimate } from '#libs/engine/index.js';
import type { CommandLine } from './command.js';
import { judgeSite } from './judge-site.js';

/** `plan SITE [--load METER-FILE]`: designs a bank and judges it. */
export function run(line: CommandLine): Promise<number> {
  return judgeSite(line, 'plan', { record: planBank, estimate: planEstimate });
}
