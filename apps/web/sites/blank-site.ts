import { withValueAt } from '../field/document-path.js';
import { readTyped } from '../field/read-typed.js';

/** A field of the form for a blank site. */
export interface BlankField {
  path: string;
  label: string;
  /** absent for words */
  unit?: string;
  value: string;
  choices?: readonly (readonly [value: string, words: string])[];
}

/** What a site cannot be without, and what stands on the switchboard's nameplates. */
export const BLANK: readonly BlankField[] = [
  { path: 'name', label: 'name', value: '' },
  { path: 'timeZone', label: 'zone', value: 'Europe/Dublin' },
  {
    path: 'rules',
    label: 'rules',
    value: 'iec',
    choices: [
      ['iec', 'IEC'],
      ['ieee', 'IEEE and NEC'],
    ],
  },
  { path: 'frequencyHz', label: 'frequency', unit: 'Hz', value: '50' },
  { path: 'bus.nominalV', label: 'bus voltage', unit: 'V', value: '400' },
  { path: 'supply.faultLevelMva.max', label: 'fault level, greatest', unit: 'MVA', value: '250' },
  { path: 'supply.transformers[0].ratedKva', label: 'transformer', unit: 'kVA', value: '1000' },
  { path: 'supply.transformers[0].impedancePct', label: 'its impedance', unit: '%', value: '6' },
  {
    path: 'meteredAt',
    label: 'the meter stands',
    value: 'bus',
    choices: [
      ['bus', 'at the bus'],
      ['primary', 'at the primary'],
    ],
  },
];

/**
 * The site file of a filled-in form; what is empty is left out, what is unreadable goes as typed and is refused there.
 * @param values texts by path
 */
export function blankDocument(values: Readonly<Record<string, string>>): unknown {
  let document: unknown = {};
  for (const { path, unit } of BLANK) {
    const text = (values[path] ?? '').trim();
    if (text === '') continue;
    const read = unit === undefined ? null : readTyped(text, unit);
    document = withValueAt(document, path, read !== null && 'value' in read ? read.value : text);
  }
  return document;
}
