import type { Remark } from '#libs/engine/index.js';
import { deviceName, enteredWords } from './device-words.js';
import { engineName } from './engine-name.js';
import { capital } from './first-letter.js';
import { formatApart, formatNumber, formatQuantity, GAP, unitOfName } from './format-number.js';
import { spokenCatalogue, type Translation } from './language.js';
import { formatDate, formatLength, formatMonth } from './local-stamp.js';
import type { Message } from './message.js';
import { MESSAGES } from './message-catalogue.js';
import { plainName } from './plain-name.js';
import { standingName } from './standing-name.js';

const PLACEHOLDER = /\{(\w+)(?::([^|}]*)\|([^}]*))?\}/g;
const OPTIONAL = /\[([^\]]*)\]/g;

/**
 * A remark with its sentence filled in.
 * @param remark code and values
 * @returns the same, with `text`
 */
export function remarkInWords(remark: Remark): Remark {
  return { ...remark, text: remarkSentence(remark) };
}

/**
 * The sentence of a remark; a code the catalogue does not hold reads as itself with its values.
 * @param remark code and values
 * @returns a sentence, first letter large
 */
export function remarkSentence(remark: Remark): string {
  const message = spokenMessage(remark.code);
  if (message === null) return `${remark.code}${listed(remark)}.`;
  return capital(filled(message.text, remark));
}

/**
 * What a remark is about, for a list that prints value and limit in columns of their own.
 * @param remark code and values
 * @returns a phrase or a sentence, first letter large
 */
export function remarkSubject(remark: Remark): string {
  const subject = spokenMessage(remark.code)?.subject;
  return subject === undefined ? remarkSentence(remark) : capital(filled(subject, remark));
}

/**
 * What a remark means or what to do about it.
 * @param remark code and values
 * @returns a sentence, empty where there is nothing to do
 */
export function remarkConsequence(remark: Remark): string {
  const message = spokenMessage(remark.code);
  return message === null ? '' : filled(message.consequence, remark);
}

/**
 * The catalogue's entry for a code.
 * @param code of a remark
 * @returns the entry, or null where there is none
 */
export function messageOf(code: string): Message | null {
  return MESSAGES[code] ?? null;
}

/** The entry's texts in the language in force; English where its catalogue lacks the code. */
function spokenMessage(code: string): Translation | null {
  return spokenCatalogue()?.messages[code] ?? messageOf(code);
}

/**
 * Names that a sentence needs, without those in its optional parts.
 * @param template sentence of the catalogue
 * @returns names of values
 */
export function neededNames(template: string): string[] {
  return [...template.replace(OPTIONAL, '').matchAll(PLACEHOLDER)].map(([, name]) => name!);
}

function filled(template: string, remark: Remark): string {
  const chosen = template.replace(OPTIONAL, (_, part: string) => (complete(part, remark) ? part : ''));
  return chosen.replace(PLACEHOLDER, (_, name: string, one?: string, many?: string) => {
    const value = remark.values[name];
    if (value === undefined) return '–';
    if (one !== undefined && typeof value === 'number') {
      const count = formatNumber(value, 'given');
      return `${count}${GAP}${count === '1' ? one : many}`;
    }
    return valueWords(name, value, remark);
  });
}

function complete(part: string, remark: Remark): boolean {
  return [...part.matchAll(PLACEHOLDER)].every(([, name]) => remark.values[name!] !== undefined);
}

/** Lengths of time read better in minutes; a value held against its limit keeps apart from it. */
function valueWords(name: string, value: number | string, remark: Remark): string {
  if (typeof value === 'string')
    return name === 'columns' && remark.code === 'file-read-as' ? columnRoles(value) : textWords(name, value);
  const unit = name === 'value' || name === 'limit' ? (remark.unit ?? '') : unitOfName(name);
  if (unit === 's') return seconds(value);
  const { value: found, limit } = remark.values;
  if ((name === 'value' || name === 'limit') && typeof found === 'number' && typeof limit === 'number') {
    const apart = formatApart(found, limit);
    return `${name === 'value' ? apart.value : apart.limit}${GAP}${unit}`;
  }
  return formatQuantity(value, unit, 'given');
}

/** What each column was read as, then what it calls itself. */
function columnRoles(columns: string): string {
  const said = columns.split('; ').map((column) => column.replace(/^[A-Za-z]+/, (role) => engineName(spaced(role))));
  return plainName(said.join('; '));
}

/** Values that a user or a file named; they are never translated. */
const GIVEN_NAMES = new Set(['name', 'column', 'columns', 'meter', 'meters', 'sheet', 'sheets', 'channels', 'zone']);

function textWords(name: string, value: string): string {
  if (name === 'month') return formatMonth(value);
  if (name === 'date') return formatDate(value);
  if (name === 'device') return deviceName(value);
  if (name === 'standing') return standingName(value);
  const said = name === 'value' || name === 'limit' ? enteredWords(spaced(value)) : spaced(value);
  return plainName(GIVEN_NAMES.has(name) ? said : engineName(said));
}

function seconds(value: number): string {
  const exact = formatQuantity(value, 's', 'given');
  return value >= 120 ? `${exact} (${formatLength(Math.round(value))})` : exact;
}

/** "nearestLevel" reads "nearest level". */
function spaced(word: string): string {
  return /^[a-z]+(?:[A-Z][a-z]+)+$/.test(word) ? word.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`) : word;
}

function listed(remark: Remark): string {
  const entries = Object.entries(remark.values).map(([name, value]) => `${name} ${valueWords(name, value, remark)}`);
  return entries.length === 0 ? '' : `: ${entries.join(', ')}`;
}
