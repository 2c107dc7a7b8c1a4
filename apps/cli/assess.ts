import type { CommandLine } from './command.js';
import { judgeSite } from './judge-site.js';

/** `assess SITE [--load METER-FILE]`: judges the site's own bank. */
export function run(line: CommandLine): Promise<number> {
  return judgeSite(line, 'assess');
}
