import { shown } from '#libs/contract/shown.js';
import { InputProblem } from '#libs/engine/index.js';
import type { MeterBytes } from '../meter-bytes.js';

/** A segment longer than this is none of a meter message [bytes]. */
const LONGEST_SEGMENT = 4096;
const LF = 0x0a;
const CR = 0x0d;

/** The characters with a meaning of their own, as ISO 9735 sets them where no UNA segment says otherwise. */
const DEFAULT = { component: ':', element: '+', release: '?', terminator: "'" };

/** A segment: its data elements, each a list of components, escapes taken away. */
export type Segment = string[][];

/**
 * The segments of an interchange, in order; the service string advice (UNA) is applied and not handed on.
 * @param source the file
 * @param take hears of each segment and its number, counted from 1, UNA included
 * @throws InputProblem where a segment is endless or the file ends within one
 */
export async function readSegments(
  source: MeterBytes,
  take: (segment: Segment, number: number) => void,
): Promise<void> {
  const decoder = new TextDecoder('latin1');
  const cutter = new SegmentCutter(take);
  for (let chunk = await source.next(); chunk !== null; chunk = await source.next()) {
    cutter.add(decoder.decode(chunk, { stream: true }));
  }
  cutter.end();
}

/** The service string advice is nine characters long. */
const ADVICE = 9;

class SegmentCutter {
  readonly #take: (segment: Segment, number: number) => void;
  #marks = DEFAULT;
  #text = '';
  #number = 0;
  #begun = false;

  constructor(take: (segment: Segment, number: number) => void) {
    this.#take = take;
  }

  add(text: string): void {
    this.#text += text;
    if (!this.#begun && !this.#begin()) return;
    let from = 0;
    for (let to = this.#endAfter(from); to >= 0; to = this.#endAfter(from)) {
      const segment = segmentOf(this.#text.slice(from, to), this.#marks);
      this.#number++;
      if (!/^[A-Z]{3}$/.test(segment[0]![0]!)) refuseTag(segment[0]![0]!, this.#number);
      this.#take(segment, this.#number);
      from = to + 1;
    }
    this.#text = this.#text.slice(from);
    if (this.#text.length > LONGEST_SEGMENT) refuseEndless(this.#number + 1);
  }

  end(): void {
    if (this.#text.trim() !== '') refuseOpen(this.#number + 1);
  }

  #begin(): boolean {
    this.#text = this.#text.trimStart();
    if (this.#text.length < ADVICE) return false;
    this.#begun = true;
    if (!this.#text.startsWith('UNA')) return true;
    const [component = '', element = '', , release = '', , terminator = ''] = this.#text.slice(3, ADVICE);
    this.#marks = { component, element, release, terminator };
    this.#text = this.#text.slice(ADVICE);
    this.#number = 1;
    return true;
  }

  #endAfter(from: number): number {
    return endOfSegment(this.#text, from, this.#marks);
  }
}

function endOfSegment(text: string, from: number, { terminator, release }: typeof DEFAULT): number {
  let to = text.indexOf(terminator, from);
  while (to >= 0 && isReleased(text, to, from, release)) to = text.indexOf(terminator, to + 1);
  return to;
}

/** An odd number of release characters before a character takes away its meaning. */
function isReleased(text: string, at: number, from: number, release: string): boolean {
  if (release === ' ') return false;
  let count = 0;
  for (let i = at - 1; i >= from && text[i] === release; i--) count++;
  return count % 2 === 1;
}

function segmentOf(raw: string, { component, element, release }: typeof DEFAULT): Segment {
  const elements: Segment = [['']];
  for (let i = firstOf(raw); i < raw.length; i++) {
    const last = elements[elements.length - 1]!;
    const char = raw[i]!;
    if (char === release && release !== ' ' && i + 1 < raw.length) last[last.length - 1] += raw[++i]!;
    else if (char === element) elements.push(['']);
    else if (char === component) last.push('');
    else last[last.length - 1] += char;
  }
  return elements;
}

/** Line ends between segments have no meaning. */
function firstOf(raw: string): number {
  let at = 0;
  while (raw.charCodeAt(at) === LF || raw.charCodeAt(at) === CR || raw[at] === ' ') at++;
  return at;
}

function refuseTag(tag: string, row: number): never {
  throw new InputProblem([
    { code: 'unreadable', row, expected: 'a segment tag of three capital letters', found: shown(tag) },
  ]);
}

function refuseEndless(row: number): never {
  const expected = `a segment of at most ${LONGEST_SEGMENT} characters`;
  throw new InputProblem([{ code: 'too-large', row, expected, found: 'a longer one' }]);
}

function refuseOpen(row: number): never {
  throw new InputProblem([
    { code: 'unreadable', row, expected: 'the end of the segment', found: 'the end of the file' },
  ]);
}
