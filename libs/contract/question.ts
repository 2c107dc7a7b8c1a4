import { InputProblem, type RecordOverlap } from '#libs/engine/index.js';
import type { MeterMap } from './meter-map.js';

/** One way of reading what is in doubt, and what would come of it. */
export interface QuestionReading {
  /** what `--map` takes to settle it this way */
  map: MeterMap;
  /** [kW] */
  maxKw: number;
  /** [kWh] */
  activeKwh: number;
  firstRows: string[][];
}

/** Something the file leaves open, with every reading that makes sense. */
export interface QuestionAsked {
  id: string;
  /** one sentence: what is in doubt */
  about: string;
  readings: QuestionReading[];
  /** where a record and the file that extends it differ, and by how much */
  overlap?: RecordOverlap;
}

/** Thrown where the data can be read in more than one way and guessing would change the result. */
export class Question extends InputProblem {
  readonly questions: readonly QuestionAsked[];

  /**
   * @param questions what is in doubt
   * @param place row and column of the file that raise it, where one does
   */
  constructor(questions: readonly QuestionAsked[], place: { row?: number; column?: number } = {}) {
    super(
      questions.map((question) => ({
        code: 'question' as const,
        ...place,
        expected: `an answer: ${question.about}`,
        found: `${question.readings.length} readings`,
      })),
    );
    this.questions = questions;
  }
}
