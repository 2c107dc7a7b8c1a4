import type { Chance } from './mutate-file.js';

const NUMBERS = [999, 9999, 99_999, 999.9, 9999.99, 9_999_999, 32_767, 32_768, 65_535, 2_147_483_647, 4_294_967_295];

/**
 * A copy of a delimited file with numbers that may stand for missing ones in place of others, one or several on end.
 * @param bytes the file
 * @param chance decides where, how many, and with which sign
 * @param decimal the file's mark
 */
export function withFillers(bytes: Uint8Array, chance: Chance, decimal: '.' | ','): Uint8Array {
  const lines = Buffer.from(bytes).toString('latin1').split('\n');
  const number = String(chance.of(NUMBERS) * (chance.below(3) === 0 ? 1 : -1)).replace('.', decimal);
  const first = 1 + chance.below(Math.max(1, lines.length - 1));
  const column = chance.below(3);
  for (let at = first; at < Math.min(lines.length, first + 1 + chance.below(3)); at++) {
    const delimiter = /[;,\t|]/.exec(lines[at]!)?.[0] ?? ',';
    const cells = lines[at]!.split(delimiter);
    cells[Math.min(cells.length - 1, 1 + column)] = number;
    lines[at] = cells.join(delimiter);
  }
  return new Uint8Array(Buffer.from(lines.join('\n'), 'latin1'));
}
