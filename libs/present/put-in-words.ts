import type { BankResult, EstimateResult, RecordSummary, Remark, Result } from '#libs/engine/index.js';
import { figureInWords } from './figure-words.js';
import { remarkConsequence, remarkInWords } from './remark-words.js';

/**
 * Fills the words of a result: the text of every remark, the label and working of every figure.
 * @param result from the engine
 * @returns a copy with words; numbers untouched
 */
export function putInWords(result: Result): Result {
  return { ...bankInWords(result), record: recordInWords(result.record) };
}

/**
 * Fills the words of a result without a record.
 * @param result from the engine
 * @returns a copy with words; numbers untouched
 */
export function putEstimateInWords(result: EstimateResult): EstimateResult {
  const { estimate } = result;
  return { ...bankInWords(result), estimate: { ...estimate, refused: estimate.refused.map(remarkInWords) } };
}

function bankInWords<T extends BankResult>(result: T): T {
  return {
    ...result,
    reasons: result.reasons.map(remarkInWords),
    assumptions: result.assumptions.map(remarkInWords),
    cautions: result.cautions.map(remarkInWords),
    figures: result.figures.map((figure) => figureInWords(figure, result.duties)),
  };
}

/**
 * Fills the words of a record's notes.
 * @param summary from the engine
 * @returns a copy with words
 */
export function recordInWords(summary: RecordSummary): RecordSummary {
  return {
    ...summary,
    gradeRule: remarkInWords(summary.gradeRule),
    notes: summary.notes.map(remarkInWords),
  };
}

/**
 * Fills the words of a quality statement: the rule of its grade, and each question with what to ask.
 * @param quality what a reader says of its file
 * @returns a copy with words
 */
export function qualityInWords<Stated extends { gradeRule: Remark; questions: readonly Remark[] }>(
  quality: Stated,
): Stated {
  return {
    ...quality,
    gradeRule: remarkInWords(quality.gradeRule),
    questions: quality.questions.map((question) => {
      const said = remarkInWords(question);
      return { ...said, text: `${said.text} ${remarkConsequence(question)}` };
    }),
  };
}
