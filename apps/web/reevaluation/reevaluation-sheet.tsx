import type { Reevaluation, ResultChange, Verdict } from '#libs/engine/index.js';
import { factorSince } from '#libs/present/factor-since.js';
import { formatQuantity, inShownMark } from '#libs/present/format-number.js';
import {
  CHANGE_HEADS,
  changeRows,
  INPUT_HEADS,
  inputRows,
  LIKE_HEADS,
  likeRows,
  REMEDY_HEADS,
  reevaluationFinding,
  remedyRows,
  sinceSentences,
} from '#libs/present/reevaluation-words.js';
import { measuredGroupSentences, tonightSentences } from '#libs/present/tonight-words.js';
import { noPermission, verdictWords } from '#libs/present/verdict-words.js';
import { siteAddress, stationOfPath } from '../address.js';
import type { ReevaluationShown, SiteShown } from '../api/shown.js';
import { Plot } from '../draw/plot.js';
import { RowTable } from '../draw/row-table.js';
import { Mark, VerdictWords } from '../draw/verdict-mark.js';
import { Headline, type KeyFigure } from '../working/headline.js';

/** Figures that stand beside the headline where they changed. */
const KEY_FIGURES: readonly [id: ResultChange['id'], under: string][] = [
  ['bank.effectiveKvar', 'effective'],
  ['operation.lowestPowerFactor', 'lowest month'],
  ['network.voltageDistortionPct', 'voltage distortion'],
];

/** A bank then and now in numbers: first what to do, then since when, what changed, and what would mend it. */
export function ReevaluationSheet({ site, shown }: { site: SiteShown; shown: ReevaluationShown }) {
  const { reevaluation, revision, result } = shown;
  const currency = String(site.site.currency ?? '');
  const finding = inShownMark(reevaluationFinding(reevaluation));
  const months = factorSince(reevaluation, result.requirement.targetPowerFactor);
  return (
    <>
      <Headline figures={keyFigures(reevaluation)}>{`${finding[0]!.toUpperCase()}${finding.slice(1)}.`}</Headline>
      <p className="row verdicts">
        <span className="soft">Revision {revision.revision}</span>
        <VerdictWords verdict={reevaluation.verdict.before} />
        <span className="soft">as it stands</span>
        <VerdictWords verdict={reevaluation.verdict.after} />
        <span className="soft">{noPermission()}</span>
      </p>
      <Tonight reevaluation={reevaluation} />
      <Changes reevaluation={reevaluation} currency={currency} />
      <Remedies reevaluation={reevaluation} currency={currency} />
      {months === null ? null : <Plot chart={months} height={240} />}
      <Since reevaluation={reevaluation} isDrawn={months !== null} />
      <Inputs reevaluation={reevaluation} siteId={site.id} />
      <Alike reevaluation={reevaluation} />
    </>
  );
}

function keyFigures({ changes }: Reevaluation): KeyFigure[] {
  return KEY_FIGURES.flatMap(([id, words]) => {
    const change = changes.find((one) => one.id === id);
    if (typeof change?.after !== 'number') return [];
    const was = typeof change.before === 'number' ? `, was ${formatQuantity(change.before, change.unit)}` : '';
    return [{ value: change.after, unit: change.unit, under: `${words}${was}` }];
  });
}

/** What to do before anything else with a bank that is over a limit. */
function Tonight({ reevaluation }: { reevaluation: Reevaluation }) {
  const [first, ...others] = tonightSentences(reevaluation);
  if (first === undefined) return null;
  return (
    <section className="section" aria-labelledby="tonight">
      <h2 id="tonight">What to do first</h2>
      <div className="tonight">
        <Mark verdict="avoid" />
        <div>
          <p>
            <b>{inShownMark(first)}</b>
          </p>
          {others.map((sentence) => (
            <p key={sentence}>{inShownMark(sentence)}</p>
          ))}
        </div>
      </div>
    </section>
  );
}

