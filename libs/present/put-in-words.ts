import type { BankResult, EstimateResult, RecordSummary, Remark, Result } from '#libs/engine/index.js';
import { figureInWords } from './figure-words.js';
import { type Finding, findings } from './findings.js';
import { remarkConsequence, remarkInWords } from './remark-words.js';
import { type RulesEvaluated, rulesEvaluated } from './rules-evaluated.js';

/** A result in words, with its findings by level and how many rules it was put to. */
export type Worded<Judged> = Judged & { findings: Finding[]; rules: RulesEvaluated };

/**
 * Fills the words of a result: the text of every remark, the label and working of every figure.
 * @param result from the engine
 * @returns a copy with words; numbers untouched
 */
export function putInWords(result: Result): Worded<Result> {
  const worded = { ...bankInWords(result), record: recordInWords(result.record) };
  return { ...worded, findings: findings({ result: worded }), rules: rulesEvaluated(worded) };
}

/**
 * Fills the words of a result without a record.
 * @param result from the engine
 * @returns a copy with words; numbers untouched
 */
export function putEstimateInWords(result: EstimateResult): Worded<EstimateResult> {
  const { estimate } = result;
  const worded = { ...bankInWords(result), estimate: { ...estimate, refused: estimate.refused.map(remarkInWords) } };
  return { ...worded, findings: findings({ result: worded }), rules: rulesEvaluated(worded) };
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
