import { useMemo } from 'react';
import { isTimeZone, zoneTableOf } from '#libs/contract/time-zone.js';
import { isRecordSign, type Remark, UTC_TABLE, type ZoneTable } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { gradeWords, MONTH_HEADS, monthCells, qualityRows } from '#libs/present/quality-words.js';
import { remarkConsequence, remarkSentence } from '#libs/present/remark-words.js';
import type { RecordShown } from '../api/shown.js';
import { ScrollTable } from '../draw/scroll-table.js';

/** How good the reading is, what its values ask, and what the reader decided, repaired or left out. */
export function ReadingFindings({ record, timeZone }: { record: RecordShown; timeZone: string }) {
  const { quality, record: summary, againstSupply } = record;
  const { beginS: firstS, endS } = summary;
  // a zone that is still being typed is none
  const zone = useMemo(
    () => (isTimeZone(timeZone) ? zoneTableOf(timeZone, { firstS, endS }) : UTC_TABLE),
    [timeZone, firstS, endS],
  );
  const questions = [...againstSupply, ...quality.questions];
  const decided = summary.notes.filter((note) => !isRecordSign(note));
  return (
    <>
      <div className="split halves">
        <section className="section" aria-labelledby="reading">
          <h2 id="reading">The reading is {gradeWords(quality.grade)}</h2>
          <p className="caption">{remarkSentence(quality.gradeRule)}</p>
          <ReadingTable rows={rowsOf(record, zone)} />
        </section>
        <section className="section" aria-labelledby="asked">
          <h2 id="asked">What the values ask</h2>
          <RemarkList
            remarks={questions}
            none="Nothing stands out: no step, no lost phase, no register that stands still."
          />
          <h2 id="decided">What the reader decided</h2>
          <RemarkList remarks={decided} none="Nothing was left to decide." />
        </section>
      </div>
      <CoverageTable record={record} />
    </>
  );
}

function rowsOf({ quality, record, file }: RecordShown, zone: ZoneTable): [string, string][] {
  return [
    ['file', file.name ?? 'without a name'],
    ...qualityRows(quality, zone),
    ['missing', formatNumber(record.missing, 'given')],
    ['active energy', formatQuantity(record.activeKwh / 1000, 'MWh')],
    ['lagging energy', formatQuantity(record.laggingKvarh / 1000, 'Mvarh')],
    ['leading energy', formatQuantity(record.leadingKvarh / 1000, 'Mvarh')],
  ];
}

function ReadingTable({ rows }: { rows: [string, string][] }) {
  return (
    <ScrollTable name="The reading">
      <tbody>
        {rows.map(([name, text]) => (
          <tr key={name}>
            <th scope="row">{name}</th>
            <td className="right">{text}</td>
          </tr>
        ))}
      </tbody>
    </ScrollTable>
  );
}

function CoverageTable({ record: { quality } }: { record: RecordShown }) {
  return (
    <section className="section" aria-labelledby="coverage">
      <h2 id="coverage">How much of each month is there</h2>
      <ScrollTable name="Coverage by month">
        <thead>
          <tr>
            {MONTH_HEADS.map((head, at) => (
              <th key={head} scope="col" className={at === 0 ? undefined : 'right'}>
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {quality.months.map((month) => {
            const [name, ...cells] = monthCells(month);
            return (
              <tr key={month.month}>
                <th scope="row">{name}</th>
                {cells.map((cell, at) => (
                  <td key={MONTH_HEADS[at + 1]} className="right">
                    {cell}
                  </td>
                ))}
              </tr>
            );
          })}
        </tbody>
      </ScrollTable>
    </section>
  );
}

function RemarkList({ remarks, none }: { remarks: readonly Remark[]; none: string }) {
  if (remarks.length === 0) return <p className="caption">{none}</p>;
  return (
    <ul>
      {remarks.map((remark, at) => (
        <li key={at} className="point" style={{ gridTemplateColumns: 'minmax(0, 1fr)' }}>
          <div>
            {remarkSentence(remark)}
            <p>{remarkConsequence(remark)}</p>
          </div>
        </li>
      ))}
    </ul>
  );
}
