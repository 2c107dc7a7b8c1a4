import { InputProblem, type Problem } from '#libs/engine/index.js';

/** An input problem whose HTTP status is not that of its code. */
export class RefusedRequest extends InputProblem {
  readonly status: number;
  readonly title: string;

  constructor(status: number, title: string, problem: Problem) {
    super([problem]);
    this.status = status;
    this.title = title;
  }
}
