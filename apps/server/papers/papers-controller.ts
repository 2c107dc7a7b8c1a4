import { randomUUID } from 'node:crypto';
import { Body, Controller, Get, Param, Post, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { type PaperGiven, paperSchema } from '#libs/contract/paper-schema.js';
import { InputProblem } from '#libs/engine/index.js';
import { Paper } from '#libs/store/paper.js';
import { insertPaper } from '#libs/store/papers.js';
import { Store } from '#libs/store/store.js';
import { ContractPipe } from '../contract-pipe.js';
import { type Actor, CurrentActor } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { isId } from '../sites/find-site.js';

/** Tariffs and price books that sites refer to by name; a version is never changed, a later one follows it. */
@Controller('api/papers')
export class PapersController {
  constructor(private readonly store: Store) {}

  @Get()
  @Needs('viewer', 'Lists the shared tariffs and price books, every version, the latest of a name first.')
  async list(@CurrentActor() { organisationId }: Actor) {
    const order = { kind: 'ASC', name: 'ASC', version: 'DESC' } as const;
    const papers = await this.store.read((manager) => manager.find(Paper, { where: { organisationId }, order }));
    return { papers: papers.map(headOf) };
  }

  @Post()
  @Needs('planner', 'Adds a shared tariff or price book, or the next version of one.')
  async create(
    @CurrentActor() { organisationId }: Actor,
    @Body({ schema: paperSchema, pipes: [new ContractPipe()] }) body: PaperGiven,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const paper = { ...body, organisationId, id: randomUUID(), after: body.after ?? null };
    const kept = await this.store.write((manager) => insertPaper(manager, paper, new Date()));
    reply.header('location', `/api/papers/${kept.id}`);
    return inFull(kept);
  }

  @Get(':paperId')
  @Needs('viewer', 'Gives one version of a shared tariff or price book.')
  async get(@CurrentActor() { organisationId }: Actor, @Param('paperId') id: string) {
    const paper = isId(id)
      ? await this.store.read((manager) => manager.findOneBy(Paper, { id, organisationId }))
      : null;
    if (paper !== null) return inFull(paper);
    const found = JSON.stringify(id.slice(0, 60));
    throw new InputProblem([{ code: 'not-found', expected: 'a shared paper that exists', found }]);
  }
}

function headOf({ document: _, organisationId: __, ...head }: Paper) {
  return head;
}

function inFull(paper: Paper) {
  return { ...headOf(paper), document: paper.document };
}
