import { randomUUID } from 'node:crypto';
import { covers, ROLES, type Role } from '#apps/server/people/actor.js';
import type { Route } from '#apps/server/declared-routes.js';
import type { TestServer } from './test-server.js';

/** What the parameters of a path stand for. */
export type Ids = Record<string, string>;

/** Two organisations with one object of every kind each, and the first with a second site. */
export interface World {
  /** ids of the first organisation's objects, for a person of a role */
  ours: (role: Role) => Ids;
  otherSiteId: string;
  theirs: Ids;
  headers: Record<Role, Record<string, string>>;
  /** texts that stand in the second organisation's objects alone */
  secrets: string[];
}

/** One request: who asks, by which route, for what, and how it is to end. */
export interface Cell {
  route: Route;
  role: Role | null;
  target: string;
  path: string;
  /** the same request for something that never was, which the answer must equal */
  asNothing: string | null;
  expected: 'no session' | 'not in the role' | 'passed' | 'not found';
}

/** Bodies that get as far as the object a route is about; what has none is sent an empty one. */
export type Bodies = Record<string, { body?: unknown; type?: string; query?: string }>;

const NUMBERS = ['revision', 'other'];
/** Refused as stale by what heeds it, so that no cell changes what the next one asks for. */
const UNSEEN = { 'if-match': '"999"' };

/**
 * Every cell of role × route × target, from what the router serves.
 * @param routes of the server
 * @param world what there is
 */
export function accessCells(routes: readonly Route[], world: World): Cell[] {
  return routes.flatMap((route) => {
    const needed = route.declared?.role ?? null;
    if (needed === null) return [];
    return [null, ...ROLES].flatMap((role): Cell[] => {
      const refused = role === null ? 'no session' : covers(role, needed) ? null : 'not in the role';
      return targetsOf(route, world, role ?? 'viewer').map(({ mayPass, ...target }) => ({
        ...{ route, role, ...target },
        expected: refused ?? (mayPass ? 'passed' : 'not found'),
      }));
    });
  });
}

type Target = Pick<Cell, 'target' | 'path' | 'asNothing'> & { mayPass: boolean };

function targetsOf({ path }: Route, { ours, otherSiteId, theirs }: World, role: Role): Target[] {
  const names = [...path.matchAll(/:(\w+)/g)].flatMap(([, name]) => (name === 'file' ? [] : [name!]));
  const own = ours(role);
  const target = (name: string, ids: Ids, nothing: Ids | null): Target => ({
    target: name,
    path: filled(path, { file: fileOf(path), ...ids }),
    asNothing: nothing === null ? null : filled(path, { file: fileOf(path), ...nothing }),
    mayPass: nothing === null,
  });
  if (names.length === 0) return [target('none', {}, null)];
  const random = Object.fromEntries(names.map((name) => [name, nothing(name)]));
  const targets = [target('own', own, null), target('other organisation', theirs, random)];
  targets.push({ ...target('random id', random, { ...random }), asNothing: null, mayPass: false });
  if (names[0] !== 'siteId') return targets;
  const beside = { ...own, siteId: otherSiteId };
  if (names.length === 1) return [...targets, target('other site', beside, null)];
  const last = names.at(-1)!;
  const nowhere = { ...own, [last]: nothing(last) };
  targets.push(target('other site', beside, { ...nowhere, siteId: otherSiteId, [names[1]!]: nothing(names[1]!) }));
  if (!NUMBERS.includes(last)) {
    targets.push(target('own site, other organisation’s part', { ...own, [last]: theirs[last]! }, nowhere));
  }
  return targets;
}

/** A file that every object of the kind can be had as. */
function fileOf(path: string): string {
  if (path.includes('/records/')) return 'record.json';
  return path.includes('/revisions/') ? 'plan.json' : 'site.json';
}

const nothing = (name: string) => (NUMBERS.includes(name) ? '987654' : randomUUID());

function filled(path: string, ids: Ids): string {
  return path.replace(/:(\w+)/g, (_, name: string) => {
    const id = ids[name];
    if (id === undefined) throw new Error(`nothing is known that ${name} in ${path} could stand for`);
    return id;
  });
}

export interface Seen {
  status: number;
  type: string | null;
  text: string;
}

/** What an answer shows: status, kind and body, with what was asked for taken out. */
async function seen(server: TestServer, { route, role }: Cell, path: string, asking: Asking): Promise<Seen> {
  const { world, bodies } = asking;
  const { body, type = 'application/json', query = '' } = bodies[`${route.method} ${route.path}`] ?? {};
  const hasBody = route.method === 'POST' || route.method === 'PUT';
  const response = await fetch(`${server.base}${path}${query}`, {
    method: route.method,
    redirect: 'manual',
    headers: {
      ...UNSEEN,
      ...(role === null ? {} : world.headers[role]),
      ...(hasBody ? { 'content-type': type } : {}),
    },
    ...(hasBody ? { body: typeof body === 'string' ? body : JSON.stringify(body ?? {}) } : {}),
  });
  let text = await response.text();
  for (const id of path.split('/').filter((part) => part.length > 20)) text = text.replaceAll(id, 'ID');
  for (const count of path.match(/(?<=\/)\d+(?=\/|$)/g) ?? [])
    text = text.replace(new RegExp(`\\b${count}\\b`, 'g'), 'ID');
  return { status: response.status, type: response.headers.get('content-type'), text };
}

/** What never was answers alike to whoever asks again. */
function nothingLike(server: TestServer, cell: Cell, path: string, asking: Asking): Promise<Seen> {
  const key = `${cell.route.method} ${path} ${cell.role}`;
  const known = asking.answers.get(key) ?? seen(server, cell, path, asking);
  asking.answers.set(key, known);
  return known;
}

export interface Asking {
  world: World;
  bodies: Bodies;
  /** routes whose own object is not there yet */
  absent: readonly string[];
  /** answers about what never was, by route, path and role */
  answers: Map<string, Promise<Seen>>;
}

/**
 * Asks for one cell.
 * @returns what is wrong with the answer, nothing where it is as it must be
 */
export async function faultsOf(server: TestServer, cell: Cell, asking: Asking): Promise<string[]> {
  const { route, role, target, path, asNothing, expected } = cell;
  const name = `${route.method} ${route.path} as ${role ?? 'nobody'} for ${target}`;
  const answer = await seen(server, cell, path, asking);
  const faults = asking.world.secrets
    .filter((secret) => !path.includes(secret) && answer.text.includes(secret))
    .map((secret) => `${name}: tells ${secret}`);
  if (!isExpected(answer.status, expected, asking.absent.includes(route.path))) {
    faults.push(`${name}: ${answer.status} where ${expected} was expected: ${answer.text.slice(0, 200)}`);
  }
  if (asNothing !== null) {
    const other = await nothingLike(server, cell, asNothing, asking);
    if (JSON.stringify(other) !== JSON.stringify(answer)) {
      faults.push(`${name}: differs from nothing: ${answer.text.slice(0, 200)} | ${other.text.slice(0, 200)}`);
    }
  }
  return faults;
}

function isExpected(status: number, expected: Cell['expected'], isAbsent: boolean): boolean {
  if (expected === 'no session') return status === 401;
  if (expected === 'not in the role') return status === 403;
  if (expected === 'not found' || isAbsent) return status === 404;
  return status < 500 && ![401, 403, 404].includes(status);
}
