import { Question, type QuestionAsked } from '#libs/contract/question.js';

/** Kept answers by id and name. */
export type Offer = { id: string; name: string };

/** A question about a file whose header kept answers were made for: they may settle it, if the sender says so. */
export class QuestionWithOffer extends Question {
  constructor(
    questions: readonly QuestionAsked[],
    readonly offered: readonly Offer[],
  ) {
    super(questions);
  }
}
