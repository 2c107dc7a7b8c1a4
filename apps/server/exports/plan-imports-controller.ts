import { randomUUID } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { Controller, Post, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { resultHashOf, siteDocumentOf, type TakenPlan } from '#libs/contract/plan-document.js';
import { InputProblem } from '#libs/engine/index.js';
import { MOST_PLAN_BYTES, readPlanFile } from '#libs/meter-files/read-plan-file.js';
import { takenPlanWords } from '#libs/present/export-words.js';
import { planTables } from '#libs/present/result-tables.js';
import { sha256 } from '#libs/store/audit-log.js';
import { insertSite } from '#libs/store/sites.js';
import { Store } from '#libs/store/store.js';
import { ofOrganisation, revisionsOfContent } from '#libs/store/verify-paper.js';
import { Once, replayed } from '../once/once.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { Spool } from '../records/spool.js';
import { tagOf } from '../sites/version-tag.js';

/**
 * A plan that was exported, here or elsewhere, taken back: its frozen site becomes a site, so that with its record the same
 * plan can be computed. Its numbers are checked and told, and never stored as if they had been computed here.
 */
@Controller('api/plan-imports')
export class PlanImportsController {
  constructor(
    private readonly store: Store,
    private readonly once: Once,
    private readonly spool: Spool,
  ) {}

  @Post()
  @Needs('planner', 'Takes an exported plan back (plan.json, plan.csv or plan.xlsx as the body) and adds its site.')
  async take(@Req() request: FastifyRequest, @Res({ passthrough: true }) reply: FastifyReply) {
    const { organisationId } = actorOf(request);
    const plan = await this.#planIn(request);
    const { contentHash, resultHash, inputs, result } = plan;
    const answered = await this.once.begin(request, { contentHash, resultHash });
    if (answered !== null) return JSON.parse(replayed(reply, answered)) as object;
    const document = siteDocumentOf(inputs.site);
    const { name } = document;
    const site = await this.store.write((manager) =>
      insertSite(manager, { id: randomUUID(), organisationId, name, document }, new Date()),
    );
    reply.header('location', `/api/sites/${site.id}`).header('etag', tagOf(site.version));
    const { kind, recordHash, engineVersion } = inputs;
    const { verdict } = result;
    return {
      ...{ id: site.id, name, version: site.version, site: document },
      plan: { kind, contentHash, resultHash, recordHash, engineVersion, verdict },
      revisions: await this.#standing(plan, organisationId),
      text: takenPlanWords({ kind, contentHash, recordHash, hasPapers: inputs.site.papers !== undefined }),
    };
  }

  async #planIn(request: FastifyRequest): Promise<TakenPlan> {
    const { file } = await this.spool.receive(request);
    try {
      if (file.bytes > MOST_PLAN_BYTES) {
        const expected = `a plan of at most ${MOST_PLAN_BYTES} bytes`;
        throw new InputProblem([{ code: 'too-large', expected, found: `${file.bytes}` }]);
      }
      const taken = await readPlanFile(await readFile(file.path), { hash: sha256, tablesOf: planTables });
      if (taken.kind === 'plan') return taken;
    } finally {
      await this.spool.discard(file);
    }
    const expected = 'an exported plan, which holds its inputs';
    const found = 'a calculation sheet: POST /api/verify says of which revision it is, and whether it has its figures';
    throw new InputProblem([{ code: 'unknown-format', expected, found }]);
  }

  /** The revisions of equal inputs that the importer may see, and whether they came to the same. */
  async #standing({ contentHash, resultHash }: TakenPlan, organisationId: string) {
    const found = await this.store.read((manager) =>
      revisionsOfContent(manager, [contentHash], ofOrganisation(organisationId)),
    );
    return found.map(({ siteId, number, revision, result }) => {
      const hasItsNumbers = resultHashOf(JSON.parse(result) as object, contentHash, sha256) === resultHash;
      return { siteId, number, revision, hasItsNumbers };
    });
  }
}
