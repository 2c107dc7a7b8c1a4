import { words } from '#libs/present/language.js';
import type { ProposalState } from './proposal-frame.js';

const STATES: Record<ProposalState, string> = words({
  'draft, not reviewed': 'draft, not reviewed',
  'for review': 'for review',
  approved: 'approved',
  superseded: 'superseded',
  withdrawn: 'withdrawn',
});

/**
 * A paper's state as it is printed.
 * @param state in the words of document control
 */
export function stateWords(state: ProposalState): string {
  return STATES[state];
}
