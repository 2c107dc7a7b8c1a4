import { useState } from 'react';
import type { MeterMap } from '#libs/contract/meter-map.js';
import { ask, Refused } from '../api/ask.js';
import type { KeptMapShown, RecordShown } from '../api/shown.js';
import { FieldFrame } from '../field/field-frame.js';

/** Keeps what was answered about a file under a name, for the next file of its kind. */
export function KeepAnswers({
  answers,
  record,
  onKept,
}: {
  answers: MeterMap;
  record: RecordShown;
  onKept: (kept: KeptMapShown) => void;
}) {
  const [name, setName] = useState('');
  const [refusal, setRefusal] = useState<string | null>(null);
  const [kept, setKept] = useState<string | null>(null);
  // Which file counts in an overlap is decided for each file anew.
  const { overlap: _, ...map } = answers;
  if (Object.keys(map).length === 0) return null;
  if (kept !== null) return <p role="status">The answers are kept as “{kept}”.</p>;
  const keep = async () => {
    const { header } = record.file;
    try {
      const json = { name: name.trim(), map, ...(header === null ? {} : { header }) };
      const { body } = await ask<KeptMapShown>('/api/kept-maps', { method: 'POST', json });
      setKept(body.name);
      onKept(body);
    } catch (error) {
      const problem = error instanceof Refused ? error.problem.problems[0] : undefined;
      setRefusal(problem === undefined ? 'Not kept: no connection.' : `Needs ${problem.expected}.`);
    }
  };
  return (
    <form
      className="notice"
      onSubmit={(event) => {
        event.preventDefault();
        void keep();
      }}
    >
      <FieldFrame path="kept.name" label="keep these answers under a name" refusal={refusal}>
        <input
          id="field:kept.name"
          value={name}
          maxLength={80}
          autoComplete="off"
          onChange={({ target }) => setName(target.value)}
        />
      </FieldFrame>
      <p className="row gap">
        <button type="submit" className="button" disabled={name.trim() === ''}>
          Keep the answers
        </button>
      </p>
    </form>
  );
}
