import type { QualityMeaning } from '#libs/contract/meter-map.js';
import { wordsOf } from './header-words.js';

const WORDS: Record<QualityMeaning, readonly string[]> = {
  measured:
    'a act actual ok valid validated good normal measured real gemessen gultig wahr mesure mesuree medido misurato gemeten'.split(
      ' ',
    ),
  estimated:
    'e est estimated estimate s sub subst substituted substitute ersatzwert ersatz geschatzt estime estimee estimado estimada interpolated edited corrected calculated manual geschat stimato'.split(
      ' ',
    ),
  missing:
    'missing bad error err failed failure fault invalid rejected fehlt fehlend fehler ungultig gestort null none manquant manquante erreur falta falla ontbreekt mancante'.split(
      ' ',
    ),
};

/** Letters that one file writes for measured or normal and another for missing or null. */
const AMBIGUOUS = new Set(['m', 'n']);

/**
 * What a quality code says by custom, in small letters and without accents.
 * @param code as it stands in the file
 * @returns its meaning; `ambiguous` where files differ; null where nobody knows
 */
export function meaningOf(code: string): QualityMeaning | 'ambiguous' | null {
  const word = wordsOf(code)[0] ?? '';
  if (AMBIGUOUS.has(word)) return 'ambiguous';
  const known = (Object.keys(WORDS) as QualityMeaning[]).find((meaning) => WORDS[meaning].includes(word));
  return known ?? null;
}

/**
 * Whether a cell may be a quality code: a letter, or a word of the trade.
 * @param cell text without surrounding blanks
 */
export function isQualityCode(cell: string): boolean {
  return /^\p{L}\*?$/u.test(cell) || (cell.length <= 20 && !/\d/.test(cell) && meaningOf(cell) !== null);
}
