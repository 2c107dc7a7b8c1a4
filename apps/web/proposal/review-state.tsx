import type { ReviewShown, RevisionShown } from '../api/shown.js';

/** State and history of a revision, in the words of document control; its acts have a page of their own. */
export function ReviewState({ kept, review }: { kept: RevisionShown; review: ReviewShown }) {
  const { siteId, revision } = kept;
  const { stateText, open, log, links } = review;
  return (
    <section className="section" aria-labelledby="review">
      <h2 id="review">
        Revision {revision}: {stateText}
      </h2>
      {open.length === 0 ? null : <p className="caption">Its issue waits for: {open.join('; ')}.</p>}
      <p className="row gap">
        <a href={`/sites/${siteId}/revisions/${revision}/review`}>The review, with what may be done next</a>
        {links.approved === null ? null : <a href={links.approved}>The approved paper</a>}
      </p>
      {log.length === 0 ? null : (
        <ol>
          {log.map(({ sequence, at, by, text }) => (
            <li key={sequence} className="finding">
              <span className="caption num">{at.slice(0, 16).replace('T', ' ')} UTC</span>
              <p>
                {text} <span className="soft">{by.name}</span>
              </p>
            </li>
          ))}
        </ol>
      )}
    </section>
  );
}
