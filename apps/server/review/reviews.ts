import { Inject, Injectable } from '@nestjs/common';
import { ENGINE_VERSION, InputProblem } from '#libs/engine/index.js';
import { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import { catalogueOf } from '#libs/present/catalogue-of.js';
import { inLanguage } from '#libs/present/language.js';
import { replacedWords } from '#libs/present/review-words.js';
import { refusals } from '#libs/review/refusals.js';
import { afterEvent, type Review } from '#libs/review/review.js';
import type { ReviewAct, Signature } from '#libs/review/review-act.js';
import { IssuedPaper } from '#libs/store/issued-paper.js';
import { approvedBeside } from '#libs/store/later-work.js';
import { frozenMark } from '#libs/store/plan-hash.js';
import { ProposalFile } from '#libs/store/proposal-file.js';
import { carryOut, readReview, type VersionedReview } from '#libs/store/reviews.js';
import { Revision } from '#libs/store/revision.js';
import { Store } from '#libs/store/store.js';
import type { StoredSite } from '#libs/store/stored-site.js';
import type { Actor } from '../people/actor.js';
import type { Confirm } from '../people/confirm.js';
import { frameOf, sheetOfRevision } from '../planning/frame-of.js';
import { CONFIRM } from '../tokens.js';
import { personOf } from './person-of.js';
import { printedReview } from './printed-review.js';
import { recompute } from './recompute.js';
import { reviewInputs } from './review-inputs.js';
import { stalenessOf } from './staleness.js';

/** Who asks, of which revision of which site, and the version of its review they saw. */
export interface Asked {
  actor: Actor;
  site: StoredSite;
  revision: Revision;
  seen: number;
}

/** Carries reviews on: the rules stand in libs/review; here is what they need from the store and the engine. */
@Injectable()
export class Reviews {
  constructor(
    private readonly store: Store,
    private readonly pool: WorkerPool,
    @Inject(CONFIRM) private readonly confirm: Confirm,
  ) {}

  /** Does what needs nothing but the rules. */
  act({ actor, revision, seen }: Asked, act: ReviewAct): Promise<VersionedReview> {
    const by = personOf(actor);
    return this.store.write((manager) => carryOut(manager, revision, { by, act, now: new Date(), seen }));
  }

  /** Sends a draft for review, with its findings and decisive figures as they are now. */
  async submit(asked: Asked, note: string | null, signature: Signature | null): Promise<VersionedReview> {
    const { revision } = asked;
    const draft = await this.store.read((manager) =>
      manager.findOneByOrFail(ProposalFile, { revisionId: revision.id }),
    );
    const mark = frozenMark(revision, draft.bytes);
    return this.act(asked, { act: 'submit', note, signature, ...reviewInputs(revision), ...mark });
  }

  /**
   * Puts another approved revision in the place of an approved one.
   * @throws InputProblem where that one is not approved
   */
  async supersede(asked: Asked, by: number, reason: string): Promise<VersionedReview> {
    const { siteId, revision } = asked.revision;
    const other = await this.store.read((manager) => manager.findOneBy(Revision, { siteId, revision: by }));
    const standing = other === null ? null : await this.store.read((manager) => readReview(manager, other.id));
    if (by !== revision && standing?.review.state === 'approved')
      return this.act(asked, { act: 'supersede', by, reason });
    throw new InputProblem([
      { code: 'conflict', path: 'by', expected: 'another revision that is approved', found: `${by}` },
    ]);
  }

  /**
   * Approves a revision: computes it once more, prints it as approved, and freezes plan and paper in one write, in which
   * earlier approved revisions of the same kind are superseded.
   * @throws InputProblem with every reason against it; RefusedRequest where the password is another
   */
  async approve(asked: Asked, signature: Signature, password: string | undefined): Promise<VersionedReview> {
    const { actor, site, revision, seen } = asked;
    await this.confirm(actor, password);
    const { review, version } = await this.store.read((manager) => readReview(manager, revision.id));
    if (version !== seen) {
      throw new InputProblem([{ code: 'stale', expected: `version ${version}`, found: `version ${seen}` }]);
    }
    const by = personOf(actor);
    const now = new Date();
    const stale = await stalenessOf(this.store, site, revision);
    const unprinted: ReviewAct = { act: 'approve', signature, ...frozenMark(revision, new Uint8Array()) };
    const problems = refusals(review, { by, act: unprinted, stale });
    if (problems.length > 0) throw new InputProblem(problems);
    const paper = await this.#print(revision, afterEvent(review, { at: now.toISOString(), by, act: unprinted }));
    const mark = frozenMark(revision, paper);
    const act: ReviewAct = { act: 'approve', signature, ...mark };
    return this.store.write(async (manager) => {
      const approved = await carryOut(manager, revision, { by, act, now, seen, stale });
      const issued = { revisionId: revision.id, bytes: Buffer.from(paper), sha256: mark.paper.sha256 };
      await manager.insert(IssuedPaper, issued);
      for (const earlier of await approvedBeside(manager, revision)) {
        const replaced = { act: 'supersede', by: revision.revision, reason: replacedWords(revision.revision) } as const;
        await carryOut(manager, earlier, { by, act: replaced, now, seen: null });
      }
      return approved;
    });
  }

  /** @throws Error where the same inputs and engine give another result: our fault, and nothing to put a name to */
  async #print(revision: Revision, approved: Review): Promise<Uint8Array> {
    const draft = { ...(await frameOf(this.store, revision)), ...(await sheetOfRevision(this.store, revision)) };
    const preparedBy = draft.preparedBy ?? approved.preparers.map(({ name }) => name).join(', ');
    const review = inLanguage(catalogueOf(draft.language ?? 'en'), () => printedReview(approved));
    const frame = { ...draft, state: 'approved' as const, preparedBy, review };
    const bench = { store: this.store, pool: this.pool };
    const { result, proposal, proposed } = await recompute(bench, revision, frame);
    if (JSON.stringify(result) !== revision.result || proposed !== revision.proposed) {
      throw new Error(`revision ${revision.id} computed again with engine ${ENGINE_VERSION} gives another result`);
    }
    return proposal;
  }
}
