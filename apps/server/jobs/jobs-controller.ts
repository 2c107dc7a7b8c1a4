import { Readable } from 'node:stream';
import { Controller, Delete, Get, Headers, HttpCode, Inject, Param, Post, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import type { Jobs } from '#libs/jobs/jobs.js';
import type { Job } from '#libs/store/job.js';
import { Store } from '#libs/store/store.js';
import { type Actor, actorOf, CurrentActor } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { discardImport, IMPORT } from '../records/import-jobs.js';
import { Spool } from '../records/spool.js';
import { JOBS } from '../tokens.js';
import { findJob } from './find-job.js';
import { showJob } from './show-job.js';

/** Long work: how far it is, and how to stop it. */
@Controller('api/jobs')
export class JobsController {
  constructor(
    private readonly store: Store,
    @Inject(JOBS) private readonly jobs: Jobs,
    private readonly spool: Spool,
  ) {}

  @Get(':jobId')
  @Needs('viewer', 'Says how far a job is.')
  async get(@CurrentActor() actor: Actor, @Param('jobId') jobId: string) {
    return showJob(await findJob(this.store, actor, jobId));
  }

  @Delete(':jobId')
  @Needs('planner', 'Cancels a job that is not finished.')
  async remove(@CurrentActor() actor: Actor, @Param('jobId') jobId: string) {
    const { id } = await findJob(this.store, actor, jobId);
    const job = await this.jobs.cancel(id);
    if (job.kind === IMPORT) await discardImport(this.spool, job);
    return showJob(job);
  }

  @Post(':jobId/cancel')
  @HttpCode(200)
  @Needs('planner', 'Cancels a job that is not finished.')
  async cancel(@CurrentActor() actor: Actor, @Param('jobId') jobId: string) {
    return this.remove(actor, jobId);
  }

  @Get(':jobId/events')
  @Needs('viewer', 'Tells each change of a job as a server-sent event, until it is finished.')
  async events(
    @Param('jobId') jobId: string,
    @Headers('last-event-id') lastSeen: string | undefined,
    @Res() reply: FastifyReply,
  ) {
    const now = await findJob(this.store, actorOf(reply.request), jobId);
    const { id } = now;
    const seen = /^\d{1,9}$/.test(lastSeen ?? '') ? Number(lastSeen) : 0;
    // A client that has seen the end asks again on its own; 204 tells it to stop.
    if (now.finishedAt !== null && now.step <= seen) return reply.status(204).send();
    const gone = new AbortController();
    reply.raw.on('close', () => gone.abort());
    return reply
      .type('text/event-stream')
      .header('cache-control', 'no-store')
      .header('x-accel-buffering', 'no')
      .send(Readable.from(eventsOf(this.jobs.progress(id, { afterStep: seen, signal: gone.signal }))));
  }
}

async function* eventsOf(changes: AsyncIterable<Job>): AsyncGenerator<string> {
  yield 'retry: 2000\n\n';
  for await (const job of changes) {
    // The name is a state of ours and the id a number of ours; JSON holds no line break.
    yield `event: ${job.state}\nid: ${job.step}\ndata: ${JSON.stringify(showJob(job))}\n\n`;
  }
}
