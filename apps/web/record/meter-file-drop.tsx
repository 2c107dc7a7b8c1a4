import { type DragEvent, useState } from 'react';
import type { QuestionAsked } from '#libs/contract/question.js';
import { formatQuantity } from '#libs/present/format-number.js';
import { NoConnection, Refused } from '../api/ask.js';
import { useDesk } from '../desk/use-desk.js';
import { Mark } from '../draw/verdict-mark.js';

/** Where a meter file is dropped, what it leaves open is asked, and what could not be read is said. */
export function MeterFileDrop() {
  const { desk, state } = useDesk();
  const [file, setFile] = useState<File | null>(null);
  const [isOver, setOver] = useState(false);
  const [isReading, setReading] = useState(false);
  const [refusals, setRefusals] = useState<string[]>([]);
  const [questions, setQuestions] = useState<readonly QuestionAsked[]>([]);
  const [map, setMap] = useState<object>({});
  const read = async (chosen: File, answers: object) => {
    setFile(chosen);
    setMap(answers);
    setReading(true);
    setRefusals([]);
    setQuestions([]);
    try {
      const options: Record<string, string> = Object.keys(answers).length === 0 ? {} : { map: JSON.stringify(answers) };
      await desk.upload(chosen, options);
    } catch (error) {
      const asked = error instanceof Refused ? (error.problem.questions ?? []) : [];
      setQuestions(asked);
      if (asked.length === 0) setRefusals(refusalWords(error));
    }
    setReading(false);
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    const dropped = event.dataTransfer.files[0];
    if (dropped !== undefined) void read(dropped, {});
  };
  return (
    <section className="section" aria-labelledby="drop">
      <h2 id="drop">{state.records.length === 0 ? 'The meter file' : 'Another meter file'}</h2>
      <label
        className={isOver ? 'drop over' : 'drop'}
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
      >
        Drop it here, or choose it. Time, active and reactive power or energy, in any of the usual spellings; NEM12 as
        well.
        <br />
        <input
          type="file"
          onChange={({ target }) => {
            const chosen = target.files?.[0];
            if (chosen !== undefined) void read(chosen, {});
          }}
        />
      </label>
      <p className="row" role="status">
        {isReading ? `Reading ${file?.name}.` : ''}
      </p>
      {refusals.map((words) => (
        <p key={words} className="refusal" role="alert">
          <Mark verdict="avoid" />
          <span>{words}</span>
        </p>
      ))}
      {questions.map((question) => (
        <AskedInPlace
          key={question.id}
          question={question}
          onAnswer={(answer) => {
            if (file !== null) void read(file, { ...map, ...answer });
          }}
        />
      ))}
    </section>
  );
}

function refusalWords(error: unknown): string[] {
  if (error instanceof NoConnection) return ['No connection. Drop the file again when it is back.'];
  if (!(error instanceof Refused)) return [String(error)];
  const { problems, detail } = error.problem;
  if (problems.length === 0) return [detail];
  return problems.slice(0, 12).map(({ row, column, expected, found }) => {
    const place = row === undefined ? '' : `Row ${row}${column === undefined ? '' : `, column ${column}`}: `;
    return `${place}needs ${expected}; found ${found}.`;
  });
}

/** A question of the reader with every reading that makes sense; no answer is nearer than another. */
function AskedInPlace({ question, onAnswer }: { question: QuestionAsked; onAnswer: (map: object) => void }) {
  return (
    <section className="notice" aria-label={question.about}>
      <h3>{question.about}</h3>
      <p className="caption">Every reading below fits the file. Choose one.</p>
      {question.readings.map((reading, at) => (
        <div key={at} className="row gap">
          <button type="button" className="button" onClick={() => onAnswer(reading.map)}>
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

/** What a reading takes the file for: "energy", "active in W, reactive in var". */
function mapWords(map: object): string {
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
