import { type EstimateOutcome, isEstimate, type Outcome } from '#libs/engine/index.js';
import { estimateSpan } from '#libs/present/estimate-words.js';
import { say, words } from '#libs/present/language.js';
import { formatMoment } from '#libs/present/local-stamp.js';
import { plainName } from '#libs/present/plain-name.js';
import { HAIR, INK, STROKE } from './ink.js';
import { LABEL, leading, type Paper, STRONG } from './paper.js';
import type { ProposalFrame, ProposalState } from './proposal-frame.js';
import { stateWords } from './state-words.js';
import type { Line, Piece, Style } from './typesetter.js';

const FIRST_BASELINE = 36;
const HEAD: Style = { ...STRONG, size: 9 };
/** Room kept at the right for "page n of N" and for the hash. */
const PAGE_ROOM = 90;
const HASH_ROOM = 215;

/** What a paper of each state may be used for. */
const STANDING: Record<ProposalState, string> = words({
  'draft, not reviewed': 'A draft is not for construction.',
  'for review': 'Under review: not for construction.',
  approved: 'Approved; what was accepted stands in section 2.',
  superseded: 'Superseded: a later revision counts.',
  withdrawn: 'Withdrawn: not for construction.',
});

/** The lines of the header, broken for the width, and where the page below it begins. */
export interface SetHeader {
  title: Line[];
  window: Line[];
  hash: string;
  site: string;
  note: string;
  /** top of what follows [pt] */
  contentTop: number;
}

/** Breaks the header's lines for the page's width; the same on every page. */
export function setHeader({ type, width }: Paper, frame: ProposalFrame, outcome: Outcome | EstimateOutcome): SetHeader {
  const title: Piece[] = [
    say`Proposal ${frame.number}, revision ${frame.revision}`,
    { text: `, ${stateWords(frame.state)}` },
  ];
  const set = {
    title: type.wrap(title, HEAD, width - PAGE_ROOM),
    window: type.wrap([windowWords(outcome)], LABEL, width - HASH_ROOM),
    hash: say`content ${hashInFours(frame.contentHash)}, engine ${frame.engineVersion}`,
    site: plainName(outcome.site.name),
    note: STANDING[frame.state],
  };
  const titleEnd = FIRST_BASELINE + (set.title.length - 1) * leading(HEAD);
  return { ...set, contentTop: titleEnd + 26 + set.window.length * leading(LABEL) };
}

function windowWords(outcome: Outcome | EstimateOutcome): string {
  if (isEstimate(outcome)) return say`ESTIMATE from ${estimateSpan(outcome)}; no record`;
  const { record, zone } = outcome;
  return say`record ${formatMoment(zone, record.firstS)} to ${formatMoment(zone, record.endS)}, ${zone.zone}`;
}

/** The first 16 digits in fours, as a reader can compare them. */
function hashInFours(hash: string): string {
  return (hash.slice(0, 16).match(/.{1,4}/g) ?? []).join(' ');
}

/** Draws header and footer on every page, once their number is known; a reading program leaves them out. */
export function drawHeaders(paper: Paper, header: SetHeader): void {
  const { start, count } = paper.doc.bufferedPageRange();
  for (let page = start; page < start + count; page++) {
    paper.doc.switchToPage(page);
    paper.doc.markContent('Artifact', { type: 'Pagination' });
    drawHeader(paper, header, say`page ${page - start + 1} of ${count}`);
    drawFooter(paper, header);
    paper.doc.endMarkedContent();
  }
}

function drawHeader(paper: Paper, header: SetHeader, pageOf: string): void {
  const { type, doc, left, right } = paper;
  let y = FIRST_BASELINE;
  type.put([pageOf], HEAD, right - type.width([pageOf], HEAD), y);
  for (const line of header.title) {
    type.draw(line, left, y);
    y += leading(HEAD);
  }
  const bar = y - leading(HEAD) + 8.5;
  doc.lineWidth(STROKE.line).moveTo(left, bar).lineTo(right, bar).stroke(INK);
  y = bar + 13;
  type.put([header.hash], LABEL, right - type.width([header.hash], LABEL), y);
  for (const line of header.window) {
    type.draw(line, left, y);
    y += leading(LABEL);
  }
}

function drawFooter(paper: Paper, header: SetHeader): void {
  const { type, doc, left, right } = paper;
  const y = doc.page.height - 36;
  const { note } = header;
  const noteWidth = type.width([note], LABEL);
  doc.lineWidth(STROKE.hair).moveTo(left, y).lineTo(right, y).stroke(HAIR);
  // a name too long for the line stands in full on page 1
  const site = type.width([header.site], LABEL) < right - left - noteWidth - 20 ? header.site : say`Site: see page 1`;
  type.put([site], LABEL, left, y + 12);
  type.put([note], LABEL, right - noteWidth, y + 12);
}
