/** The languages papers come in, by ISO 639. */
export const LANGUAGES = ['en', 'de'] as const;
export type Language = (typeof LANGUAGES)[number];

/** The language of two letters, null where no paper comes in what they say. */
export function languageOf(letters: unknown): Language | null {
  return LANGUAGES.find((language) => language === letters) ?? null;
}
