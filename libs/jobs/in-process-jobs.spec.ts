import { setTimeout as sleep } from 'node:timers/promises';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { Job } from '#libs/store/job.js';
import { claimJob, finishJob, type JobRequest } from '#libs/store/jobs.js';
import { openStore } from '#libs/store/open-store.js';
import { insertSite } from '#libs/store/sites.js';
import type { Store } from '#libs/store/store.js';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { InProcessJobs, type InProcessOptions, type Runner } from './in-process-jobs.js';

const NOW = new Date('2026-01-31T10:00:00Z');
const LEASE_S = 0.4;
const request = (inputHash: string, kind: string): JobRequest => ({
  siteId: 's1',
  kind,
  inputHash,
  engineVersion: '1',
  request: { site: 1 },
});

for (const { name, available, create } of databases) {
  describe.runIf(available)(`jobs in this process, on ${name}`, () => {
    let database: TestDatabase;
    let store: Store;
    let jobs: InProcessJobs;
    let faults: unknown[];
    const started: Job[] = [];

    const finish = (job: Job) =>
      store.write((manager) =>
        finishJob(manager, job, { state: 'done', error: null, revision: 7, finishedAt: new Date() }),
      );
    const runners: Record<string, Runner> = {
      quick: async (job, { report }) => {
        report(0.5);
        await sleep(30);
        await finish(job);
      },
      endless: async (job, { signal }) => {
        started.push(job);
        await sleep(60_000, undefined, { signal });
      },
      refused: async () => {
        throw new InputProblem([{ code: 'too-many-levels', expected: 'fewer', found: 'more' }]);
      },
      broken: async () => {
        throw new Error('a fault of ours');
      },
    };
    const open = (given = runners, options: Partial<InProcessOptions> = {}) =>
      new InProcessJobs({
        store,
        runners: given,
        leaseS: LEASE_S,
        describe: (error) => ({ message: (error as Error).message }),
        onFault: (error) => faults.push(error),
        ...options,
      });

    beforeEach(async () => {
      faults = [];
      started.length = 0;
      database = await create();
      store = await openStore(database.url);
      await store.write((manager) =>
        insertSite(manager, { id: 's1', organisationId: 'first', name: 'Site', document: {} }, NOW),
      );
      jobs = open();
    });

    afterEach(async () => {
      await jobs.close();
      await store.close();
      await database.drop();
    });

    it('are done in their order and show every change until the last', async () => {
      const { id } = await jobs.submit(request('x', 'quick'));
      const second = await jobs.submit(request('y', 'quick'));
      const seen: Job[] = [];
      for await (const job of jobs.progress(id)) seen.push(job);
      expect(seen.at(-1)).toMatchObject({ state: 'done', progress: 1, revision: 7 });
      expect(await jobs.result(second.id, 10)).toMatchObject({ state: 'done' });
      expect(faults).toEqual([]);
    });

    it('that are cancelled stop at once and leave the next its turn', async () => {
      const { id } = await jobs.submit(request('x', 'endless'));
      await vi.waitFor(() => expect(started).toHaveLength(1));
      expect(await jobs.cancel(id)).toMatchObject({ state: 'cancelled' });
      expect(await jobs.cancel(id)).toMatchObject({ state: 'cancelled' });
      const next = await jobs.submit(request('y', 'quick'));
      expect(await jobs.result(next.id, 10)).toMatchObject({ state: 'done' });
      await expect(jobs.cancel(next.id)).rejects.toMatchObject({ code: 'conflict' });
    });

    it('fail with the problem of the input, which is no fault', async () => {
      const { id } = await jobs.submit(request('x', 'refused'));
      const failed = await jobs.result(id, 10);
      expect(failed).toMatchObject({ state: 'failed', error: { message: 'expected fewer, found more' } });
      expect(faults).toEqual([]);
    });

    it('fail with a fault, which is told', async () => {
      const broken = await jobs.submit(request('x', 'broken'));
      const unknown = await jobs.submit(request('y', 'nobody does this'));
      expect(await jobs.result(broken.id, 10)).toMatchObject({ state: 'failed' });
      expect(await jobs.result(unknown.id, 10)).toMatchObject({ state: 'failed' });
      expect(faults).toHaveLength(2);
    });

    it('are put back when the process closes, and done by the next', async () => {
      const { id } = await jobs.submit(request('x', 'endless'));
      await vi.waitFor(() => expect(started).toHaveLength(1));
      await jobs.close();
      expect(await store.read((manager) => manager.findOneBy(Job, { id }))).toMatchObject({ state: 'queued' });
      jobs = open({ ...runners, endless: runners.quick! });
      expect(await jobs.result(id, 10)).toMatchObject({ state: 'done', attempt: 2 });
    });

    it('are put back once, though another is being looked for while the process closes', async () => {
      await jobs.close();
      let hold = Promise.resolve();
      const held = { skipsLocked: store.skipsLocked, read: store.read.bind(store) } as Store;
      held.write = (work) => hold.then(() => store.write(work));
      jobs = open(runners, { store: held, atOnce: 2, leaseS: 60 });
      const { id } = await jobs.submit(request('x', 'endless'));
      await vi.waitFor(() => expect(started).toHaveLength(1));
      hold = sleep(2 * 1000);
      // every look from now on is late by longer than the wait between two looks
      await sleep(1200);
      hold = Promise.resolve();
      await jobs.close();
      expect(await store.read((manager) => manager.findOneBy(Job, { id }))).toMatchObject({
        state: 'queued',
        attempt: 1,
      });
    });

    it('are kept from others while their worker lives, however long they take', async () => {
      await jobs.submit(request('x', 'endless'));
      await vi.waitFor(() => expect(started).toHaveLength(1));
      await sleep(LEASE_S * 2500);
      expect(await claimJob(store, Date.now() / 1000, LEASE_S)).toBeNull();
    });

    it('whose worker vanished are taken over, until the third time', async () => {
      await jobs.close();
      const { id } = await jobs.submit(request('x', 'endless'));
      for (let i = 0; i < 3; i++) await claimJob(store, 1, -LEASE_S);
      jobs = open();
      const end = await jobs.result(id, 10);
      expect(end).toMatchObject({ state: 'failed', attempt: 4, error: { message: /given up after 3/ } });
    });

    it('of no known id are not found', async () => {
      await expect(jobs.result(99, 1)).rejects.toMatchObject({ code: 'not-found' });
      await expect(jobs.cancel(99)).rejects.toMatchObject({ code: 'not-found' });
    });
  });
}
