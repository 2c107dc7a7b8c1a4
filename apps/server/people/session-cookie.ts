const NAME = 'varwright-session';
/** A browser takes this name only over https, from this host, for every path. */
const SECURE_NAME = `__Host-${NAME}`;

/**
 * The session's token out of a Cookie header.
 * @param header Cookie
 * @param isSecure whether the server is reached over https
 * @returns null where there is none
 */
export function readSessionCookie(header: string | undefined, isSecure: boolean): string | null {
  const name = isSecure ? SECURE_NAME : NAME;
  const pairs = (header ?? '').split(';').map((pair) => pair.trim().split('='));
  return pairs.find(([key]) => key === name)?.[1] ?? null;
}

/**
 * A Set-Cookie header that begins a session.
 * @param token the session's token
 * @param lifeS until it expires [s]
 * @param isSecure whether the server is reached over https
 */
export function sessionCookie(token: string, lifeS: number, isSecure: boolean): string {
  const secure = isSecure ? '; Secure' : '';
  return `${isSecure ? SECURE_NAME : NAME}=${token}; Path=/; HttpOnly; SameSite=Strict; Max-Age=${lifeS}${secure}`;
}

/** A Set-Cookie header that ends one. */
export const endedCookie = (isSecure: boolean) => sessionCookie('', 0, isSecure);
