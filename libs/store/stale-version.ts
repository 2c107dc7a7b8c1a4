import { InputProblem } from '#libs/engine/index.js';

/** A change of something that somebody else has changed since it was seen. */
export class StaleVersion extends InputProblem {
  /**
   * @param seen version the client saw
   * @param current version that stands
   */
  constructor(
    readonly seen: number,
    readonly current: number,
  ) {
    super([{ code: 'stale', expected: `version ${current}`, found: `version ${seen}` }]);
  }
}
