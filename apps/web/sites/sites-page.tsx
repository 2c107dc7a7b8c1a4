import { useCallback, useEffect, useState } from 'react';
import { inShownMark } from '#libs/present/format-number.js';
import { siteAddress } from '../address.js';
import { ask, NoConnection, Refused } from '../api/ask.js';
import type { RecordShown, SiteListed, SiteShown } from '../api/shown.js';
import { saveText } from '../draw/save-files.js';
import { VerdictWords } from '../draw/verdict-mark.js';
import { Head } from '../line/head.js';
import { NewSite } from './new-site.js';
import { useDeletion } from './use-deletion.js';

/** Every site with its state: search, open, duplicate, export, delete with a way back. */
export function SitesPage() {
  const { sites, failure, reload } = useSites();
  const [search, setSearch] = useState('');
  const { gone, pending, remove, undo } = useDeletion(reload);
  useEffect(() => {
    document.title = 'Sites – Varwright';
  }, []);
  const found = (sites ?? []).filter(
    ({ id, name }) => !gone.has(id) && name.toLowerCase().includes(search.trim().toLowerCase()),
  );
  return (
    <div className="sheet">
      <Head state={failure} />
      <div className="sites-line" />
      <main className="sites">
        <div className="headline">
          <h1>{headline(sites?.filter(({ id }) => !gone.has(id)) ?? null)}</h1>
          <div className="field no-print">
            <label htmlFor="search">search</label>
            <span className="rule">
              <input id="search" type="search" value={search} onChange={({ target }) => setSearch(target.value)} />
            </span>
          </div>
        </div>
        <p role="status">
          {pending === null ? null : (
            <span className="notice row">
              Site deleted.{' '}
              <button type="button" className="way" onClick={undo}>
                Undo
              </button>
            </span>
          )}
        </p>
        <ul>
          {found.map((site) => (
            <SiteRow key={site.id} site={site} onChange={reload} onRemove={() => remove(site.id)} />
          ))}
        </ul>
        {sites !== null && found.length === 0 && search !== '' ? (
          <p className="row gap">
            No site is called so.{' '}
            <button type="button" className="way" onClick={() => setSearch('')}>
              Show all
            </button>
          </p>
        ) : null}
        <NewSite />
        <p className="row gap">
          <a href="#/papers">Shared tariffs and price books</a>
          <a href="/verify">Verify a paper</a>
        </p>
      </main>
    </div>
  );
}

function headline(sites: readonly SiteListed[] | null): string {
  if (sites === null) return 'Sites';
  if (sites.length === 0) return 'No site yet. Add the first below.';
  return sites.length === 1 ? 'One site' : `${sites.length} sites`;
}

/** The list, loaded when the page opens and again after each change; a site whose plan is being made is looked at again. */
function useSites() {
  const [sites, setSites] = useState<SiteListed[] | null>(null);
  const [failure, setFailure] = useState('');
  const reload = useCallback(async () => {
    try {
      setSites((await ask<{ sites: SiteListed[] }>('/api/sites')).body.sites);
      setFailure('');
    } catch (error) {
      setFailure(
        error instanceof NoConnection ? 'No connection' : error instanceof Refused ? error.message : String(error),
      );
    }
  }, []);
  useEffect(() => void reload(), [reload]);
  const isWaiting = sites === null || sites.some(({ latest }) => latest === null);
  useEffect(() => {
    if (!isWaiting) return undefined;
    const timer = setInterval(() => void reload(), 2500);
    return () => clearInterval(timer);
  }, [isWaiting, reload]);
  return { sites, failure, reload };
}

function SiteRow({ site, onChange, onRemove }: { site: SiteListed; onChange: () => void; onRemove: () => void }) {
  const [failure, setFailure] = useState('');
  /** Does it, and says where it could not be done. */
  const said = (work: () => Promise<void>) => () => {
    setFailure('');
    work().catch((error) =>
      setFailure(error instanceof NoConnection ? 'Not done: no connection.' : `Not done: ${(error as Error).message}`),
    );
  };
  const duplicate = said(async () => {
    const { site: document } = (await ask<SiteShown>(`/api/sites/${site.id}`)).body;
    const name = document.name.replace(/ \(example\)$/, '');
    const made = await ask<SiteShown>('/api/sites', { method: 'POST', json: { ...document, name: `${name}, copy` } });
    await copyRecord(site.id, made.body.id).finally(onChange);
  });
  const exportFile = said(async () => {
    const { site: document } = (await ask<SiteShown>(`/api/sites/${site.id}`)).body;
    saveText(`${plainFileName(site.name)}.json`, 'application/json', `${JSON.stringify(document, null, 2)}\n`);
  });
  return (
    <li className="site-row">
      <div>
        <a className="title" href={siteAddress(site.id, site.latest === null ? 'record' : 'bank')}>
          {site.name}
        </a>
        <p className="caption">{site.latest === null ? 'no plan yet' : inShownMark(site.latest.proposed)}</p>
      </div>
      <div>
        {site.latest === null ? null : <VerdictWords verdict={site.latest.verdict} />}
        <p className="caption">
          {site.latest === null ? '' : `revision ${site.latest.revision}, ${site.latest.stateText}, `}changed{' '}
          {site.updatedAt.slice(0, 10)}
        </p>
      </div>
      <p className="row">
        <button type="button" className="way" onClick={duplicate}>
          Duplicate<span className="hidden"> {site.name}</span>
        </button>
        <button type="button" className="way" onClick={exportFile}>
          Export<span className="hidden"> {site.name}</span>
        </button>
        <button type="button" className="way" onClick={onRemove}>
          Delete<span className="hidden"> {site.name}</span>
        </button>
        {failure === '' ? null : <span role="alert">{failure}</span>}
      </p>
    </li>
  );
}

/** The latest record of a site goes with its copy, column for column, so that its hash stays. */
async function copyRecord(fromId: string, toId: string): Promise<void> {
  const { records } = (await ask<{ records: RecordShown[] }>(`/api/sites/${fromId}/records`)).body;
  const [latest] = records;
  if (latest === undefined) return;
  const file = await fetch(`/api/sites/${fromId}/records/${latest.id}/export?form=csv`);
  if (!file.ok) throw new Error(`The record was not copied: the server answered ${file.status}.`);
  const name = encodeURIComponent(latest.file.name ?? 'record.csv');
  const headers = { 'content-type': 'application/octet-stream' };
  await ask(`/api/sites/${toId}/records?name=${name}`, { method: 'POST', body: await file.blob(), headers });
}

function plainFileName(name: string): string {
  return (
    name
      .toLowerCase()
      .replaceAll(/[^a-z0-9]+/g, '-')
      .replaceAll(/^-|-$/g, '') || 'site'
  );
}
