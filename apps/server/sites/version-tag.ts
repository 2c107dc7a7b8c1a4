import { RefusedRequest } from '../refused-request.js';

/** The ETag of a version. */
export const tagOf = (version: number) => `"${version}"`;

/**
 * The version a client says it saw.
 * @param header If-Match
 * @param isNeeded whether the request is refused without it
 * @returns null where nothing is said and nothing need be
 * @throws RefusedRequest 428 where it is missing, 400 where it is no version of ours
 */
export function versionSeen(header: string | undefined, isNeeded: boolean): number | null {
  const expected = 'If-Match with the ETag the site was read with, such as "3"';
  if (header === undefined) {
    if (!isNeeded) return null;
    throw new RefusedRequest(428, 'Say which version you saw', { code: 'missing', expected, found: 'nothing' });
  }
  const version = /^"(\d{1,9})"$/.exec(header.trim())?.[1];
  if (version !== undefined) return Number(version);
  throw new RefusedRequest(400, 'The request cannot be read', {
    code: 'usage',
    expected,
    found: JSON.stringify(header.slice(0, 60)),
  });
}
