import type { Messages } from './message.js';

/** What the reader of a meter file decided, repaired or left out. */
export const NOTE_MESSAGES: Messages = {};
