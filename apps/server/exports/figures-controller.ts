import { Controller, Get, Param } from '@nestjs/common';
import { type EstimateResult, InputProblem, type Result } from '#libs/engine/index.js';
import { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import type { FigureFile } from '#libs/proposal/render-figures.js';
import { Store } from '#libs/store/store.js';
import { type Actor, CurrentActor } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import type { FiguresTask } from '../planning/compute-figures.js';
import { findRevision, type RevisionPath } from '../planning/find-revision.js';
import { frozenTask } from '../review/recompute.js';

/** The figures of a revision as drawings. */
@Controller('api/sites/:siteId/revisions/:revision/figures')
export class FiguresController {
  constructor(
    private readonly store: Store,
    private readonly pool: WorkerPool,
  ) {}

  @Get()
  @Needs('viewer', 'Draws the single-line diagram and the figures of a revision as SVG, from its frozen inputs.')
  async draw(@CurrentActor() actor: Actor, @Param() path: RevisionPath): Promise<{ figures: FigureFile[] }> {
    const revision = await findRevision(this.store, actor, path);
    const kept = JSON.parse(revision.result) as Result | EstimateResult;
    const task: FiguresTask = { ...(await frozenTask(this.store, revision)), kept };
    const figures = await this.pool.run<FigureFile[] | null>('computeFigures', task);
    if (figures !== null) return { figures };
    const expected = `engine ${revision.engineVersion}, whose result is kept: compute the revision again and compare`;
    throw new InputProblem([{ code: 'conflict', expected, found: 'an engine that gives another result' }]);
  }
}
