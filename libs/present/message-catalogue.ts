import { ASSUMPTION_MESSAGES } from './assumption-messages.js';
import { CAUTION_MESSAGES } from './caution-messages.js';
import { ESTIMATE_MESSAGES } from './estimate-messages.js';
import type { Messages } from './message.js';
import { MONEY_MESSAGES } from './money-messages.js';
import { NOTE_MESSAGES } from './note-messages.js';
import { REASON_MESSAGES } from './reason-messages.js';
import { RECORD_MESSAGES } from './record-messages.js';
import { UNUSUAL_MESSAGES } from './unusual-messages.js';

/** One sentence for every code of a remark. */
export const MESSAGES: Messages = {
  ...REASON_MESSAGES,
  ...ASSUMPTION_MESSAGES,
  ...CAUTION_MESSAGES,
  ...NOTE_MESSAGES,
  ...MONEY_MESSAGES,
  ...RECORD_MESSAGES,
  ...ESTIMATE_MESSAGES,
  ...UNUSUAL_MESSAGES,
};
