import type { MeterMap } from '#libs/contract/meter-map.js';
import type { QuestionAsked } from '#libs/contract/question.js';
import { zoneTable } from '#libs/contract/time-zone.js';
import type { RecordOverlap } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { formatMoment } from '#libs/present/local-stamp.js';
import { ScrollTable } from '../draw/scroll-table.js';

const MOST_SPANS = 12;

/** A question of the reader with every reading that makes sense; no answer is nearer than another. */
export function AskedInPlace({
  question,
  timeZone,
  onAnswer,
}: {
  question: QuestionAsked;
  /** zone of the site */
  timeZone: string;
  /** undefined where the file is not at hand any more */
  onAnswer: ((map: MeterMap) => void) | undefined;
}) {
  const { about, readings, overlap } = question;
  return (
    <section className="notice" aria-label={about}>
      <h3>{about}</h3>
      <p className="caption">
        {onAnswer === undefined
          ? 'Drop the file again to answer.'
          : overlap === undefined
            ? 'Every reading below fits the file. Choose one.'
            : 'Nothing is changed until one of them is chosen.'}
      </p>
      {overlap === undefined ? null : <Disagreements overlap={overlap} timeZone={timeZone} />}
      {readings.map((reading, at) => (
        <div key={at} className="row gap">
          <button
            type="button"
            className="button"
            disabled={onAnswer === undefined}
            onClick={() => onAnswer?.(reading.map)}
          >
            {mapWords(reading.map)}
          </button>
          <span className="caption num">
            highest {formatQuantity(reading.maxKw, 'kW')}, {formatQuantity(reading.activeKwh / 1000, 'MWh')} in all
          </span>
          <details>
            <summary className="way">First rows</summary>
            <pre className="note">{reading.firstRows.map((row) => row.join('   ')).join('\n')}</pre>
          </details>
        </div>
      ))}
    </section>
  );
}

/** Where record and file disagree, by the site's clock. */
function Disagreements({ overlap, timeZone }: { overlap: RecordOverlap; timeZone: string }) {
  const { spans, spanCount } = overlap;
  const zone = zoneTable(timeZone, spans[0]!.beginS, spans.at(-1)!.endS);
  return (
    <>
      <ScrollTable name="Where they disagree">
        <thead>
          <tr>
            <th scope="col">from</th>
            <th scope="col">to</th>
            <th scope="col" className="right">
              intervals
            </th>
          </tr>
        </thead>
        <tbody>
          {spans.slice(0, MOST_SPANS).map(({ beginS, endS, intervals }) => (
            <tr key={beginS}>
              <td>{formatMoment(zone, beginS)}</td>
              <td>{formatMoment(zone, endS)}</td>
              <td className="right num">{formatNumber(intervals, 'given')}</td>
            </tr>
          ))}
        </tbody>
      </ScrollTable>
      {spanCount > MOST_SPANS ? (
        <p className="caption">and {formatNumber(spanCount - MOST_SPANS, 'given')} spans more</p>
      ) : null}
    </>
  );
}

const OVERLAP_WORDS = { earlier: 'the record as it stands counts', later: 'the further file counts' } as const;

/** What a reading takes the file for: "energy", "active in W, reactive in var". */
function mapWords({ overlap, ...map }: MeterMap): string {
  if (overlap !== undefined) return OVERLAP_WORDS[overlap];
  const parts = Object.entries(map).map(([name, value]) => {
    if (value === null || typeof value !== 'object') {
      return name === 'quantity'
        ? `${value} in ${value === 'power' ? 'kW and kvar' : 'kWh and kvarh'}`
        : `${spaced(name)}: ${spaced(String(value))}`;
    }
    const inner = Object.entries(value as object).sort(([one], [other]) => (one < other ? -1 : 1));
    return inner.map(([column, word]) => `${spaced(column)} ${name === 'units' ? 'in' : 'from'} ${word}`).join(', ');
  });
  return parts.join(', ');
}

function spaced(word: string): string {
  return word.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
}
