import { execFileSync } from 'node:child_process';
import { join } from 'node:path';

/**
 * Builds what has changed since it was last built, for the tests that ask the compiled program.
 * @throws Error where a source does not compile
 */
export default function setup(): void {
  const built = join(import.meta.dirname, '../../.config/built.mjs');
  execFileSync(process.execPath, [built], { stdio: ['ignore', 'inherit', 'inherit'] });
}
