import { createParamDecorator, type ExecutionContext } from '@nestjs/common';
import type { FastifyRequest } from 'fastify';
import { FIRST_ORGANISATION } from '#libs/store/organisation.js';

/** What a person may do; each role may do what those before it may. */
export const ROLES = ['viewer', 'planner', 'reviewer', 'administrator'] as const;
export type Role = (typeof ROLES)[number];

/** Who makes a request. */
export interface Actor {
  personId: string;
  /** as it is written under what they do */
  name: string;
  role: Role;
  organisationId: string;
}

/** Whoever sits at this machine, as long as there are no accounts: one person with every role. */
export const LOCAL_ACTOR: Actor = {
  personId: 'local',
  name: 'local user',
  role: 'administrator',
  organisationId: FIRST_ORGANISATION,
};

/** Whether a role covers what another may do. */
export function covers(role: Role, needed: Role): boolean {
  return ROLES.indexOf(role) >= ROLES.indexOf(needed);
}

const actors = new WeakMap<FastifyRequest, Actor>();

/** Keeps with a request who makes it. */
export function nameActor(request: FastifyRequest, actor: Actor): void {
  actors.set(request, actor);
}

/** Who makes a request, undefined where it is nobody known. */
export function knownActor(request: FastifyRequest): Actor | undefined {
  return actors.get(request);
}

/**
 * Who makes a request that needs somebody.
 * @throws Error on a route that is open to nobody known: our fault
 */
export function actorOf(request: FastifyRequest): Actor {
  const actor = actors.get(request);
  if (actor === undefined) throw new Error('a request without an actor reached a handler that needs one');
  return actor;
}

/** The parameter of a handler that is given who makes the request. */
export const CurrentActor = createParamDecorator((_: unknown, context: ExecutionContext) =>
  actorOf(context.switchToHttp().getRequest<FastifyRequest>()),
);
