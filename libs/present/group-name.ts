import { say } from './language.js';

/**
 * How a group of stages is told of.
 * @param group entry of `bank.stages`, from 0
 * @returns "group 1"
 */
export function groupName(group: number): string {
  return say`group\u00a0${group + 1}`;
}
