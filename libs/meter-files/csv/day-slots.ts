const DAY_S = 86_400;
const STEPS = [3600, 1800, 900, 600, 300];

/** One column of a file that has a row a day. */
export interface DaySlot {
  /** counted from 0 */
  column: number;
  /** beginning of the interval since midnight, by the clock or by time passed [s] */
  beginS: number;
  /** the second of two columns with one time: the second pass of a doubled hour */
  second: boolean;
  /** what the name says beside the time */
  rest: string;
}

/** The columns of the hours or quarter hours of a day. */
export interface DaySlots {
  slots: DaySlot[];
  stepS: number;
  /** columns carry numbers, so that they may count the time passed since midnight */
  counted: boolean;
  /** what a time in a name marks; null where nothing shows it and beginnings are taken */
  mark: 'begin' | 'end' | null;
}

interface Label {
  column: number;
  rest: string;
  /** time in the name [s], or a count */
  at: number;
  /** end of a range [s] */
  until: number | null;
  kind: 'clock' | 'count' | 'ending' | 'beginning';
}

/** Longer names are no hours: searching them for one would take the square of their length. */
const LONGEST_LABEL = 200;

const CLOCK =
  /^(.*?)[\s_(]*(\d{1,2})[:h](\d{2})(?::00)?(?:\s*(?:-|–|to|bis|à)\s*(\d{1,2})[:h](\d{2})(?::00)?)?\)?\s*(?:[ab*²]|\(2\))?$/iu;
const DIGITS = /^(\d{2})(\d{2})$/;
const COUNT =
  /^(.*?)[\s_]*(?<![\p{L}])(he|hour ending|hb|hour beginning|h|hr|hour|q|qh|v|t|int|interval|period|std|stunde)?[\s_.]*(\d{1,3})\s*$/iu;

/**
 * Finds the hours or quarter hours of a day among the names of a header: 00:15 … 24:00, 0015 … 2400, 1 … 24, H01 … H96,
 * HE 1 … HE 24, once or once a quantity.
 * @param names of the columns
 * @param stamp what a person says that times mark
 * @returns the columns, or null where they do not make a whole day
 */
export function daySlots(names: readonly string[], stamp: 'begin' | 'end' | undefined): DaySlots | null {
  if (names.length < 24) return null;
  const clocks = names.map(clockLabel);
  const labels = clocks.filter((label) => label !== null);
  const digits = names.map(digitLabel).filter((label) => label !== null);
  const counts = names.map(countLabel).filter((label) => label !== null);
  return wholeDay(labels, stamp) ?? wholeDay(digits, stamp) ?? wholeDay(counts, stamp);
}

function clockLabel(name: string, column: number): Label | null {
  const parts = name.length > LONGEST_LABEL ? null : CLOCK.exec(name);
  if (parts === null) return null;
  const [, rest, hour, minute, untilHour, untilMinute] = parts;
  const until = untilHour === undefined ? null : Number(untilHour) * 3600 + Number(untilMinute) * 60;
  return { column, rest: rest!.trim(), at: Number(hour) * 3600 + Number(minute) * 60, until, kind: 'clock' };
}

function digitLabel(name: string, column: number): Label | null {
  const parts = DIGITS.exec(name);
  if (parts === null || Number(parts[2]) > 59) return null;
  return { column, rest: '', at: Number(parts[1]) * 3600 + Number(parts[2]) * 60, until: null, kind: 'clock' };
}

function countLabel(name: string, column: number): Label | null {
  const parts = name.length > LONGEST_LABEL ? null : COUNT.exec(name);
  if (parts === null) return null;
  const word = parts[2]?.toLowerCase() ?? '';
  const kind = word === 'he' || word === 'hour ending' ? 'ending' : /^hb|beginning$/.test(word) ? 'beginning' : 'count';
  return { column, rest: parts[1]!.trim(), at: Number(parts[3]), until: null, kind };
}

/** The labels as slots, where those of each quantity make one whole day. */
function wholeDay(labels: readonly Label[], stamp: 'begin' | 'end' | undefined): DaySlots | null {
  const blocks = new Map<string, Label[]>();
  for (const label of labels) blocks.set(label.rest, [...(blocks.get(label.rest) ?? []), label]);
  const days = [...blocks.values()]
    .filter((block) => block.length >= 24)
    .map((block) => (block[0]!.kind === 'clock' ? clockDay(block, stamp) : countedDay(block)));
  const [first] = days;
  if (first === undefined || first === null) return null;
  if (!days.every((day) => day !== null && day.stepS === first.stepS && day.mark === first.mark)) return null;
  return { ...first, slots: days.flatMap((day) => day!.slots) };
}

function clockDay(block: readonly Label[], stamp: 'begin' | 'end' | undefined): DaySlots | null {
  const times = new Set(block.map(({ at }) => at));
  const stepS = DAY_S / times.size;
  const last = block.at(-1)!.at;
  if (!STEPS.includes(stepS) || block.some(({ at }) => at > DAY_S || at % stepS !== 0)) return null;
  const ranged = block.every(({ until }) => until !== null);
  const ends = block[0]!.at === stepS && (last === DAY_S || last === 0);
  if (!ends && block[0]!.at !== 0) return null;
  const mark = ranged ? 'begin' : ends ? 'end' : (stamp ?? null);
  const seen = new Set<number>();
  const slots = block.map(({ column, at, rest }) => {
    const second = seen.has(at);
    seen.add(at);
    const endS = ends && at === 0 ? DAY_S : at;
    return { column, beginS: mark === 'end' ? endS - stepS : at, second, rest };
  });
  return { slots, stepS, counted: false, mark };
}

function countedDay(block: readonly Label[]): DaySlots | null {
  const [first] = block;
  const from = first!.at;
  if (from > 1 || block.some(({ at, kind }, index) => at !== from + index || kind !== first!.kind)) return null;
  if (first!.kind === 'ending' && from !== 1) return null;
  if (first!.kind === 'beginning' && from !== 0) return null;
  // a day of 25 hours has a column more an hour
  const stepS = STEPS.find((step) => block.length === DAY_S / step || block.length === DAY_S / step + 3600 / step);
  if (stepS === undefined) return null;
  const slots = block.map(({ column, rest }, index) => ({ column, beginS: index * stepS, second: false, rest }));
  return { slots, stepS, counted: true, mark: 'begin' };
}
