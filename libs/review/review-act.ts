import type { CommissioningRecord } from '#libs/contract/review-schema.js';

/** What somebody may do, each role with everything the one before it may. */
export const ROLES = ['viewer', 'planner', 'reviewer', 'administrator'] as const;
export type Role = (typeof ROLES)[number];

/** Who does something: the account, and the name and role it had at that moment. */
export interface Person {
  id: string;
  name: string;
  role: Role;
}

/** What a signature answers for. */
export const CAPACITIES = ['design', 'checking', 'installation'] as const;
export type Capacity = (typeof CAPACITIES)[number];

/** A signature as its own hand typed it; licence and jurisdiction are never filled in for anybody. */
export interface Signature {
  capacity: Capacity;
  name: string;
  licence: string;
  jurisdiction: string;
}

/** Levels of a finding that a review turns on; the rest asks nothing of a reviewer. */
export type WeighingLevel = 'blocks issue' | 'to be accepted';

/** A finding of the plan as it was sent for review. */
export interface ReviewFinding {
  /** code and place, unlike that of every other finding of the plan */
  id: string;
  level: WeighingLevel;
  what: string;
  value: string;
  limit: string;
  consequence: string;
}

/** A decisive number of the plan, to be checked by hand. */
export interface DecisiveFigure {
  id: string;
  label: string;
  value: number;
  unit: string;
}

/** A paper by its bytes. */
export interface PaperMark {
  /** SHA-256, 64 hexadecimal digits */
  sha256: string;
  bytes: number;
}

/** What is kept of a plan when it is made, sent for review or approved: nothing it prints can change unseen. */
export interface FrozenPlanMark {
  /** SHA-256 over everything that is stored of the revision */
  planHash: string;
  paper: PaperMark;
}

/** Everything that can happen to a revision. */
export type ReviewAct =
  | ({ act: 'prepare' } & FrozenPlanMark)
  | ({
      act: 'submit';
      note: string | null;
      signature: Signature | null;
      findings: ReviewFinding[];
      figures: DecisiveFigure[];
    } & FrozenPlanMark)
  | { act: 'acceptFinding'; finding: string; reason: string }
  | { act: 'handCheck'; figure: string; value: number }
  | { act: 'comment'; figure: string | null; text: string }
  | { act: 'return'; reason: string }
  | { act: 'allowOwnApproval'; reason: string }
  | ({ act: 'approve'; signature: Signature } & FrozenPlanMark)
  | { act: 'supersede'; by: number; reason: string }
  | { act: 'withdraw'; reason: string }
  | { act: 'commission'; signature: Signature; record: CommissioningRecord };

/** An act, who did it and when. */
export interface ReviewEvent {
  /** UTC, ISO 8601 with milliseconds */
  at: string;
  by: Person;
  act: ReviewAct;
}

/** The names of the acts, in the order a revision usually meets them. */
export const ACTS = [
  'prepare',
  'submit',
  'acceptFinding',
  'handCheck',
  'comment',
  'return',
  'allowOwnApproval',
  'approve',
  'supersede',
  'withdraw',
  'commission',
] as const satisfies readonly ReviewAct['act'][];
