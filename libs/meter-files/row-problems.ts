import { InputProblem, type Problem } from '#libs/engine/index.js';

/** As many as a person can work through; the rest of the file is then not read. */
const MOST = 20;

/** Gathers what is wrong in the rows of a file, so that one reading names it all. */
export class RowProblems {
  readonly #problems: Problem[] = [];

  /**
   * Notes a problem.
   * @throws InputProblem when there are more than anyone would read
   */
  add(problem: Problem): void {
    this.#problems.push(problem);
    if (this.#problems.length >= MOST) this.refuse();
  }

  /** @throws InputProblem where there is any problem */
  refuse(): void {
    if (this.#problems.length > 0) throw new InputProblem(this.#problems);
  }
}
