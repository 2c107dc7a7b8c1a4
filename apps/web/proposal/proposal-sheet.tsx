import { formatQuantity, inShownMark } from '#libs/present/format-number.js';
import { STATE_WORDS } from '#libs/present/review-words.js';
import { noPermission } from '#libs/present/verdict-words.js';
import { reevaluationAddress } from '../address.js';
import type { RevisionHeadShown, RevisionShown } from '../api/shown.js';
import { isChanged, staleFrom } from '../desk/desk-state.js';
import { useDesk } from '../desk/use-desk.js';
import { RowTable } from '../draw/row-table.js';
import { VerdictWords } from '../draw/verdict-mark.js';
import { valueAt } from '../field/document-path.js';
import { Headline } from '../working/headline.js';
import { FindingsList } from './findings-list.js';
import { LanguageChoice } from './language-choice.js';
import { ReviewState } from './review-state.js';

/** The paper: preview, download, what changed since the last one. */
export function ProposalSheet() {
  const { desk, state } = useDesk();
  const { kept, records, job, saving } = state;
  const canPlan = records.length > 0 || valueAt(state.document, 'estimate') !== undefined;
  if (kept === null) {
    return (
      <>
        <h1>No proposal yet</h1>
        <p className="row gap">
          A proposal is made with each plan.{' '}
          {canPlan ? null : 'A meter record, or bills or equipment, are needed first.'}
        </p>
        {!canPlan ? null : <LanguageChoice />}
        {!canPlan ? null : (
          <p className="row gap">
            <button
              type="button"
              className="button"
              disabled={job !== null || saving}
              onClick={() => void desk.keep('plan')}
            >
              Design a bank
            </button>
          </p>
        )}
      </>
    );
  }
  return <KeptPaper kept={kept} />;
}

/** The paper of the latest revision, its review, its findings, and every revision before it. */
function KeptPaper({ kept }: { kept: RevisionShown }) {
  const { state } = useDesk();
  const { revisions, review } = state;
  const { number, revision, proposed, verdict, links } = kept;
  const isOlder = isChanged(state) || staleFrom(state) !== null;
  return (
    <>
      <Headline
        figures={[
          { value: kept.result.bank.effectiveKvar, unit: 'kvar', under: 'effective', id: 'bank.effectiveKvar' },
          { value: revision, under: `revision, ${review?.stateText ?? 'kept'}`, digits: 'given' },
        ]}
      >
        {kept.kind === 'plan' ? 'Proposed' : 'Judged'}: {inShownMark(proposed)}
      </Headline>
      {isOlder ? (
        <p className="notice">
          The inputs have changed since this paper was made. Compute and keep makes the next one.
        </p>
      ) : null}
      <section className="section" aria-labelledby="paper">
        <h2 id="paper">
          Proposal {number}, revision {revision}
          {review === null ? '' : `: ${review.stateText}`}
        </h2>
        <p className="row gap">
          <VerdictWords verdict={verdict} />
          <span className="soft">{noPermission()}</span>
        </p>
        <p className="row gap">
          <a className="button filled" href={links.proposal} download={`${number}-revision-${revision}.pdf`}>
            Download the proposal
          </a>
          <a href={links.proposal} target="_blank" rel="noreferrer">
            Open it beside this page
          </a>
        </p>
        <PaperPreview address={links.proposal} title={`Proposal ${number}, revision ${revision}`} />
      </section>
      {review === null ? null : <ReviewState kept={kept} review={review} />}
      <FindingsList />
      <Changes revisions={revisions} />
      <section className="section" aria-labelledby="papers">
        <h2 id="papers">Every revision is kept</h2>
        <Revisions revisions={revisions} />
        <LanguageChoice />
        <p className="row gap">
          <a href={reevaluationAddress(kept.siteId)}>Judge the bank again, beside a revision</a>
        </p>
      </section>
    </>
  );
}

/** The paper within the page, where the browser can show one there. */
function PaperPreview({ address, title }: { address: string; title: string }) {
  // An older browser that does not say is given the frame.
  if (navigator.pdfViewerEnabled === false) {
    return (
      <p className="paper-unseen no-print">
        This browser shows no PDF within a page.{' '}
        <a href={address} download>
          Download it
        </a>{' '}
        to read it.
      </p>
    );
  }
  return <iframe className="paper no-print" src={`${address}#toolbar=0&view=FitH`} title={title} />;
}

function Revisions({ revisions }: { revisions: readonly RevisionHeadShown[] }) {
  return (
    <RowTable
      name="Revisions"
      heads={['revision', 'made', 'what', 'verdict', 'review', 'paper']}
      judged={3}
      rows={revisions.map((one) => [
        one.revision,
        <span key="made" className="nowrap">
          {one.createdAt.slice(0, 16).replace('T', ' ')} UTC
        </span>,
        `${one.kind === 'plan' ? 'Proposed' : 'Judged'}: ${inShownMark(one.proposed)}`,
        <VerdictWords key="verdict" verdict={one.verdict} />,
        <a key="review" href={`/sites/${one.siteId}/revisions/${one.revision}/review`}>
          {STATE_WORDS[one.state ?? 'draft']}
        </a>,
        <a key="paper" href={one.links.proposal}>
          PDF
        </a>,
      ])}
    />
  );
}

/** What the last two revisions differ in, in the words both carry. */
function Changes({ revisions }: { revisions: readonly RevisionHeadShown[] }) {
  const { state } = useDesk();
  const [now, before] = revisions;
  if (now === undefined || before === undefined || state.kept === null) return null;
  const kvar = formatQuantity(state.kept.result.bank.effectiveKvar, 'kvar');
  return (
    <section className="section" aria-labelledby="changes">
      <h2 id="changes">What changed since revision {before.revision}</h2>
      <div className="versions">
        <div>
          <p className="caption">revision {before.revision}</p>
          <p>{inShownMark(before.proposed)}</p>
          <p className="row gap">
            <VerdictWords verdict={before.verdict} />
          </p>
          {before.recordId === now.recordId ? null : <p className="soft">on another record</p>}
        </div>
        <div>
          <p className="caption">
            revision {now.revision}, {kvar}
          </p>
          <p>{inShownMark(now.proposed)}</p>
          <p className="row gap">
            <VerdictWords verdict={now.verdict} />
          </p>
        </div>
      </div>
      <p className="row gap">
        <a href={`/sites/${now.siteId}/revisions/${before.revision}/differences/${now.revision}`}>
          Field by field, inputs and results
        </a>
      </p>
    </section>
  );
}
