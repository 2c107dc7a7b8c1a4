import { InputProblem } from '#libs/engine/index.js';
import { LANGUAGES, type Language, languageOf } from '#libs/present/languages.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { readSmall } from './input-file.js';

/** Sheet, logo and language of a proposal. */
export interface PaperSheet {
  paper: 'A4' | 'Letter';
  logo: Uint8Array | null;
  language: Language;
}

/**
 * Reads what was typed of the proposal's sheet, before anything is computed.
 * @param line with --paper, --logo and --language
 * @returns the sheet; where nothing was typed A4, without a logo, in English
 * @throws InputProblem where size or language is unknown, the logo is refused, or none of them has a proposal to stand on
 */
export async function paperSheet({ values }: CommandLine): Promise<PaperSheet> {
  const [size, logo, letters = 'en'] = ['paper', 'logo', 'language'].map((name) => values.get(name));
  if (['paper', 'logo', 'language'].some((name) => values.has(name)) && !values.has('pdf')) {
    throw new InputProblem([usage('--pdf OUT beside --paper, --logo or --language', 'none')]);
  }
  const paper = size ?? 'A4';
  if (paper !== 'A4' && paper !== 'Letter')
    throw new InputProblem([usage('--paper A4 or Letter', JSON.stringify(paper))]);
  const language = languageOf(letters);
  if (language === null)
    throw new InputProblem([usage(`--language ${LANGUAGES.join(' or ')}`, JSON.stringify(letters))]);
  return { paper, language, logo: logo === undefined ? null : await readChecked(logo) };
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
