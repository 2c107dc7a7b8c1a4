/**
 * Every note a reader may put on a record, with the values that come with it.
 * The message catalogue holds a sentence for each.
 */
export const NOTE_CODES = {
  'file-read-as': ['format', 'columns'],
  'encoding-converted': ['encoding'],
  'rows-before-header': ['rows'],
  'header-repeated': ['rows'],
  'total-rows-left-out': ['rows'],
  'decimal-mark-settled': ['mark'],
  'thousands-divided': ['numbers'],
  'date-order-settled': ['order'],
  'rows-newest-first': ['rows'],
  'rows-put-in-order': ['rows'],
  'duplicates-dropped': ['rows'],
  'conflicting-rows-settled': ['rows', 'kept'],
  'intervals-without-value': ['intervals'],
  'zone-assumed-utc': [],
  'zone-from-header': ['zone'],
  'stamps-assumed-beginnings': [],
  'stamps-mark-ends': ['because'],
  'midnight-under-ending-day': ['rows'],
  'doubled-hour-by-order': ['rows'],
  'doubled-hour-once': ['rows'],
  'skipped-hour-left-out': ['rows'],
  'unit-read-as-mega': ['columns'],
  'reactive-in-kilowatt': ['columns'],
  'leading-not-recorded': [],
  'reactive-sign-taken': ['lagging', 'negative'],
  'reactive-never-leading': [],
  'export-subtracted': ['column'],
  'voltage-taken-line-to-line': ['column'],
  'intervals-repaired': ['method', 'intervals', 'upToS'],
  'nem12-time': ['zone'],
  'nem12-header-missing': [],
  'nem12-end-missing': [],
  'nem12-streams-added': ['streams', 'quantity'],
  'nem12-streams-left-out': ['streams'],
  'nem12-substituted': ['values'],
  'nem12-quality-unstated': ['values'],
} as const satisfies Record<string, readonly string[]>;

/** Notes that no file raises by itself: what came of extending a record, and which kept answers a file was read with. */
export const RECORD_NOTE_CODES = {
  'record-extended': ['added', 'agreed'],
  'overlap-settled': ['intervals', 'kept'],
  'column-left-out': ['column'],
  'kept-answers-used': ['name', 'version'],
} as const satisfies Record<string, readonly string[]>;

export type NoteTable = typeof NOTE_CODES & typeof RECORD_NOTE_CODES;
export type NoteCode = keyof NoteTable;
