import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { Job } from './job.js';
import { beat, cancelJob, claimJob, finishJob, insertJob, type JobRequest, releaseJob } from './jobs.js';
import { openStore } from './open-store.js';
import { insertSite } from './sites.js';
import type { Store } from './store.js';

const NOW = new Date('2026-01-31T10:00:00Z');
const NOW_S = NOW.getTime() / 1000;
const LEASE_S = 10;
const DONE = { state: 'done', error: null, revision: 1, finishedAt: NOW } as const;
const request = (inputHash: string): JobRequest => ({
  siteId: 's1',
  kind: 'plan',
  inputHash,
  engineVersion: '1',
  request: { site: 1 },
});

for (const { name, available, create } of databases) {
  describe.runIf(available)(`jobs on ${name}`, () => {
    let database: TestDatabase;
    let store: Store;
    const submit = (hash: string) => store.write((manager) => insertJob(manager, request(hash), NOW));
    const row = (id: number) => store.read((manager) => manager.findOneByOrFail(Job, { id }));
    const claim = (nowS = NOW_S) => claimJob(store, nowS, LEASE_S);

    beforeEach(async () => {
      database = await create();
      store = await openStore(database.url);
      await store.write((manager) =>
        insertSite(manager, { id: 's1', organisationId: 'first', name: 'Site', document: {} }, NOW),
      );
    });

    afterEach(async () => {
      await store.close();
      await database.drop();
    });

    it('are claimed in the order they came, each once, by however many workers', async () => {
      for (let i = 0; i < 20; i++) await submit(`${i}`);
      const claims = await Promise.all(Array.from({ length: 25 }, () => claim()));
      const taken = claims.filter((job) => job !== null).map((job) => Number(job.inputHash));
      expect([...taken].sort((a, b) => a - b)).toEqual(Array.from({ length: 20 }, (_, i) => i));
    });

    it('asked for twice are one while unfinished, and two afterwards', async () => {
      const first = await submit('x');
      expect((await submit('x')).id).toBe(first.id);
      const taken = await claim();
      await store.write((manager) => finishJob(manager, taken!, DONE));
      expect((await submit('x')).id).not.toBe(first.id);
    });

    it('whose worker fell silent go to the next, and the first can write nothing any more', async () => {
      await submit('x');
      const first = await claim(NOW_S);
      expect(await claim(NOW_S + LEASE_S - 1)).toBeNull();
      const second = await claim(NOW_S + LEASE_S + 1);
      expect([first!.attempt, second!.attempt]).toEqual([1, 2]);
      const late = await store.write(async (manager) => [
        await beat(manager, first!, { nowS: NOW_S + 12, progress: 0.9 }),
        await finishJob(manager, first!, DONE),
        await releaseJob(manager, first!),
      ]);
      expect(late).toEqual([false, false, false]);
      expect(await row(first!.id)).toMatchObject({ state: 'running', attempt: 2, progress: 0, revision: null });
      expect(await store.write((manager) => finishJob(manager, second!, DONE))).toBe(true);
      expect(await row(first!.id)).toMatchObject({ state: 'done', progress: 1, revision: 1 });
    });

    it('would be written to by a worker that was given up, if its attempt were not asked', async () => {
      await submit('x');
      const first = await claim(NOW_S);
      const second = await claim(NOW_S + LEASE_S + 1);
      const careless = { ...first!, attempt: second!.attempt };
      expect(await store.write((manager) => finishJob(manager, careless, DONE))).toBe(true);
    });

    it('that beat are left to their worker', async () => {
      await submit('x');
      const taken = await claim(NOW_S);
      await store.write((manager) => beat(manager, taken!, { nowS: NOW_S + 8, progress: 0.5 }));
      expect(await claim(NOW_S + LEASE_S + 1)).toBeNull();
      expect((await row(taken!.id)).progress).toBe(0.5);
    });

    it('that were cancelled are neither claimed nor finished', async () => {
      const waiting = await submit('x');
      expect(await store.write((manager) => cancelJob(manager, waiting.id, NOW))).toBe(true);
      expect(await claim()).toBeNull();
      await submit('y');
      const taken = await claim();
      expect(await store.write((manager) => cancelJob(manager, taken!.id, NOW))).toBe(true);
      expect(await store.write((manager) => finishJob(manager, taken!, DONE))).toBe(false);
      expect(await store.write((manager) => cancelJob(manager, taken!.id, NOW))).toBe(false);
      expect(await row(taken!.id)).toMatchObject({ state: 'cancelled', revision: null });
    });

    it('show every change by a higher step', async () => {
      const { id } = await submit('x');
      const steps = [(await row(id)).step];
      const taken = await claim();
      steps.push((await row(id)).step);
      await store.write((manager) => beat(manager, taken!, { nowS: NOW_S, progress: 0.1 }));
      steps.push((await row(id)).step);
      await store.write((manager) => releaseJob(manager, taken!));
      steps.push((await row(id)).step);
      expect(steps).toEqual([1, 2, 3, 4]);
    });
  });
}
