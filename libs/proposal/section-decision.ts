import {
  type BankOutcome,
  type BankTonight,
  type EstimateOutcome,
  isEstimate,
  type Outcome,
  siteCorners,
  type Verdict,
} from '#libs/engine/index.js';
import { estimateFigures } from '#libs/present/estimate-words.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { say } from '#libs/present/language.js';
import { plainName } from '#libs/present/plain-name.js';
import { estimateWords, proposedWords } from '#libs/present/proposed-words.js';
import { singleLine } from '#libs/present/single-line.js';
import { countDuties, noPermission, VERDICT_WORDS } from '#libs/present/verdict-words.js';
import { setSingleLine } from './draw-single-line.js';
import { HAIR, INK, PAPER, SOFT, STROKE } from './ink.js';
import { drawVerdictMark } from './marks.js';
import { LABEL, leading, type Paper, rise, STRONG } from './paper.js';
import type { Logo } from './read-logo.js';
import { drawTonight } from './section-tonight.js';
import { BODY, type Line, type Style } from './typesetter.js';

/** A long name takes a smaller size, so that the decision stays on the first page. */
const TITLES: Style[] = [17, 13, 10.5].map((size) => ({ ...STRONG, size }));
const HEADLINE: Style = { ...STRONG, size: 14.5 };
/** Room for a site's logo [pt]. */
const LOGO_BOX = { width: 120, height: 40 };
const PADDING = 14;
const BAND = 24;
/** Share of the box that the sentence takes; the figures stand beside it. */
const SENTENCE_SHARE = 0.43;

/** What stands before the decision. */
export interface DecisionHead {
  logo: Logo | null;
  /** what to do at once with a bank that is over a limit; null where nothing is */
  tonight: BankTonight | null;
}

/**
 * Title and decision box: what is proposed, how it was judged, what it does not cover, and the single-line diagram; before
 * it what to do at once with an installed bank that is over a limit.
 */
export function drawDecision(paper: Paper, outcome: Outcome | EstimateOutcome, { logo, tonight }: DecisionHead): void {
  const { site } = outcome;
  const title = [say`Power-factor correction for ${plainName(site.name)}`];
  const room = logo === null ? null : drawLogo(paper, logo, plainName(site.name));
  const width = paper.width - (room === null ? 0 : room.width + 16);
  const style = TITLES.find((one) => paper.type.wrap(title, one, width).length <= 3) ?? TITLES.at(-1)!;
  paper.paragraph(title, { style, width, tag: 'H1', after: 2 });
  paper.paragraph([boardWords(outcome)], { style: { ...BODY, ink: SOFT }, width, after: 10 });
  if (room !== null) paper.y = Math.max(paper.y, room.foot + 10);
  if (tonight !== null) drawTonight(paper, tonight);
  drawBox(paper, outcome);
}

/** At the right of the title, within a fixed box. */
function drawLogo(paper: Paper, logo: Logo, site: string): { width: number; foot: number } {
  const scale = Math.min(LOGO_BOX.width / logo.width, LOGO_BOX.height / logo.height);
  const [width, height] = [logo.width * scale, logo.height * scale];
  const [x, y] = [paper.right - width, paper.y + 2];
  const draw = () => void paper.doc.image(logo.bytes, x, y, { width, height });
  paper.tagged('Figure', draw, { alt: say`Logo of ${site}`, bbox: [x, y, x + width, y + height] });
  return { width, foot: y + height };
}

function boardWords({ site }: BankOutcome): string {
  const { transformers } = site.supply;
  const board = say`${formatQuantity(site.nominalV, 'V', 'given')} main board, ${formatNumber(site.frequencyHz, 'given')}\u00a0Hz`;
  const ratings = transformers.map(({ ratedKva }) => formatQuantity(ratedKva, 'kVA', 'given')).join(', ');
  if (transformers.length === 0) return say`${board}, no transformer given.`;
  const meter = site.meteredAt === 'primary' ? say`metered on the primary` : say`metered at the board`;
  return say`${board}, ${transformers.length === 1 ? say`one transformer` : say`${transformers.length} transformers in parallel`} of ${ratings}, ${meter}.`;
}

interface Paragraph {
  lines: Line[];
  style: Style;
  after: number;
}

/** The sentences of the box: proposed, judged, not covered. */
function sentences(paper: Paper, outcome: Outcome | EstimateOutcome, width: number): Paragraph[] {
  const { result } = outcome;
  const count = countDuties(result.duties);
  const set = (text: string, style: Style, after: number, indent = 0): Paragraph => ({
    lines: paper.type.wrap([text], style, width - indent),
    style,
    after,
  });
  const judged =
    result.duties.length === 0
      ? say`Nothing is connected, so no row was judged.`
      : say`${count.judged} rows judged: ${count.clear} within limits, ${count.watch} near a limit, ${count.avoid} over a limit.
        ${count.notJudged} not judged.`;
  return [
    set(headline(outcome), HEADLINE, 5),
    set(verdictSentence(outcome), STRONG, 6, 18),
    set(judged, BODY, 5),
    set(say`Does not cover: ${notCovered(outcome)}.`, BODY, 5),
    set(noPermission(), BODY, 0),
  ];
}

