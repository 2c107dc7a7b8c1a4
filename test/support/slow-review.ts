import type { Attempt } from '#libs/review/refusals.js';
import type { ReviewAct } from '#libs/review/review-act.js';

/**
 * Document control once more, as a clerk would keep it on a card: crossings of states written out one by one, no table
 * shared with the program.
 */
export class ClerkCard {
  state = 'draft';
  readonly #hands = new Set<string>();
  readonly #open = new Set<string>();
  readonly #figures = new Map<string, number>();
  readonly #checks = new Map<string, number>();
  readonly #explained = new Set<string>();
  #blocked = false;
  #leave = false;
  #made = false;

  /** Whether the clerk would let it happen. */
  allows({ by, act, stale }: Attempt): boolean {
    const rank = { viewer: 0, planner: 1, reviewer: 2, administrator: 3 }[by.role];
    const others = this.#leave || !this.#hands.has(by.id);
    switch (act.act) {
      case 'prepare':
        return this.state === 'draft' && rank >= 1 && !this.#made && this.#hands.size === 0;
      case 'submit':
        return this.state === 'draft' && rank >= 1 && (act.signature === null || written(act.signature, 'design'));
      case 'acceptFinding':
        return this.#reviewing(rank) && others && this.#open.has(act.finding) && act.reason.trim() !== '';
      case 'handCheck':
        return this.#reviewing(rank) && others && this.#figures.has(act.figure) && Number.isFinite(act.value);
      case 'comment':
        return ['draft', 'forReview', 'approved'].includes(this.state) && rank >= 1 && act.text.trim() !== '';
      case 'return':
        return this.#reviewing(rank) && act.reason.trim() !== '';
      case 'allowOwnApproval':
        return ['draft', 'forReview'].includes(this.state) && rank === 3 && act.reason.trim() !== '';
      case 'approve':
        return this.#reviewing(rank) && others && !stale && this.#isSettled() && written(act.signature, 'checking');
      case 'supersede':
        return this.state === 'approved' && rank >= 2 && act.reason.trim() !== '';
      case 'withdraw':
        return this.#mayWithdraw(rank) && act.reason.trim() !== '';
      case 'commission':
        return this.state === 'approved' && rank >= 1 && written(act.signature, 'installation');
    }
  }

  #mayWithdraw(rank: number): boolean {
    if (this.state === 'approved') return rank >= 2;
    return ['draft', 'forReview'].includes(this.state) && rank >= 1;
  }

  #reviewing(rank: number): boolean {
    return this.state === 'forReview' && rank >= 2;
  }

  #isSettled(): boolean {
    if (this.#blocked || this.#open.size > 0 || this.#checks.size === 0) return false;
    return [...this.#checks].every(([figure, value]) => {
      const computed = this.#figures.get(figure)!;
      const near = Math.abs(value - computed) <= 0.02 * Math.abs(computed) * (1 + 1e-9);
      return near || this.#explained.has(figure);
    });
  }

  /** Writes on the card what has happened. */
  note({ by, act }: Attempt): void {
    switch (act.act) {
      case 'prepare':
        this.#made = true;
        this.#hands.add(by.id);
        break;
      case 'submit':
        this.#hands.add(by.id);
        this.#sentForReview(act);
        break;
      case 'acceptFinding':
        this.#open.delete(act.finding);
        break;
      case 'handCheck':
        this.#checks.set(act.figure, act.value);
        break;
      case 'comment':
        if (act.figure !== null) this.#explained.add(act.figure);
        break;
      case 'allowOwnApproval':
        this.#leave = true;
        break;
      default:
        this.state = {
          return: 'draft',
          approve: 'approved',
          supersede: 'superseded',
          withdraw: 'withdrawn',
          commission: this.state,
        }[act.act];
    }
  }

  #sentForReview({ findings, figures }: Pick<Extract<ReviewAct, { act: 'submit' }>, 'findings' | 'figures'>): void {
    this.state = 'forReview';
    this.#open.clear();
    this.#figures.clear();
    this.#checks.clear();
    for (const { id, level } of findings) if (level === 'to be accepted') this.#open.add(id);
    this.#blocked = findings.some(({ level }) => level === 'blocks issue');
    for (const { id, value } of figures) this.#figures.set(id, value);
  }
}

function written(
  signature: { capacity: string; name: string; licence: string; jurisdiction: string },
  capacity: string,
) {
  const { name, licence, jurisdiction } = signature;
  return signature.capacity === capacity && [name, licence, jurisdiction].every((text) => /\S/.test(text));
}
