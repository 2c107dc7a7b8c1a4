import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { labelOf } from '#libs/present/figure-words.js';
import { findings } from '#libs/present/findings.js';
import { say, spokenCatalogue, words } from '#libs/present/language.js';
import { formatDate } from '#libs/present/local-stamp.js';
import { INK, SOFT, STROKE } from './ink.js';
import { LABEL, leading, NOTE, type Paper, rise } from './paper.js';
import type { PrintedReview } from './printed-review.js';
import type { ProposalFrame } from './proposal-frame.js';
import { BODY, type Piece, type Style } from './typesetter.js';

const ROLES: [string, string, string][] = words([
  ['prepared', 'planner', 'date'],
  ['checked', 'licence', 'date'],
  ['approved', 'licence, jurisdiction', 'date'],
]);
const NOTE_STYLE: Style = { ...LABEL, ink: SOFT };
const HEIGHT = 62;

/** Who prepared, checked and approved: places to sign on a draft; on an approved paper what each signed, and in what capacity. */
export function drawSignatures(paper: Paper, outcome: Outcome | EstimateOutcome, frame: ProposalFrame): void {
  paper.heading('1', say`Prepared, checked, approved`, { keep: HEIGHT + 4 });
  if (frame.review === undefined) drawPlaces(paper, frame);
  else drawSigned(paper, outcome, frame.review, frame.preparedBy);
}

/** Three places to sign; a name only where somebody gave one. */
function drawPlaces(paper: Paper, frame: ProposalFrame): void {
  const gutter = 16;
  const width = (paper.width - 2 * gutter) / 3;
  const top = paper.y;
  const name = paper.type.wrap([frame.preparedBy ?? ''], BODY, width);
  const drop = (Math.max(name.length, 1) - 1) * leading(BODY);
  ROLES.forEach(([role, below, date], at) => {
    const x = paper.left + at * (width + gutter);
    paper.rule({ y: top, from: x, to: x + width, width: STROKE.load, ink: INK });
    paper.tagged('P', () => {
      paper.type.put([role], NOTE_STYLE, x, top + 4 + rise(LABEL));
      if (at === 0) paper.lines(name, BODY, { x, y: top + 21 });
      paper.type.put([below], NOTE_STYLE, x, top + drop + 40 + rise(LABEL));
      paper.type.put(
        [date],
        NOTE_STYLE,
        x + width - paper.type.width([date], NOTE_STYLE),
        top + drop + 40 + rise(LABEL),
      );
    });
    paper.rule({ y: top + drop + 37, from: x, to: x + width, width: STROKE.hair, ink: INK });
  });
  paper.y = top + drop + HEIGHT - 6;
}

/** Each signature with its own statement, and what was worked out by hand. */
function drawSigned(
  paper: Paper,
  { result }: Outcome | EstimateOutcome,
  review: PrintedReview,
  preparedBy: string | null,
): void {
  if (preparedBy !== null) paper.paragraph([{ text: say`Prepared by `, ink: SOFT }, preparedBy], { after: 4 });
  if (review.ownApproval !== null) {
    paper.paragraph([{ text: review.ownApproval, weight: 'semibold' }], { after: 6 });
  }
  for (const { capacity, statement, name, licence, jurisdiction, date } of review.signatures) {
    paper.need(3 * leading(BODY) + 10);
    paper.rule({ width: STROKE.load, ink: INK });
    paper.y += 5;
    const who = `${name}, ${licence}, ${jurisdiction}, ${formatDate(date)}`;
    const signed: Piece[] = [
      { text: say`In the capacity of ${capacity}: `, ink: SOFT },
      { text: who, weight: 'semibold' },
    ];
    paper.paragraph(signed, { after: 2 });
    paper.paragraph([statement], { style: NOTE, after: 7 });
  }
  if (review.handChecks.length > 0) {
    const checks = review.handChecks.map(({ figure, label, said }) => {
      const named = spokenCatalogue() === null ? label : labelOf(figure, result.duties);
      return `${named} ${said}`;
    });
    paper.paragraph([{ text: say`Checked by hand: `, ink: SOFT }, `${checks.join('; ')}.`], { after: 4 });
  }
}

/** What the reviewer took on, each finding by itself with the reason; stands behind the findings. */
export function drawAccepted(paper: Paper, outcome: Outcome | EstimateOutcome, { review }: ProposalFrame): void {
  // what was accepted stands in frozen words; another language takes its own for the same finding
  const own = spokenCatalogue() === null ? [] : findings(outcome);
  for (const { id, what, reason, by, date } of review?.accepted ?? []) {
    const accepted: Piece[] = [
      { text: say`Accepted by ${by}, ${formatDate(date)}: `, ink: SOFT },
      `${own.find((finding) => finding.id === id)?.what ?? what} `,
      { text: say`Reason: `, ink: SOFT },
      reason,
    ];
    paper.paragraph(accepted, { after: 4 });
  }
}
