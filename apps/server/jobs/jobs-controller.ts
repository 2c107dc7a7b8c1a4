import { Readable } from 'node:stream';
import { Controller, Delete, Get, Headers, HttpCode, Inject, Param, Post, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import type { Jobs } from '#libs/jobs/jobs.js';
import type { Job } from '#libs/store/job.js';
import { pathNumber } from '../path-number.js';
import { Public } from '../public.js';
import { discardImport, IMPORT } from '../records/import-jobs.js';
import { Spool } from '../records/spool.js';
import { JOBS } from '../tokens.js';
import { showJob } from './show-job.js';

/** Long work: how far it is, and how to stop it. */
@Controller('api/jobs')
export class JobsController {
  constructor(
    @Inject(JOBS) private readonly jobs: Jobs,
    private readonly spool: Spool,
  ) {}

  @Get(':jobId')
  @Public('Says how far a job is.')
  async get(@Param('jobId') jobId: string) {
    return showJob(await this.jobs.result(pathNumber(jobId, 'job'), 0));
  }

  @Delete(':jobId')
  @Public('Cancels a job that is not finished.')
  async remove(@Param('jobId') jobId: string) {
    const job = await this.jobs.cancel(pathNumber(jobId, 'job'));
    if (job.kind === IMPORT) await discardImport(this.spool, job);
    return showJob(job);
  }

  @Post(':jobId/cancel')
  @HttpCode(200)
  @Public('Cancels a job that is not finished.')
  async cancel(@Param('jobId') jobId: string) {
    return this.remove(jobId);
  }

  @Get(':jobId/events')
  @Public('Tells each change of a job as a server-sent event, until it is finished.')
  async events(
    @Param('jobId') jobId: string,
    @Headers('last-event-id') lastSeen: string | undefined,
    @Res() reply: FastifyReply,
  ) {
    const id = pathNumber(jobId, 'job');
    const now = await this.jobs.result(id, 0);
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