function headline(outcome: Outcome | EstimateOutcome): string {
  if (outcome.kind === 'assess') {
    return isEstimate(outcome) ? say`Judged, ${estimateWords(outcome)}` : say`Judged: ${proposedWords(outcome)}`;
  }
  return isEstimate(outcome) ? say`Proposed, ${estimateWords(outcome)}` : say`Proposed: ${proposedWords(outcome)}`;
}

function verdictSentence({ result, site }: BankOutcome): string {
  const corners = siteCorners(site.supply, site.loads, site).corners.length;
  const levels = result.bank.levelsKvar.length;
  const words = VERDICT_WORDS[result.verdict];
  if (result.bank.stages.length === 0) return words;
  return result.verdict === 'clear'
    ? say`${words} at all ${levels} levels and in all ${corners} corners computed`
    : say`${words}; ${levels} levels and ${corners} corners computed`;
}

function notCovered({ result, site }: Outcome | EstimateOutcome): string {
  const parts = [
    ...(result.record === null ? [say`the load within a month`, say`switchings`] : []),
    ...(result.money === null ? [say`costs and savings`] : []),
    say`a load of another kind`,
    say`rating of breakers and cables beyond section 7`,
  ];
  if (switchesElsewhere(site)) parts.push(say`how capacitors elsewhere in the network are switched`);
  if (site.loads.distorting === null || site.loads.backgroundPct === null)
    parts.unshift(say`distortion, since loads or background are unknown`);
  if (result.record !== null && result.record.missing > 0)
    parts.push(say`${formatNumber(result.record.missing, 'whole')} intervals missing from the record`);
  return parts.join('; ');
}

// They are judged at every number of stages that may be in; over the year their controllers are not simulated.
function switchesElsewhere({ topology }: BankOutcome['site']): boolean {
  return topology !== null && (topology.banks.length > 0 || topology.capacitors.some(({ switched }) => switched));
}

/** Deciding figures, label and value. */
function keyFigures({ result, site }: Outcome): [string, string][] {
  const { requirement, operation, network } = result;
  const factors = (months: readonly { powerFactorLagging: number | null }[]) =>
    months.flatMap(({ powerFactorLagging: value }) => (value === null ? [] : [value]));
  const lowest = (values: number[]) => (values.length === 0 ? '–' : formatNumber(Math.min(...values)));
  const full = network.levels.filter((level) => level.case === 'nominal').at(-1);
  const distortion = result.duties.find(({ name, verdict }) => name === 'voltage distortion' && verdict !== null);
  return [
    [say`needed, at most`, formatQuantity(requirement.maxKvar, 'kvar')],
    [say`needed, 99 %`, formatQuantity(requirement.p99Kvar, 'kvar')],
    [say`effective`, formatQuantity(result.bank.effectiveKvar, 'kvar')],
    [say`target`, formatNumber(site.targetPowerFactor, 'given')],
    [say`set point`, formatNumber(result.control.setPointPowerFactor, 'given')],
    [say`lowest month before`, lowest(factors(requirement.months))],
    [say`lowest month after`, lowest(factors(operation.months))],
    [say`in target`, formatQuantity(operation.shareInTargetPct, '%')],
    [
      say`resonance, all in`,
      full?.parallelOrderH == null || full.levelKvar === 0 ? '–' : say`order\u00a0${formatNumber(full.parallelOrderH)}`,
    ],
    [say`voltage distortion`, distortion === undefined ? '–' : formatQuantity(distortion.value, '%')],
    [say`its limit`, distortion === undefined ? '–' : formatQuantity(distortion.limit, '%', 'given')],
    [say`switchings`, formatNumber(operation.totalSwitchings, 'whole')],
  ];
}

