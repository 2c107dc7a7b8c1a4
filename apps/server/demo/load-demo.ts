import { randomUUID } from 'node:crypto';
import { Readable } from 'node:stream';
import { Job } from '#libs/store/job.js';
import { Milestone } from '#libs/store/milestone.js';
import { FIRST_ORGANISATION } from '#libs/store/organisation.js';
import { insertSite } from '#libs/store/sites.js';
import type { Store } from '#libs/store/store.js';
import { StoredSite } from '#libs/store/stored-site.js';
import type { Planning } from '../planning/planning.js';
import type { RecordImport } from '../records/record-import.js';
import type { Spool } from '../records/spool.js';
import { demoLoad } from './demo-load.js';
import { DEMO_SITE } from './demo-site.js';

const MILESTONE = 'example offered';

/** What loading the example needs. */
export interface DemoParts {
  store: Store;
  spool: Spool;
  importer: RecordImport;
  planning: Planning;
}

/**
 * Gives an empty database the example site, its load record and a plan; once in the life of a database, so that an
 * example that was removed stays removed.
 */
export async function loadDemo(parts: DemoParts): Promise<void> {
  const { store } = parts;
  if (!(await store.read((manager) => manager.existsBy(Milestone, { name: MILESTONE })))) await addDemo(parts);
  const site = await store.read((manager) =>
    manager.findOneBy(StoredSite, {
      organisationId: FIRST_ORGANISATION,
      name: DEMO_SITE.name,
      lastRevision: 0,
      version: 1,
    }),
  );
  if (site === null || (await store.read((manager) => manager.existsBy(Job, { siteId: site.id })))) return;
  await parts.planning.ask('plan', site, { author: 'Varwright', reason: 'example' });
}

async function addDemo({ store, spool, importer }: DemoParts): Promise<void> {
  const isEmpty = (await store.read((manager) => manager.count(StoredSite))) === 0;
  const read = isEmpty ? await readDemo(spool, importer) : null;
  await store.write(async (manager) => {
    const now = new Date();
    await manager.insert(Milestone, { name: MILESTONE, reachedAt: now });
    if (read === null || (await manager.count(StoredSite)) > 0) return;
    const id = randomUUID();
    await insertSite(
      manager,
      { id, organisationId: FIRST_ORGANISATION, name: DEMO_SITE.name, document: DEMO_SITE },
      now,
    );
    await importer.insert(manager, { ...read, order: { ...read.order, siteId: id } });
  });
}

/** The example takes the way every meter file takes. */
async function readDemo(spool: Spool, importer: RecordImport) {
  const file = await spool.take(Readable.from(demoLoad(), { objectMode: false }), 'load.csv');
  try {
    return await importer.read(
      await importer.order({ id: '', organisationId: FIRST_ORGANISATION, document: DEMO_SITE }, file, {}),
    );
  } finally {
    await spool.discard(file);
  }
}
