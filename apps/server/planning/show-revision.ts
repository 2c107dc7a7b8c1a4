import type { Revision } from '#libs/store/revision.js';

/** A revision in a list. */
export function revisionHead(revision: Revision) {
  const { siteId, number, revision: count, kind, verdict, createdAt, author, reason } = revision;
  const { proposed, recordId, recordHash, engineVersion, contentHash } = revision;
  const self = `/api/sites/${siteId}/revisions/${count}`;
  return {
    ...{ siteId, number, revision: count, kind, verdict, createdAt, author, reason, proposed },
    ...{ recordId, recordHash, engineVersion, contentHash },
    links: { self, proposal: `${self}/proposal.pdf`, record: recordId && `/api/sites/${siteId}/records/${recordId}` },
  };
}

/** A revision in full: its frozen inputs and its result, letter for letter as they were stored. */
export function revisionJson(revision: Revision): string {
  const head = JSON.stringify(revisionHead(revision));
  const rival = JSON.stringify(revision.rival);
  return `${head.slice(0, -1)},"rival":${rival},"inputs":${revision.inputs},"result":${revision.result}}`;
}
