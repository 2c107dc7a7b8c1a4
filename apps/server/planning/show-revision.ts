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

/**
 * A revision in full: its frozen inputs and its result, letter for letter as they were stored.
 * @param revision which
 * @param head what stands before them
 */
export function revisionJson(revision: Revision, head: object = revisionHead(revision)): string {
  const rival = JSON.stringify(revision.rival);
  return `${JSON.stringify(head).slice(0, -1)},"rival":${rival},"inputs":${revision.inputs},"result":${revision.result}}`;
}
