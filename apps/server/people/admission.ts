import type { FastifyReply, FastifyRequest } from 'fastify';
import type { Route } from '../declared-routes.js';
import type { Declared } from '../public.js';
import { RefusedRequest } from '../refused-request.js';
import { type Actor, covers, nameActor, type Role } from './actor.js';

/** Finds out who makes a request; null where nobody known does. */
export type Recognise = (request: FastifyRequest) => Promise<Actor | null>;

/** Lets a request through to its route, or not: before its body is read, and by what the route declares. */
export class Admission {
  readonly #recognise: Recognise;
  #declared = new Map<string, Declared>();

  constructor(recognise: Recognise) {
    this.#recognise = recognise;
  }

  /** @param routes every route there is, once they are known */
  learn(routes: readonly Route[]): void {
    this.#declared = new Map(
      routes.flatMap(({ method, path, declared }) =>
        declared === undefined ? [] : [[`${method} ${path}`, declared] satisfies [string, Declared]],
      ),
    );
  }

  /**
   * @param request whose route is known, and whose body is not read yet
   * @param reply leads a visitor of a page to the page to sign in on
   * @throws RefusedRequest 401 where the route needs somebody, 403 where it needs another role
   */
  async admit(request: FastifyRequest, reply: FastifyReply): Promise<void> {
    const { url } = request.routeOptions;
    // Nothing is served there, and the answer says so.
    if (url === undefined) return;
    const method = request.method === 'HEAD' ? 'GET' : request.method;
    const declared = this.#declared.get(`${method} ${url}`) ?? this.#declared.get(`ALL ${url}`);
    if (declared === undefined) throw new Error(`${method} ${url} was served without saying who may use it`);
    const actor = await this.#recognise(request);
    if (actor !== null) nameActor(request, actor);
    if (declared.role === null) return;
    if (actor === null && isVisit(request)) return void (await reply.redirect('/sign-in', 303));
    if (actor === null) throw unknownPerson();
    if (!covers(actor.role, declared.role)) throw otherRole(declared.role, actor.role);
  }
}

/** Whether a person looks at a page, rather than a program at the API. */
function isVisit({ method, url, headers }: FastifyRequest): boolean {
  return method === 'GET' && !url.startsWith('/api/') && /\btext\/html\b/.test(headers.accept ?? '');
}

function unknownPerson(): RefusedRequest {
  const problem = { code: 'usage', expected: 'a session or an API key that holds', found: 'none' } as const;
  return new RefusedRequest(401, 'Sign in first', problem);
}

function otherRole(needed: Role, found: Role): RefusedRequest {
  return new RefusedRequest(403, 'Not in your role', { code: 'usage', expected: `the role ${needed}`, found });
}
