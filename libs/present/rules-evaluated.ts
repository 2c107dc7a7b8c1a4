import type { EstimateResult, Result } from '#libs/engine/index.js';
import { formatNumber } from './format-number.js';
import { say } from './language.js';
import { RECORD_MESSAGES } from './record-messages.js';
import { UNUSUAL_MESSAGES } from './unusual-messages.js';

/** How many rules a result was put to, triggered or not. */
export interface RulesEvaluated {
  /** rows held against a limit */
  rows: number;
  /** rows without a limit, or of unknown loads */
  notJudged: number;
  /** devices whose fitted rating was held against what it meets */
  devices: number;
  /** assumptions moved to either end of what practice meets */
  assumptions: number;
  /** signs of a fault that the record's values were searched for */
  signs: number;
  /** inputs held against what is built or agreed */
  inputs: number;
}

const UNUSUAL = Object.keys(UNUSUAL_MESSAGES);
/** What can only be looked at beside a record. */
const BESIDE_RECORD = ['record.moreKvarhThanKwh', 'bank.aboveLoad', 'loads.aboveRecord', 'currentTransformer.unusual'];
const SIGNS = Object.keys(RECORD_MESSAGES).filter((code) => code.startsWith('sign.')).length;

/**
 * Counts the rules that were evaluated, so that silence can be told from not having looked.
 * @param result plan or judgement
 * @returns counts by kind
 */
export function rulesEvaluated(result: Result | EstimateResult): RulesEvaluated {
  const { duties, devices, assumptions, record } = result;
  const judged = duties.filter(({ verdict }) => verdict !== null).length;
  return {
    rows: judged,
    notJudged: duties.length - judged,
    devices: devices.filter(({ state }) => state === 'fits' || state === 'short').length,
    assumptions: assumptions.filter(({ effect }) => effect !== null).length,
    signs: record === null ? 0 : SIGNS,
    inputs: UNUSUAL.length - (record === null ? BESIDE_RECORD.length : 0),
  };
}

/**
 * The count of rules in words.
 * @param rules counts
 * @returns a sentence, the sum first
 */
export function rulesWords({ rows, notJudged, devices, assumptions, signs, inputs }: RulesEvaluated): string {
  const whole = (count: number): string => formatNumber(count, 'whole');
  const parts = [
    say`${whole(rows)} ${rows === 1 ? say`row` : say`rows`} held against a limit`,
    say`${whole(devices)} fitted ${devices === 1 ? say`rating` : say`ratings`}`,
    say`${whole(assumptions)} ${assumptions === 1 ? say`assumption` : say`assumptions`} moved to either end`,
    say`${whole(signs)} signs of a fault in the record`,
    say`${whole(inputs)} inputs held against what is built`,
  ];
  const open = notJudged === 0 ? say`none was left unjudged` : say`${whole(notJudged)} could not be judged`;
  return say`${whole(rows + devices + assumptions + signs + inputs)} rules were evaluated: ${parts.join(', ')}; ${open}.`;
}
