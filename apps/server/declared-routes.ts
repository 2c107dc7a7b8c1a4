import { type INestApplication, RequestMethod, type Type } from '@nestjs/common';
import { ModulesContainer } from '@nestjs/core';
import { type Declared, declarationOf } from './public.js';

/** A route of a controller. */
export interface Route {
  method: string;
  /** as the router has it: `/api/sites/:siteId` */
  path: string;
  /** undefined where the handler does not say who may use it */
  declared: Declared | undefined;
  handler: string;
}

/** Every route of every controller of the application. */
export function routesOf(app: INestApplication): Route[] {
  const modules = [...app.get(ModulesContainer).values()];
  const controllers = modules.flatMap((module) => [...module.controllers.values()]);
  return controllers.flatMap(({ metatype }) => (metatype === null ? [] : routesOfController(metatype as Type)));
}

function routesOfController(controller: Type): Route[] {
  const base = [Reflect.getMetadata('path', controller) ?? ''].flat() as string[];
  const names = Object.getOwnPropertyNames(controller.prototype).filter((name) => name !== 'constructor');
  return names.flatMap((name) => {
    const handler = controller.prototype[name] as object;
    const own = Reflect.getMetadata('path', handler) as string | string[] | undefined;
    if (own === undefined) return [];
    const method = RequestMethod[Reflect.getMetadata('method', handler) as number] ?? 'GET';
    const declared = declarationOf(handler);
    const paths = base.flatMap((start) => [own].flat().map((end) => joined(start, end)));
    return paths.map((path) => ({ method, path, declared, handler: `${controller.name}.${name}` }));
  });
}

function joined(start: string, end: string): string {
  return `/${[start, end]
    .map((part) => part.replace(/^\/+|\/+$/g, ''))
    .filter((part) => part !== '')
    .join('/')}`;
}

/** A route as the router was given it. */
export type Registered = { method: string; path: string };

/**
 * Holds what the router serves against what declares who may use it.
 * @param routes the controllers' routes
 * @param registered everything the router was given
 * @throws Error naming each route that is not declared
 */
export function refuseUndeclared(routes: Route[], registered: Registered[]): void {
  const silent = routes.filter(({ declared }) => declared === undefined).map(({ handler }) => handler);
  const known = new Set(routes.filter(({ declared }) => declared).map(({ method, path }) => `${method} ${path}`));
  const strange = registered
    .filter(({ path }) => !known.has(`ALL ${path}`))
    .filter(({ method, path }) => !known.has(`${method === 'HEAD' ? 'GET' : method} ${path}`))
    .map(({ method, path }) => `${method} ${path}`);
  const undeclared = [...silent, ...strange];
  if (undeclared.length > 0) {
    throw new Error(`these routes do not say who may use them: ${[...new Set(undeclared)].join(', ')}`);
  }
}
