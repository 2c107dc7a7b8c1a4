import { useEffect, useState } from 'react';
import { formatQuantity } from '#libs/present/format-number.js';
import { type KnownOfSite, visitQuestions } from '#libs/present/visit-questions.js';
import { ask } from '../api/ask.js';
import type { SiteDocument, SiteShown } from '../api/shown.js';
import { valueAt } from '../field/document-path.js';
import { Head } from '../line/head.js';
import { surveyParts } from './survey-parts.js';

/** One page for the visit: what to ask, what to look for with what is entered already, and room to write. */
export function SurveySheet({ siteId }: { siteId: string }) {
  const [site, setSite] = useState<SiteDocument | null>(null);
  const [isMissing, setMissing] = useState(false);
  useEffect(() => {
    ask<SiteShown>(`/api/sites/${siteId}`).then(
      ({ body }) => setSite(body.site),
      () => setMissing(true),
    );
  }, [siteId]);
  const name = site?.name ?? '';
  return (
    <div className="sheet">
      <Head site={<a href={`#/sites/${siteId}/record`}>{name}</a>} />
      <div className="sites-line" />
      <main className="sites survey">
        {isMissing ? <h1>No site stands at this address, or the server does not answer.</h1> : null}
        {site === null ? null : (
          <>
            <h1>Site survey: {name}</h1>
            <ol className="survey-asked">
              {visitQuestions(site as KnownOfSite).map(({ path, question, why }) => (
                <li key={path}>
                  <b>{question}</b> <span className="caption">{why}</span>
                </li>
              ))}
            </ol>
            <SurveyTable site={site} />
            <p className="row gap caption">
              Look, do not open: covers and doors are the electrician’s. Surveyed by ______________________ on
              ______________
            </p>
          </>
        )}
      </main>
    </div>
  );
}

function SurveyTable({ site }: { site: SiteDocument }) {
  return (
    <table className="survey-table">
      <thead>
        <tr>
          <th scope="col">what</th>
          <th scope="col">look for</th>
          <th scope="col">entered</th>
          <th scope="col">found</th>
        </tr>
      </thead>
      <tbody>
        {surveyParts.flatMap(({ what, looks }) =>
          looks.map(({ look, path, unit, isPhotograph }, at) => (
            <tr key={look}>
              {at === 0 ? (
                <th scope="rowgroup" rowSpan={looks.length}>
                  {what}
                </th>
              ) : null}
              <td>
                {isPhotograph ? <span className="box" aria-hidden="true" /> : null}
                {look}
              </td>
              <td className="soft entered">{path === undefined ? '' : entered(valueAt(site, path), unit ?? '')}</td>
              <td />
            </tr>
          )),
        )}
      </tbody>
    </table>
  );
}

function entered(value: unknown, unit: string): string {
  if (typeof value === 'number') return formatQuantity(value, unit, 'given');
  return typeof value === 'string' ? value : '';
}
