import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { remarkConsequence } from '#libs/present/remark-words.js';
import type { RecordShown } from '../api/shown.js';

const GRADES = {
  full: 'a full year',
  usable: 'usable: some of the year is missing',
  limited: 'limited: weeks of the year at most',
  insufficient: 'insufficient: too short or too full of gaps to plan on',
} as const;

/** What the reader decided, repaired or left out. */
export function ReadingFindings({ record }: { record: RecordShown }) {
  const { quality, record: summary, file } = record;
  const rows: [string, string][] = [
    ['file', file.name ?? 'without a name'],
    ['format', quality.format],
    ['rows read', formatNumber(quality.rowsRead, 'given')],
    ['intervals expected', formatNumber(quality.intervalsExpected, 'given')],
    ['missing', formatNumber(summary.missing, 'given')],
    ['repaired', formatNumber(summary.repaired, 'given')],
    ['repeats left out', formatNumber(summary.duplicates, 'given')],
    ['rows rejected', formatNumber(quality.rejectedRows, 'given')],
    ['seasons without readings', quality.seasonsMissing.length === 0 ? 'none' : quality.seasonsMissing.join(', ')],
    ['active energy', formatQuantity(summary.activeKwh / 1000, 'MWh')],
    ['lagging energy', formatQuantity(summary.laggingKvarh / 1000, 'Mvarh')],
    ['leading energy', formatQuantity(summary.leadingKvarh / 1000, 'Mvarh')],
  ];
  return (
    <div className="split halves">
      <section className="section" aria-labelledby="reading">
        <h2 id="reading">The reading is {GRADES[quality.grade]}</h2>
        {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a table that scrolls must be reached by keyboard */}
        <section className="table" tabIndex={0} aria-label="The reading">
          <table>
            <tbody>
              {rows.map(([name, text]) => (
                <tr key={name}>
                  <th scope="row">{name}</th>
                  <td className="right">{text}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </section>
      </section>
      <section className="section" aria-labelledby="decided">
        <h2 id="decided">What the reader decided</h2>
        {summary.notes.length === 0 ? <p className="caption">Nothing was left to decide.</p> : null}
        <ul>
          {summary.notes.map((note, at) => (
            <li key={at} className="point" style={{ gridTemplateColumns: 'minmax(0, 1fr)' }}>
              <div>
                {note.text}
                <p>{remarkConsequence(note)}</p>
              </div>
            </li>
          ))}
        </ul>
      </section>
    </div>
  );
}
