import { type FormEvent, useEffect, useState } from 'react';
import type { Problem } from '#libs/engine/index.js';
import { ask, NoConnection, Refused } from '../api/ask.js';
import type { PaperShown, SiteListed, SiteShown } from '../api/shown.js';
import { FieldFrame, refusalOf } from '../field/field-frame.js';

/** Fields with a place of their own; what else is refused stands under the form. */
const FIELDS = ['name', 'date', 'siteId'];

/** A new paper, or the next version of one: the tariff or the prices of a site, under a name and from a day. */
export function NewPaper({ papers, onAdded }: { papers: readonly PaperShown[]; onAdded: () => Promise<void> }) {
  const [kind, setKind] = useState<PaperShown['kind']>('tariff');
  const [name, setName] = useState('');
  const [date, setDate] = useState('');
  const [siteId, setSiteId] = useState('');
  const [problems, setProblems] = useState<readonly Problem[]>([]);
  const [failure, setFailure] = useState('');
  const sites = useSites(setFailure);
  const follows = papers.find((paper) => paper.kind === kind && paper.name === name.trim())?.version;
  const add = async () => {
    setProblems([]);
    setFailure('');
    try {
      const document = await documentOf(siteId, kind);
      const after = follows === undefined ? {} : { after: follows };
      await ask('/api/papers', { method: 'POST', json: { kind, name: name.trim(), date, ...after, document } });
      await onAdded();
    } catch (error) {
      if (error instanceof Refused) setProblems(error.problem.problems);
      else
        setFailure(error instanceof NoConnection ? 'No connection. What you typed is kept.' : (error as Error).message);
    }
  };
  const submit = (event: FormEvent) => {
    event.preventDefault();
    void add();
  };
  return (
    <section className="section" aria-labelledby="new-paper">
      <h2 id="new-paper">A new paper, or the next version of one</h2>
      <p className="caption">
        Enter the tariff or the prices at the money of a site, keep them, and share them from here.
      </p>
      <form onSubmit={submit}>
        <div className="fields nameplates">
          <FieldFrame path="kind" label="kind" refusal={null}>
            <select
              id="field:kind"
              value={kind}
              onChange={({ target }) => setKind(target.value === 'prices' ? 'prices' : 'tariff')}
            >
              <option value="tariff">tariff</option>
              <option value="prices">price book</option>
            </select>
          </FieldFrame>
          <FieldFrame path="siteId" label="as it stands in" refusal={refusalOf(problems, 'siteId')}>
            <select id="field:siteId" required value={siteId} onChange={({ target }) => setSiteId(target.value)}>
              <option value="">choose a site</option>
              {sites.map((site) => (
                <option key={site.id} value={site.id}>
                  {site.name}
                </option>
              ))}
            </select>
          </FieldFrame>
          <FieldFrame
            path="name"
            label="name"
            echo={follows === undefined ? null : `becomes version ${follows + 1}`}
            refusal={refusalOf(problems, 'name')}
          >
            <input id="field:name" value={name} autoComplete="off" onChange={({ target }) => setName(target.value)} />
          </FieldFrame>
          <FieldFrame path="date" label="holds from, 2026-01-31" refusal={refusalOf(problems, 'date')}>
            <input id="field:date" value={date} autoComplete="off" onChange={({ target }) => setDate(target.value)} />
          </FieldFrame>
        </div>
        <p className="row gap">
          <button type="submit" className="button filled">
            Share it
          </button>
        </p>
      </form>
      {failure === '' ? null : (
        <p className="notice" role="alert">
          Not shared: {failure}
        </p>
      )}
      {problems
        .filter(({ path }) => !FIELDS.includes(path ?? ''))
        .map(({ path, expected, found }) => (
          <p className="notice" role="alert" key={`${path} ${expected}`}>
            {`Not shared: ${path ?? 'it'} needs ${expected}; found ${found}.`}
          </p>
        ))}
    </section>
  );
}

function useSites(said: (failure: string) => void): readonly SiteListed[] {
  const [sites, setSites] = useState<readonly SiteListed[]>([]);
  useEffect(() => {
    ask<{ sites: SiteListed[] }>('/api/sites').then(
      ({ body }) => setSites(body.sites),
      (error: Error) => said(error.message),
    );
  }, [said]);
  return sites;
}

async function documentOf(siteId: string, kind: PaperShown['kind']): Promise<unknown> {
  const { site } = (await ask<SiteShown>(`/api/sites/${siteId}`)).body;
  const document = site[kind];
  if (document === undefined)
    throw new Error(`${site.name} holds no ${kind === 'tariff' ? 'tariff' : 'prices'} of its own.`);
  return document;
}
