import type { Catalogue } from '../language.js';
import { GERMAN_ASSUMPTION_MESSAGES } from './german-assumption-messages.js';
import { GERMAN_BASIS_TEXTS } from './german-basis-texts.js';
import { GERMAN_CAUTION_MESSAGES } from './german-caution-messages.js';
import { GERMAN_CHANNEL_NOTE_MESSAGES } from './german-channel-note-messages.js';
import { GERMAN_DEVICE_TEXTS } from './german-device-texts.js';
import { GERMAN_DOCUMENT_TEXTS } from './german-document-texts.js';
import { GERMAN_ESTIMATE_MESSAGES } from './german-estimate-messages.js';
import { GERMAN_FIELD_NAMES } from './german-field-names.js';
import { GERMAN_FIGURE_TEXTS } from './german-figure-texts.js';
import { GERMAN_JUDGEMENT_TEXTS } from './german-judgement-texts.js';
import { GERMAN_MONEY_MESSAGES } from './german-money-messages.js';
import { GERMAN_MONEY_TEXTS } from './german-money-texts.js';
import { GERMAN_NAME_TEXTS } from './german-name-texts.js';
import { GERMAN_NETWORK_TEXTS } from './german-network-texts.js';
import { GERMAN_NOTE_MESSAGES } from './german-note-messages.js';
import { GERMAN_PARTINGS } from './german-partings.js';
import { GERMAN_REASON_MESSAGES } from './german-reason-messages.js';
import { GERMAN_RECORD_MESSAGES } from './german-record-messages.js';
import { GERMAN_SITE_TEXTS } from './german-site-texts.js';
import { GERMAN_UNUSUAL_MESSAGES } from './german-unusual-messages.js';

/** German, with the terms of the trade in use in Germany, Austria and Switzerland. */
export const GERMAN: Catalogue = {
  language: 'de',
  decimalMark: ',',
  texts: {
    ...GERMAN_JUDGEMENT_TEXTS,
    ...GERMAN_NAME_TEXTS,
    ...GERMAN_DEVICE_TEXTS,
    ...GERMAN_FIGURE_TEXTS,
    ...GERMAN_MONEY_TEXTS,
    ...GERMAN_SITE_TEXTS,
    ...GERMAN_DOCUMENT_TEXTS,
    ...GERMAN_BASIS_TEXTS,
    ...GERMAN_NETWORK_TEXTS,
  },
  fields: GERMAN_FIELD_NAMES,
  messages: {
    ...GERMAN_ASSUMPTION_MESSAGES,
    ...GERMAN_CAUTION_MESSAGES,
    ...GERMAN_ESTIMATE_MESSAGES,
    ...GERMAN_MONEY_MESSAGES,
    ...GERMAN_NOTE_MESSAGES,
    ...GERMAN_CHANNEL_NOTE_MESSAGES,
    ...GERMAN_REASON_MESSAGES,
    ...GERMAN_RECORD_MESSAGES,
    ...GERMAN_UNUSUAL_MESSAGES,
  },
  partings: GERMAN_PARTINGS,
};
