import { InputProblem } from '#libs/engine/index.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { readSmall } from './input-file.js';

/** Sheet and logo of a proposal. */
export interface PaperSheet {
  paper: 'A4' | 'Letter';
  logo: Uint8Array | null;
}

/**
 * Reads what was typed of the proposal's sheet, before anything is computed.
 * @param line with --paper and --logo
 * @returns the sheet, A4 without a logo where nothing was typed
 * @throws InputProblem where the size is unknown, the logo is refused, or neither has a proposal to stand on
 */
export async function paperSheet({ values }: CommandLine): Promise<PaperSheet> {
  const [size, logo] = [values.get('paper'), values.get('logo')];
  if ((size !== undefined || logo !== undefined) && !values.has('pdf')) {
    throw new InputProblem([usage('--pdf OUT beside --paper or --logo', 'none')]);
  }
  const paper = size ?? 'A4';
  if (paper !== 'A4' && paper !== 'Letter')
    throw new InputProblem([usage('--paper A4 or Letter', JSON.stringify(paper))]);
  return { paper, logo: logo === undefined ? null : await readChecked(logo) };
}

/** What can read a logo is loaded only where there is one. */
async function readChecked(path: string): Promise<Uint8Array> {
  const [{ readLogo }, { MOST_LOGO_BYTES }] = await Promise.all([
    import('#libs/proposal/read-logo.js'),
    import('#libs/proposal/raster.js'),
  ]);
  const bytes = await readSmall(path, MOST_LOGO_BYTES);
  readLogo(bytes);
  return bytes;
}
