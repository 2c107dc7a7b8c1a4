import type { Attempt } from '#libs/review/refusals.js';
import type { CommissioningRecord } from '#libs/contract/review-schema.js';
import type { Capacity, Person, ReviewAct, ReviewFinding, Signature } from '#libs/review/review-act.js';
import { ACTS, ROLES } from '#libs/review/review-act.js';
import type { Chance } from './chance.js';

const HASH = 'ab'.repeat(32);

/** A frozen plan's mark, invented. */
export const MARK = { planHash: HASH, paper: { sha256: HASH, bytes: 1000 } };

/** An invented commissioning record that is whole. */
export const COMMISSIONED: CommissioningRecord = {
  doneOn: '2026-03-14',
  instrument: 'power analyser 3 of the workshop, calibrated 2026-01',
  isolation: { passed: true },
  insulation: { passed: true, leastOhm: 5e8 },
  torque: { passed: true },
  phaseRotation: { passed: true },
  currentTransformer: { passed: true, ratio: '1500/5', phase: 'L1' },
  stages: [{ stage: 1, lineV: 402, currentsA: [53.9, 54.2, 54], dischargedToV: 40, dischargedWithinS: 60 }],
  distortionBefore: { voltagePct: 3.1, currentPct: 12 },
  distortionAfter: { voltagePct: 2.4, currentPct: 9 },
  trips: [{ name: 'overtemperature', operated: true }],
  settings: [{ name: 'set point', value: '0.97' }],
};

/** Somebody who signs, in a capacity. */
export function signature(capacity: Capacity, changes: Partial<Signature> = {}): Signature {
  return { capacity, name: 'M. Okafor', licence: 'REC 10442', jurisdiction: 'Ireland', ...changes };
}

/** One attempt of five people of every role, sound more often than not. */
export function anyAttempt(random: Chance): Attempt {
  const id = random.whole(1, 5);
  const by: Person = { id: `p${id}`, name: `Person ${id}`, role: random.oneOf(ROLES.slice(id === 5 ? 0 : 1)) };
  const stale = random.next() < 0.1 ? ({ why: 'siteChanged', found: 'version 4' } as const) : null;
  return { by, act: anyAct(random), stale };
}

function anyAct(random: Chance): ReviewAct {
  const reason = random.next() < 0.05 ? '  ' : 'seen and agreed';
  const figure = random.oneOf(['a', 'a', 'b', 'none']);
  const sign = (capacity: Capacity) => anySignature(random, capacity);
  switch (
    random.oneOf([
      ...ACTS,
      'submit',
      'submit',
      'acceptFinding',
      'acceptFinding',
      'handCheck',
      'approve',
      'approve',
    ] as const)
  ) {
    case 'prepare':
      return { act: 'prepare', ...MARK };
    case 'submit':
      return {
        act: 'submit',
        note: null,
        signature: random.next() < 0.5 ? null : sign('design'),
        findings: anyFindings(random),
        figures: [
          { id: 'a', label: 'needed at most', value: 300, unit: 'kvar' },
          { id: 'b', label: 'nothing', value: 0, unit: 'A' },
        ],
        ...MARK,
      };
    case 'acceptFinding':
      return { act: 'acceptFinding', finding: random.oneOf(['F1', 'F1', 'F2', 'F9']), reason };
    case 'handCheck':
      return { act: 'handCheck', figure, value: random.oneOf([300, 306, 306.01, 294, 0, 0, Number.NaN]) };
    case 'comment':
      return { act: 'comment', figure: figure === 'none' ? null : figure, text: reason };
    case 'return':
      return { act: 'return', reason };
    case 'allowOwnApproval':
      return { act: 'allowOwnApproval', reason };
    case 'approve':
      return { act: 'approve', signature: sign('checking'), ...MARK };
    case 'supersede':
      return { act: 'supersede', by: random.whole(2, 9), reason };
    case 'withdraw':
      return random.next() < 0.5 ? { act: 'comment', figure, text: reason } : { act: 'withdraw', reason };
    case 'commission':
      return { act: 'commission', signature: sign('installation'), record: COMMISSIONED };
  }
}

function anySignature(random: Chance, capacity: Capacity): Signature {
  if (random.next() < 0.85) return signature(capacity);
  return random.oneOf([
    signature(capacity, { licence: '' }),
    signature(capacity, { jurisdiction: ' \t' }),
    signature(capacity, { name: '' }),
    signature(random.oneOf(['design', 'checking', 'installation'])),
  ]);
}

function anyFindings(random: Chance): ReviewFinding[] {
  const rest = { what: 'something near a limit', value: '', limit: '', consequence: '' };
  return Array.from({ length: random.whole(0, 2) }, (_, at) => ({
    id: `F${at + 1}`,
    level: random.next() < 0.1 ? 'blocks issue' : 'to be accepted',
    ...rest,
  }));
}
