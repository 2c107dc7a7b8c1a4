import { type EstimateOutcome, isEstimate, monthSpan, type Outcome } from '#libs/engine/index.js';
import { catalogueOf } from '#libs/present/catalogue-of.js';
import { inLanguage, say, spokenCatalogue } from '#libs/present/language.js';
import { plainName } from '#libs/present/plain-name.js';
import { putEstimateInWords, putInWords } from '#libs/present/put-in-words.js';
import { needIssuable } from './missing-parts.js';
import { drawHeaders, setHeader } from './page-header.js';
import { Paper, sheet } from './paper.js';
import type { ProposalFrame } from './proposal-frame.js';
import { type Logo, readLogo } from './read-logo.js';
import { drawAgeing } from './section-ageing.js';
import { drawAssumptions, drawBasis } from './section-basis.js';
import { drawCautions } from './section-cautions.js';
import { drawDataQuality } from './section-data.js';
import { drawDecision } from './section-decision.js';
import { drawEstimate, drawLeftOut } from './section-estimate.js';
import { drawFindings } from './section-findings.js';
import { drawHandCheck } from './section-hand-check.js';
import { drawHistory } from './section-history.js';
import { drawValidity } from './section-limits.js';
import { drawLoad } from './section-load.js';
import { drawMaintenance } from './section-maintenance.js';
import { drawMaterials } from './section-materials.js';
import { drawMeasured } from './section-measured.js';
import { drawMethod } from './section-method.js';
import { drawMoney } from './section-money.js';
import { drawNetwork } from './section-network.js';
import { drawOperatorPage } from './section-operator.js';
import { drawReevaluation } from './section-reevaluation.js';
import { drawSensitivity } from './section-sensitivity.js';
import { drawSettings } from './section-settings.js';
import { drawAccepted, drawSignatures } from './section-signatures.js';
import { drawSiteActions } from './section-site-actions.js';
import { drawStages } from './section-stages.js';
import { drawVerification } from './section-verification.js';

export type { ProposalFrame } from './proposal-frame.js';

/**
 * The proposal as a tagged PDF: equal outcome and frame give equal bytes.
 * A plan without a record prints as an estimate and leaves out what needs one.
 * @param outcome the plan or judgement, its result already put in words
 * @param frame number, revision, state, hash and sheet
 * @returns the file's bytes
 * @throws InputProblem where the logo can't be used, or the paper is to be more than a draft and a part is empty or a finding
 * blocks issue
 */
export async function renderProposal(outcome: Outcome | EstimateOutcome, frame: ProposalFrame): Promise<Uint8Array> {
  needIssuable(outcome, frame);
  const logo = frame.logo == null ? null : readLogo(frame.logo);
  const catalogue = catalogueOf(frame.language ?? 'en');
  const info = inLanguage(catalogue, () => infoOf(outcome, frame));
  const doc = await openDocument(info, frame);
  const chunks: Buffer[] = [];
  const finished = new Promise<void>((resolve, reject) => {
    doc.on('data', (chunk: Buffer) => chunks.push(chunk));
    doc.on('end', resolve);
    doc.on('error', reject);
  });
  inLanguage(catalogue, () => drawParts(new Paper(doc), reworded(outcome), frame, logo));
  doc.end();
  await finished;
  return Buffer.concat(chunks);
}

/** An outcome comes in English words; another language finds its own by code and value. */
function reworded(outcome: Outcome | EstimateOutcome): Outcome | EstimateOutcome {
  if (spokenCatalogue() === null) return outcome;
  if (isEstimate(outcome)) return { ...outcome, result: putEstimateInWords(outcome.result) };
  return { ...outcome, result: putInWords(outcome.result) };
}

function drawParts(paper: Paper, outcome: Outcome | EstimateOutcome, frame: ProposalFrame, logo: Logo | null): void {
  const header = setHeader(paper, frame, outcome);
  paper.begin(header.contentTop);
  drawDecision(paper, outcome, { logo, tonight: frame.reevaluation ?? frame.tonight ?? null });
  drawReevaluation(paper, outcome, frame.reevaluation);
  drawSignatures(paper, outcome, frame);
  drawFindings(paper, outcome);
  drawAccepted(paper, outcome, frame);
  drawBasis(paper, outcome);
  drawAssumptions(paper, outcome);
  if (isEstimate(outcome)) drawEstimate(paper, outcome);
  else drawDataQuality(paper, outcome);
  drawMethod(paper, outcome);
  drawStages(paper, outcome);
  if (isEstimate(outcome)) drawLeftOut(paper, outcome);
  else drawLoad(paper, outcome);
  drawNetwork(paper, outcome);
  drawMeasured(paper, outcome);
  drawSensitivity(paper, outcome);
  drawMoney(paper, outcome);
  drawValidity(paper, outcome);
  drawAgeing(paper, outcome);
  drawHandCheck(paper, outcome);
  drawSiteActions(paper, outcome);
  drawCautions(paper, outcome);
  drawSettings(paper, outcome);
  drawOperatorPage(paper, outcome);
  drawMaintenance(paper, outcome);
  drawMaterials(paper, outcome);
  drawHistory(paper, outcome, frame);
  drawVerification(paper, outcome, frame);
  drawHeaders(paper, header);
  paper.end();
}

/** What the file says of itself; dates come from the content, never from a clock. */
function infoOf(outcome: Outcome | EstimateOutcome, frame: ProposalFrame): PDFKit.DocumentInfo {
  const when = new Date(contentEndS(outcome) * 1000);
  return {
    Title: say`Power-factor correction for ${plainName(outcome.site.name)}`,
    // in English whatever the paper is in: by this line a register finds the paper that a file says it is
    Subject: `Proposal ${frame.number}, revision ${frame.revision}, ${frame.state}`,
    Keywords: frame.contentHash,
    Creator: `Varwright engine ${frame.engineVersion}`,
    Producer: `Varwright engine ${frame.engineVersion}`,
    CreationDate: when,
    ModDate: when,
  };
}

/** pdfkit is loaded when the first paper is wanted. */
async function openDocument(info: PDFKit.DocumentInfo, frame: ProposalFrame): Promise<PDFKit.PDFDocument> {
  const { default: PDFDocument } = await import('pdfkit');
  return new PDFDocument({
    size: sheet(frame.paper ?? 'A4'),
    margin: 0,
    pdfVersion: '1.7',
    tagged: true,
    lang: frame.language ?? 'en',
    displayTitle: true,
    bufferPages: true,
    // no font until one of ours is asked for, so that none of the built-in ones gets in
    font: null as unknown as string,
    info,
  });
}

/** End of what the paper stands on: the record's, or of the months of the bills; the day of asking without either [s]. */
function contentEndS(outcome: Outcome | EstimateOutcome): number {
  if (!isEstimate(outcome)) return outcome.record.endS;
  const last = outcome.result.estimate.months.at(-1);
  if (last === undefined) return Date.parse(`${outcome.site.asOf ?? '1970-01-01'}T00:00:00Z`) / 1000;
  return monthSpan(outcome.zone, Number(last.month.slice(0, 4)), Number(last.month.slice(5))).endS;
}
