import { say } from './language.js';
import { plainName } from './plain-name.js';

/**
 * How the network stands, in the language in force: its parts' own names stay.
 * @param standing as the engine names it, parts joined by commas
 * @returns "Q1 closed, transformer 2 out"
 */
export function standingName(standing: string): string {
  return plainName(standing).split(', ').map(partName).join(', ');
}

function partName(part: string): string {
  const [, name = '', ending] = /^(.+) (closed|running|out)$/.exec(part) ?? [];
  const [, transformer] = /^transformer (\d+)$/.exec(name) ?? [];
  if (ending === 'out') return transformer === undefined ? say`${name} out` : say`transformer ${transformer} out`;
  if (ending === 'closed') return say`${name} closed`;
  if (ending === 'running') return say`${name} running`;
  const [, bank, stages] = /^(.+) with ([\d +]+) stages in$/.exec(part) ?? [];
  if (bank !== undefined) {
    return stages === '1' ? say`${bank} with one stage in` : say`${bank} with ${stages!} stages in`;
  }
  const [, count, capacitors] = /^(\d+) of (.+)$/.exec(part) ?? [];
  return count === undefined ? part : say`${count} of ${capacitors!}`;
}
