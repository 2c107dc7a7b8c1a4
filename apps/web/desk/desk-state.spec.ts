// Right by the rule that what is kept is what was looked at.
import { describe, expect, it } from 'vitest';
import { assessedSite } from '../../../test/support/assessed-site.js';
import type { RevisionShown } from '../api/shown.js';
import { type DeskState, documentToKeep, NOTHING_YET, studiedDocument } from './desk-state.js';

const TRIAL = { stages: [{ count: 3, ratedKvar: 25, ratedV: 480, reactorPct: 7 }] };

const OWN = { name: 'x', timeZone: 'UTC', bank: { stages: [] } };

/** A plan whose search took another set point than the target, and a bank under the hand. */
function movedBy(hand: Partial<DeskState>): DeskState {
  const result = assessedSite({ control: { setPointPowerFactor: 0.99 } });
  const kept = { kind: 'plan', result } as RevisionShown;
  return { ...NOTHING_YET, document: OWN, kept, trial: TRIAL, ...hand };
}

describe('what is saved of a site', () => {
  it('is the bank under the hand with the set point it was looked at with', () => {
    const saved = documentToKeep(movedBy({}), 'assess');
    expect(saved).toEqual({ ...OWN, bank: TRIAL, control: { setPointPowerFactor: 0.99 } });
    expect(saved).toEqual(studiedDocument(movedBy({})));
  });

  it('keeps a set point that was typed, and the rest of the controller', () => {
    const document = { ...OWN, control: { setPointPowerFactor: 0.97, stepDelayS: 20 } };
    expect(documentToKeep(movedBy({ document }), 'assess')).toEqual({ ...document, bank: TRIAL });
  });

  it('is the document as it stands where nothing is under the hand or a bank is designed', () => {
    expect(documentToKeep(movedBy({ trial: null }), 'assess')).toBe(OWN);
    expect(documentToKeep(movedBy({}), 'plan')).toBe(OWN);
  });
});
