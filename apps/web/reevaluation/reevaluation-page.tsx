import { useEffect } from 'react';
import { inShownMark } from '#libs/present/format-number.js';
import { reevaluationAddress, siteAddress, stationOfPath } from '../address.js';
import type { RevisionHeadShown, SiteShown } from '../api/shown.js';
import { FieldFrame } from '../field/field-frame.js';
import { Head } from '../line/head.js';
import { ReevaluationSheet } from './reevaluation-sheet.js';
import { type Asked, useHeldSite, useReevaluation } from './use-reevaluation.js';

/** The site's bank judged again: what changed since a revision, what to do first, and what would mend it. */
export function ReevaluationPage({ siteId, asked }: { siteId: string; asked: number | null }) {
  const held = useHeldSite(siteId);
  const name = held.state === 'answered' ? held.answer.site.name : '';
  useEffect(() => {
    document.title = name === '' ? 'Varwright' : `${name}, judged again – Varwright`;
  }, [name]);
  return (
    <div className="sheet">
      <Head site={<a href={siteAddress(siteId, 'proposal')}>{name === '' ? 'The site' : name}</a>} />
      <div className="sites-line" />
      <main className="sites again">
        {held.state === 'answered' ? (
          <HeldAgainst {...held.answer} asked={asked} />
        ) : (
          <Unanswered asked={held} siteId={siteId} waiting="Opening the site" />
        )}
      </main>
    </div>
  );
}

function HeldAgainst({
  site,
  revisions,
  asked,
}: {
  site: SiteShown;
  revisions: readonly RevisionHeadShown[];
  asked: number | null;
}) {
  const against = revisions.find(({ revision }) => revision === asked) ?? (asked === null ? revisions[0] : undefined);
  if (revisions.length === 0) {
    return (
      <>
        <h1>Nothing to hold the bank against yet</h1>
        <p className="row gap">
          A bank is judged again beside an earlier revision, and this site has none.{' '}
          <a href={siteAddress(site.id, 'proposal')}>Make the first</a>
        </p>
      </>
    );
  }
  return (
    <>
      {against === undefined ? <h1>Revision {asked} is not among those of this site</h1> : null}
      <div className="against no-print">
        <FieldFrame path="again.revision" label="held against" refusal={null}>
          <select
            id="field:again.revision"
            value={against?.revision ?? ''}
            onChange={({ target }) => {
              window.location.hash = reevaluationAddress(site.id, Number(target.value));
            }}
          >
            {against === undefined ? <option value="">choose</option> : null}
            {revisions.map((one) => (
              <option key={one.revision} value={one.revision}>
                {`revision ${one.revision}, made ${one.createdAt.slice(0, 10)}`}
              </option>
            ))}
          </select>
        </FieldFrame>
        <p className="caption">
          {against === undefined
            ? null
            : `${against.kind === 'plan' ? 'Proposed' : 'Judged'} then: ${inShownMark(against.proposed)} `}
          Beside it stands the bank of the site file as it measures now, on the latest record, judged by the same
          engine. Nothing of it is kept.
        </p>
      </div>
      {against === undefined ? null : <Judged site={site} revision={against.revision} />}
    </>
  );
}

function Judged({ site, revision }: { site: SiteShown; revision: number }) {
  const judged = useReevaluation(site.id, revision);
  if (judged.state === 'answered') return <ReevaluationSheet site={site} shown={judged.answer} />;
  return <Unanswered asked={judged} siteId={site.id} waiting="Judging the bank again" />;
}

/** What stands in place of an answer: that it is awaited, or why there is none and where to mend that. */
function Unanswered({ asked, siteId, waiting }: { asked: Asked<unknown>; siteId: string; waiting: string }) {
  if (asked.state !== 'refused') return <h1 role="status">{waiting}</h1>;
  const { detail, problems } = asked;
  return (
    <>
      <h1>Not judged again</h1>
      {problems.length === 0 ? (
        <p className="notice" role="alert">
          {detail}
        </p>
      ) : null}
      {problems.map(({ path, expected, found }) => (
        <p className="notice" role="alert" key={`${path} ${expected}`}>
          It needs {expected}; found {found}.{' '}
          {path === undefined || path === 'revision' ? null : (
            <a href={siteAddress(siteId, stationOfPath(path), { field: path })}>Enter it</a>
          )}
        </p>
      ))}
      <p className="row gap">
        <a href="#/">All sites</a>
      </p>
    </>
  );
}
