/** The words of one language other than English, which is the language of the source. */
export interface Catalogue {
  /** its two letters by ISO 639 */
  language: string;
  decimalMark: '.' | ',';
  /** by the English text, values as {0}, {1} in any order */
  texts: Readonly<Record<string, string>>;
  /** keys and codes of a site file, by their words in English; apart from the texts, since a word's case may differ there */
  fields: Readonly<Record<string, string>>;
  /** by remark code, in place of the English message */
  messages: Readonly<Record<string, Translation>>;
  /** words of several, small letters, with the places where a narrow line may part them */
  partings: readonly string[];
}

/** A message of the catalogue in another language; its level does not depend on words. */
export interface Translation {
  text: string;
  subject?: string;
  consequence: string;
}

let spoken: Catalogue | null = null;

/**
 * Puts everything into words of another language while `speak` runs. What is awaited inside would go on in English, so
 * nothing may be.
 * @param catalogue of the language, null for English
 * @param speak puts together texts at once
 * @returns what `speak` returns
 */
export function inLanguage<T>(catalogue: Catalogue | null, speak: () => T): T {
  const before = spoken;
  spoken = catalogue;
  try {
    const said = speak();
    if (said instanceof Promise) throw new Error('words of a language are put together at once, not awaited');
    return said;
  } finally {
    spoken = before;
  }
}

/**
 * A key or code of a site file in the language in force.
 * @param said its words in English
 * @returns the words; English where the catalogue has no entry
 */
export function fieldName(said: string): string {
  return spoken?.fields[said] ?? said;
}

/** The catalogue in force, null while English is spoken. */
export function spokenCatalogue(): Catalogue | null {
  return spoken;
}

/**
 * Where a word may be parted by a hyphen in the language in force.
 * @param word letters alone, or with signs behind them
 * @returns its parts in their order, one where it has no such place
 */
export function hyphenParts(word: string): string[] {
  const small = word.toLowerCase();
  const found = spoken?.partings.find((one) => small.startsWith(one.replaceAll('|', '')));
  if (found === undefined) return [word];
  let from = 0;
  const ends = found.split('|').map((part) => (from += part.length));
  return ends.map((end, at) => word.slice(ends[at - 1] ?? 0, at === ends.length - 1 ? word.length : end));
}

/** A template's own texts and the key it stands under, by the place in the source that holds it. */
const forms = new WeakMap<TemplateStringsArray, { texts: string[]; key: string }>();

/**
 * Words with values put in, in the language in force: say`${count} missing` is looked up as "{0} missing". A line break
 * with what follows it up to the next word counts as one space.
 * @returns text; English where the catalogue has no entry
 */
export function say(template: TemplateStringsArray, ...values: readonly (string | number)[]): string {
  const form = formOf(template);
  const text = spoken?.texts[form.key];
  if (text !== undefined) return text.replace(/\{(\d+)\}/g, (_, at: string) => String(values[Number(at)]));
  return form.texts.reduce((said, part, at) => `${said}${values[at - 1]}${part}`);
}

function formOf(template: TemplateStringsArray): { texts: string[]; key: string } {
  const known = forms.get(template);
  if (known !== undefined) return known;
  const texts = template.map((part) => part.replace(/\n\s*/g, ' '));
  const form = { texts, key: texts.reduce((key, part, at) => `${key}{${at - 1}}${part}`) };
  forms.set(template, form);
  return form;
}

/**
 * A table of words: each of its texts is read in the language in force, whenever it is read.
 * @param table names and texts, lists and tables of them
 * @returns the same shape; what the catalogue does not hold stays as it is
 */
export function words<T>(table: T): T {
  if (typeof table !== 'object' || table === null) return table;
  const said = Array.isArray(table) ? [] : {};
  for (const [name, entry] of Object.entries(table)) {
    if (typeof entry === 'string') {
      const get = () => spoken?.texts[entry] ?? entry;
      Object.defineProperty(said, name, { get, enumerable: true, configurable: true });
    } else {
      Object.defineProperty(said, name, { value: words(entry), enumerable: true, configurable: true });
    }
  }
  return said as T;
}
