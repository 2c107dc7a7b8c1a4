import { useState } from 'react';
import type { Problem } from '#libs/engine/index.js';
import { expectedWords, pathWords } from '#libs/present/path-words.js';
import { siteAddress } from '../address.js';
import { ask, NoConnection, Refused } from '../api/ask.js';
import type { SiteShown } from '../api/shown.js';
import { FieldFrame, refusalOf } from '../field/field-frame.js';
import { readTyped } from '../field/read-typed.js';
import { BLANK, type BlankField, blankDocument } from './blank-site.js';

/** A new site: a blank one from its nameplates, the example, or a site file. */
export function NewSite() {
  const [values, setValues] = useState<Record<string, string>>(() =>
    Object.fromEntries(BLANK.map(({ path, value }) => [path, value])),
  );
  const [problems, setProblems] = useState<readonly Problem[]>([]);
  const [failure, setFailure] = useState('');
  const create = async (
    document: unknown,
    { from, added }: { from?: string; added?: (siteId: string) => Promise<unknown> } = {},
  ) => {
    setProblems([]);
    setFailure('');
    try {
      const { body } = await ask<SiteShown>('/api/sites', { method: 'POST', json: document });
      await added?.(body.id);
      window.location.hash = siteAddress(body.id, 'record');
    } catch (error) {
      if (error instanceof Refused) {
        // What a file says wrongly is no fault of what stands in the fields.
        const own = from === undefined ? error.problem.problems : [];
        setProblems(own);
        setFailure(refusalWords(error.problem.problems, from ?? null));
      } else
        setFailure(error instanceof NoConnection ? 'Not added: no connection. What you typed is kept.' : String(error));
    }
  };
  const example = async () => {
    try {
      const { body } = await ask<Record<string, unknown>>('/api/demo/site.json');
      await create(body, { from: 'The example', added: sendExampleRecord });
    } catch {
      setFailure('Not added: no connection.');
    }
  };
  const importFile = async (file: File | undefined) => {
    if (file === undefined) return;
    try {
      await create(JSON.parse(await file.text()), { from: file.name });
    } catch {
      setFailure(`${file.name} is no site file: it holds no JSON.`);
    }
  };
  return (
    <section className="section no-print" aria-labelledby="new-site">
      <h2 id="new-site">A new site</h2>
      <p className="caption">From the main switchboard’s nameplates; all else can wait.</p>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void create(blankDocument(values));
        }}
      >
        <div className="fields nameplates">
          {BLANK.map((field) => (
            <BlankInput
              key={field.path}
              field={field}
              value={values[field.path] ?? ''}
              problems={problems}
              onType={(text) => {
                setValues({ ...values, [field.path]: text });
                setProblems(problems.filter(({ path }) => path !== field.path));
              }}
            />
          ))}
        </div>
        <p className="row gap">
          <button type="submit" className="button filled">
            Add the site
          </button>
          <button type="button" className="way" onClick={() => void example()}>
            Add the example
          </button>
          <label className="way picked-file">
            Add from a site file
            <input
              type="file"
              accept=".json,application/json"
              onChange={({ target }) => void importFile(target.files?.[0])}
            />
          </label>
        </p>
      </form>
      {failure === '' ? null : (
        <p className="notice" role="alert">
          {failure}
        </p>
      )}
    </section>
  );
}

/**
 * What is said of a refusal as a whole; what has a field in the form is said there.
 * @param from the file that was refused, null for the form
 */
function refusalWords(problems: readonly Problem[], from: string | null): string {
  const others = from === null ? problems.filter(({ path }) => !BLANK.some((field) => field.path === path)) : problems;
  const told = others.map((problem) => {
    const place = problem.path === undefined ? 'it' : pathWords(problem.path);
    return `${place} needs ${expectedWords(problem.expected)}; found ${problem.found}`;
  });
  if (told.length === 0) return 'Not added: see the marked field.';
  return `${from === null ? 'Not added' : `${from} was not added`}: ${told.join('. ')}.`;
}

/** The example's own meter file, from this server and back to it. */
async function sendExampleRecord(siteId: string): Promise<void> {
  const file = await (await fetch('/api/demo/load.csv')).blob();
  const headers = { 'content-type': 'application/octet-stream' };
  await ask(`/api/sites/${siteId}/records?name=load.csv`, { method: 'POST', body: file, headers });
}

function BlankInput({
  field,
  value,
  problems,
  onType,
}: {
  field: BlankField;
  value: string;
  problems: readonly Problem[];
  onType: (text: string) => void;
}) {
  const { path, label, unit } = field;
  const read = unit === undefined || value.trim() === '' ? null : readTyped(value, unit);
  const fault = read !== null && 'fault' in read ? read.fault : null;
  return (
    <FieldFrame
      path={path}
      label={label}
      unit={unit}
      echo={read !== null && 'echo' in read ? read.echo : null}
      refusal={fault ?? refusalOf(problems, path)}
    >
      {field.choices === undefined ? (
        <input id={`field:${path}`} value={value} autoComplete="off" onChange={({ target }) => onType(target.value)} />
      ) : (
        <select id={`field:${path}`} value={value} onChange={({ target }) => onType(target.value)}>
          {field.choices.map(([one, words]) => (
            <option key={one} value={one}>
              {words}
            </option>
          ))}
        </select>
      )}
    </FieldFrame>
  );
}