function Changes({ reevaluation, currency }: { reevaluation: Reevaluation; currency: string }) {
  const { changes } = reevaluation;
  const rows = changeRows(reevaluation, currency);
  if (rows.length === 0) return null;
  return (
    <section className="section" aria-labelledby="changed">
      <h2 id="changed">What changed, in numbers</h2>
      <p className="caption">
        Need, power factor, cost, operations, distortion and duties; what is not listed is as it was.
      </p>
      {measuredGroupSentences(reevaluation).map((sentence) => (
        <p key={sentence} className="caption">
          {inShownMark(sentence)}
        </p>
      ))}
      <RowTable
        name="Changed figures"
        heads={CHANGE_HEADS}
        right={[1, 2, 3]}
        judged={4}
        rows={rows.map((cells, at) => [
          ...cells.slice(0, 4),
          cells[4] === '–' && changes[at]!.id !== 'verdict' ? (
            '–'
          ) : (
            <Judgement key={at} change={changes[at]!} words={cells[4]!} />
          ),
        ])}
      />
    </section>
  );
}

/** How a changed duty stands now; a figure that no limit judges has a dash. */
function Judgement({ change, words }: { change: ResultChange; words: string }) {
  const verdict = change.id === 'verdict' ? (change.after as Verdict | null) : change.verdictAfter;
  if (verdict === null) return <span className="soft">{words}</span>;
  return (
    <span className={`verdict ${verdict}`}>
      <Mark verdict={verdict} />
      {change.id === 'verdict' ? verdictWords(verdict) : words}
    </span>
  );
}

function Remedies({ reevaluation, currency }: { reevaluation: Reevaluation; currency: string }) {
  const { remedies } = reevaluation;
  if (remedies.length === 0) return null;
  const best = remedies.findIndex(({ mends }) => mends);
  return (
    <section className="section" aria-labelledby="remedies">
      <h2 id="remedies">{best === -1 ? 'No single way mends it whole' : 'What would mend it, the best way first'}</h2>
      <p className="caption">
        Each way by itself, weighed on the latest record. Parts are what is bought; installation is left to an offer.
      </p>
      <RowTable
        name="Ways to mend the bank"
        heads={REMEDY_HEADS}
        right={[2, 3, 4, 5]}
        judged={1}
        rows={remedyRows(reevaluation, currency).map((cells, at) => [
          at === best ? <b key="way">{inShownMark(cells[0]!)}</b> : inShownMark(cells[0]!),
          <VerdictWords key="verdict" verdict={remedies[at]!.verdict} />,
          ...cells.slice(2),
        ])}
      />
    </section>
  );
}

/** The days on which something changed; the months stand here only where they are not drawn. */
function Since({ reevaluation, isDrawn }: { reevaluation: Reevaluation; isDrawn: boolean }) {
  const sentences = sinceSentences(reevaluation).slice(isDrawn ? 1 : 0);
  if (sentences.length === 0) return null;
  return (
    <section className="section" aria-labelledby="since">
      <h2 id="since">The day of the change</h2>
      <ul>
        {sentences.map((sentence) => (
          <li key={sentence}>{inShownMark(sentence)}</li>
        ))}
      </ul>
    </section>
  );
}

function Inputs({ reevaluation, siteId }: { reevaluation: Reevaluation; siteId: string }) {
  const rows = inputRows(reevaluation);
  if (rows.length === 0) return null;
  return (
    <section className="section" aria-labelledby="inputs">
      <h2 id="inputs">What was entered otherwise</h2>
      <RowTable
        name="Changed fields"
        heads={INPUT_HEADS}
        rows={rows.map(([words, before, after], at) => {
          const { path } = reevaluation.inputs[at]!;
          return [
            <a key={path} href={siteAddress(siteId, stationOfPath(path), { field: path })}>
              {words}
            </a>,
            before,
            after,
          ];
        })}
      />
    </section>
  );
}

function Alike({ reevaluation }: { reevaluation: Reevaluation }) {
  const rows = likeRows(reevaluation);
  if (rows.length === 0) return null;
  return (
    <section className="section" aria-labelledby="alike">
      <h2 id="alike">Both records on like terms</h2>
      <p className="caption">
        By the day, over the same hours of the week and the same months, since their lengths differ.
      </p>
      <RowTable name="Both records" heads={LIKE_HEADS} right={[1, 2]} rows={rows} />
    </section>
  );
}