function drawBox(paper: Paper, outcome: Outcome | EstimateOutcome): void {
  const inner = { x: paper.left + PADDING, width: paper.width - 2 * PADDING };
  const textWidth = SENTENCE_SHARE * inner.width - 12;
  const text = sentences(paper, outcome, textWidth);
  const textHeight = text.reduce((sum, { lines, style, after }) => sum + lines.length * leading(style) + after, 0);
  const figures = isEstimate(outcome) ? estimateFigures(outcome) : keyFigures(outcome);
  const rowHeight = leading(BODY) + 4.4;
  const figuresHeight = Math.ceil(figures.length / 2) * rowHeight;
  const diagram = setSingleLine(paper, singleLine(outcome), inner.width);
  const bandText = bandWords(outcome);
  const band = bandText === null ? 0 : BAND;
  const upper = Math.max(textHeight, figuresHeight) + 2 * PADDING;
  const whole = band + upper + diagram.height + PADDING;
  // with the longest of names the diagram takes a box of its own on the next page
  const apart = whole + 4 > paper.bottom - paper.y;
  const top = paper.y;
  if (bandText !== null) drawBand(paper, top, bandText);
  drawSentences(paper, text, { x: inner.x, y: top + band + PADDING, verdict: outcome.result.verdict });
  const right = { x: inner.x + SENTENCE_SHARE * inner.width, width: (1 - SENTENCE_SHARE) * inner.width };
  drawFigures(paper, figures, { ...right, y: top + band + PADDING, rowHeight });
  if (apart) {
    drawFrame(paper, top, band + upper);
    paper.y = top + band + upper + 14;
    paper.need(diagram.height + 2 * PADDING);
    diagram.draw(inner.x, paper.y + PADDING);
    drawFrame(paper, paper.y, diagram.height + 2 * PADDING);
    paper.y += diagram.height + 2 * PADDING + 4;
    return;
  }
  paper.rule({ y: top + band + upper - 4, from: inner.x, to: inner.x + inner.width, ink: HAIR });
  diagram.draw(inner.x, top + band + upper + 8);
  drawFrame(paper, top, whole);
  paper.y = top + whole + 4;
}

function drawFrame(paper: Paper, top: number, height: number): void {
  paper.artifact(() => {
    const { doc } = paper;
    doc.lineWidth(STROKE.frame).rect(paper.left, top, paper.width, height).stroke(INK);
    doc
      .lineWidth(STROKE.tap + 1)
      .moveTo(paper.left - 0.7, top)
      .lineTo(paper.right + 0.7, top)
      .stroke(INK);
  });
}

/** What stands across the box: a limit exceeded, or no record behind the plan. */
function bandWords(outcome: Outcome | EstimateOutcome): string | null {
  const over = outcome.result.verdict === 'avoid';
  const passed = `${VERDICT_WORDS.avoid[0]!.toUpperCase()}${VERDICT_WORDS.avoid.slice(1)}`;
  if (isEstimate(outcome))
    return say`${over ? say`${passed}, and an estimate` : say`Estimate, no record`}: not to be built as it stands`;
  if (over && isInstalled(outcome)) return say`${passed}: not to stay in service as it stands`;
  return over ? say`${passed}: not to be built as it stands` : null;
}

function isInstalled({ kind, site }: BankOutcome): boolean {
  return kind === 'assess' && site.facts.bank?.installed === true;
}

/** Across the box: black, with its mark reversed. */
function drawBand(paper: Paper, top: number, words: string): void {
  const style: Style = { ...STRONG, size: 11, ink: PAPER };
  paper.artifact(() => {
    const { doc, left, width } = paper;
    doc.rect(left, top, width, BAND).fill(INK);
    doc.rect(left + PADDING, top + 7.5, 10, 10).fill(PAPER);
    doc
      .lineWidth(1.6)
      .moveTo(left + PADDING + 1.6, top + 15.9)
      .lineTo(left + PADDING + 8.4, top + 9.1)
      .stroke(INK);
  });
  paper.tagged('P', () => {
    paper.type.put([words], style, paper.left + PADDING + 18, top + 16);
  });
}

function drawSentences(paper: Paper, text: readonly Paragraph[], at: { x: number; y: number; verdict: Verdict }): void {
  let { y } = at;
  text.forEach(({ lines, style, after }, n) => {
    const indent = n === 1 ? 18 : 0;
    if (n === 1) {
      paper.artifact(() => drawVerdictMark(paper.doc, at.verdict, { x: at.x + 5, y: y + rise(style) - 3.4 }, 4));
    }
    paper.tagged('P', () => paper.lines(lines, style, { x: at.x + indent, y }));
    y += lines.length * leading(style) + after;
  });
}

interface FigureArea {
  x: number;
  y: number;
  width: number;
  rowHeight: number;
}

/** Two columns of label and value on hairlines, filled downwards. */
function drawFigures(paper: Paper, figures: readonly [string, string][], area: FigureArea): void {
  const half = Math.ceil(figures.length / 2);
  const gutter = 18;
  const width = (area.width - gutter) / 2;
  figures.forEach(([label, value], n) => {
    const x = area.x + (n >= half ? width + gutter : 0);
    const y = area.y + (n % half) * area.rowHeight;
    const baseline = y + rise(BODY);
    paper.tagged('P', () => {
      paper.type.put([label], LABEL, x, baseline);
      const line = paper.type.line([value], STRONG);
      paper.type.draw(line, x + width - line.width, baseline);
    });
    paper.rule({ y: y + area.rowHeight - 2.6, from: x, to: x + width, ink: HAIR });
  });
}
