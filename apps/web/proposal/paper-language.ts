import { useSyncExternalStore } from 'react';
import { type Language, languageOf } from '#libs/present/languages.js';

const KEY = 'varwright:paper-language';
const listeners = new Set<() => void>();

/** The language that papers are asked for in from this browser. */
export function paperLanguage(): Language {
  return languageOf(localStorage.getItem(KEY)) ?? 'en';
}

/** What a request for a plan says of its paper. */
export function paperAsked(): { language?: Language } {
  const language = paperLanguage();
  return language === 'en' ? {} : { language };
}

export function choosePaperLanguage(chosen: Language): void {
  localStorage.setItem(KEY, chosen);
  for (const listener of listeners) listener();
}

/** The language of papers, followed. */
export function usePaperLanguage(): Language {
  return useSyncExternalStore((changed) => {
    listeners.add(changed);
    return () => listeners.delete(changed);
  }, paperLanguage);
}
