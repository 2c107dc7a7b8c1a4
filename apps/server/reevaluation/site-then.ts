import type { PlanInputs } from '#libs/contract/plan-content.js';
import { type BankInput, InputProblem, type Result, type Site, type SiteThen } from '#libs/engine/index.js';
import { readRecord } from '#libs/store/records.js';
import type { Revision } from '#libs/store/revision.js';
import type { Store } from '#libs/store/store.js';

/**
 * The site, record and clock a revision was made from; the bank of a plan is the one it proposed.
 * @param store the store
 * @param revision whose frozen inputs count
 * @throws InputProblem where it was made without a record, or the record is gone
 */
export async function siteThen(store: Store, revision: Revision): Promise<SiteThen> {
  const { kind, site, zone } = JSON.parse(revision.inputs) as PlanInputs;
  const { recordId } = revision;
  if (recordId === null) {
    const expected = 'a revision made from a record: an estimate is not judged again';
    throw new InputProblem([{ code: 'inconsistent', path: 'revision', expected, found: 'an estimate' }]);
  }
  const record = await store.read((manager) => readRecord(manager, recordId));
  if (record === null) {
    throw new InputProblem([{ code: 'not-found', expected: 'the record the revision was made from', found: recordId }]);
  }
  const proposed = kind === 'plan' ? asProposed(site, JSON.parse(revision.result) as Result) : site;
  return { site: proposed, zone, record };
}

function asProposed(site: Site, { bank, control }: Result): Site {
  const stages = new Map<string, BankInput['stages'][number]>();
  for (const { ratedKvar, ratedV, reactorPct } of bank.stages) {
    const key = `${ratedKvar} ${ratedV} ${reactorPct}`;
    const count = (stages.get(key)?.count ?? 0) + 1;
    stages.set(key, { count, ratedKvar, ratedV, ...(reactorPct === 0 ? {} : { reactorPct }) });
  }
  const { bank: _, ...rest } = site;
  const given = stages.size === 0 ? {} : { bank: { stages: [...stages.values()] } };
  return { ...rest, ...given, control: { ...site.control, ...control } };
}
