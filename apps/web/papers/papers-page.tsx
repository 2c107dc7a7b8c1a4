import { useEffect, useState } from 'react';
import { formatNumber } from '#libs/present/format-number.js';
import { ask, NoConnection } from '../api/ask.js';
import type { PaperShown } from '../api/shown.js';
import { RowTable } from '../draw/row-table.js';
import { Head } from '../line/head.js';
import { NewPaper } from './new-paper.js';
import { paperRows, rowsInWords } from './paper-rows.js';
import { usePapers } from './use-papers.js';

const KINDS: Record<PaperShown['kind'], string> = { tariff: 'tariff', prices: 'price book' };

/** Tariffs and price books that sites name instead of holding their own: every version, what it says, and a new one. */
export function PapersPage() {
  const { papers, failure, reload } = usePapers();
  useEffect(() => {
    document.title = 'Shared papers – Varwright';
  }, []);
  return (
    <div className="sheet">
      <Head site="Shared papers" state={failure} />
      <div className="sites-line" />
      <main className="sites">
        <div className="headline">
          <h1>{headline(papers)}</h1>
        </div>
        <p className="caption">
          A site names one at its money, or its file under “papers”, in place of its own tariff or prices. A version
          never changes; a later one follows it, and a revision keeps the version it was made with.
        </p>
        {papers === null ? null : (
          <ul>
            {papers.map((paper) => (
              <PaperRow key={paper.id} paper={paper} />
            ))}
          </ul>
        )}
        <NewPaper papers={papers ?? []} onAdded={reload} />
      </main>
    </div>
  );
}

function headline(papers: readonly PaperShown[] | null): string {
  if (papers === null) return 'Shared papers';
  const names = new Set(papers.map(({ kind, name }) => `${kind} ${name}`)).size;
  if (names === 0) return 'No shared paper yet. Add the first below.';
  return names === 1 ? 'One shared paper' : `${formatNumber(names, 'given')} shared papers`;
}

/** One version; what it says is fetched when it is opened. */
function PaperRow({ paper }: { paper: PaperShown }) {
  const { id, kind, name, version, date, createdAt } = paper;
  const [rows, setRows] = useState<[string, string][] | null>(null);
  const [failure, setFailure] = useState('');
  const show = () => {
    ask<{ document: object }>(`/api/papers/${id}`).then(
      ({ body }) => setRows(paperRows(body.document)),
      (error: Error) => setFailure(error instanceof NoConnection ? 'No connection.' : error.message),
    );
  };
  return (
    <li className="paper-row">
      <div className="row">
        <b>{name}</b>
        <span>
          {KINDS[kind]}, version {version}
        </span>
        <span className="caption">
          holds from {date}, kept {createdAt.slice(0, 10)}
        </span>
        <button
          type="button"
          className="way"
          aria-expanded={rows !== null}
          onClick={() => (rows === null ? show() : setRows(null))}
        >
          {rows === null ? 'Show' : 'Fold'}
          <span className="hidden">
            {' '}
            {name}, version {version}
          </span>
        </button>
        {failure === '' ? null : <span role="alert">{failure}</span>}
      </div>
      {rows === null ? null : (
        <RowTable name={`${name}, version ${version}`} heads={['field', 'value']} rows={rowsInWords(rows)} />
      )}
    </li>
  );
}
