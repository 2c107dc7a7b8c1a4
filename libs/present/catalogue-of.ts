import { GERMAN } from './german/german.js';
import type { Catalogue } from './language.js';
import type { Language } from './languages.js';

const CATALOGUES: Record<Language, Catalogue | null> = { en: null, de: GERMAN };

/**
 * The words of a language.
 * @param language of a paper
 * @returns its catalogue, null for English, whose words stand in the source
 */
export function catalogueOf(language: Language): Catalogue | null {
  return CATALOGUES[language];
}
