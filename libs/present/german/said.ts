import type { Translation } from '../language.js';

/**
 * A message in German.
 * @param text its sentence
 * @param consequence what it means or what to do about it, empty where there is nothing
 * @param subject stands in a list with columns of its own for value and limit
 */
export function said(text: string, consequence = '', subject?: string): Translation {
  return { text, consequence, ...(subject === undefined ? {} : { subject }) };
}
