import { LANGUAGES, type Language } from '#libs/present/languages.js';
import { choosePaperLanguage, usePaperLanguage } from './paper-language.js';

const NAMES: Record<Language, string> = { en: 'English', de: 'Deutsch' };

/** In which language the next revision's paper comes; those that are kept stay as they are. */
export function LanguageChoice() {
  const chosen = usePaperLanguage();
  return (
    <p className="row gap">
      <label className="pick">
        Language of the next revision’s paper
        <select value={chosen} onChange={({ target }) => choosePaperLanguage(target.value as Language)}>
          {LANGUAGES.map((language) => (
            <option key={language} value={language} lang={language}>
              {NAMES[language]}
            </option>
          ))}
        </select>
      </label>
    </p>
  );
}
