import type { ProblemJson } from '#libs/contract/error-body.js';

/** A refusal of the API, with what it says. */
export class Refused extends Error {
  override readonly name = 'Refused';

  constructor(readonly problem: ProblemJson) {
    super(problem.detail);
  }
}

/** No answer came: the connection is gone or the server stands still. */
export class NoConnection extends Error {
  override readonly name = 'NoConnection';
}

/** An answer with the version it carries. */
export interface Answer<T> {
  body: T;
  etag: string | null;
  status: number;
}

/** What a request may carry besides its path. */
export interface Asking {
  method?: 'GET' | 'POST' | 'PUT' | 'DELETE';
  json?: unknown;
  body?: BodyInit;
  headers?: Record<string, string>;
  keepalive?: boolean;
}

/**
 * Asks the API.
 * @throws Refused with the problem, NoConnection where nothing answers
 */
export async function ask<T>(path: string, asking: Asking = {}): Promise<Answer<T>> {
  const { json, headers = {}, ...rest } = asking;
  const typed = json === undefined ? headers : { 'content-type': 'application/json', ...headers };
  const body = json === undefined ? rest.body : JSON.stringify(json);
  let response: Response;
  try {
    response = await fetch(path, { ...rest, headers: typed, ...(body === undefined ? {} : { body }) });
  } catch {
    throw new NoConnection('no connection');
  }
  // The session has ended: whoever sits here signs in again; what was typed stands in the draft.
  if (response.status === 401) location.assign('/sign-in');
  const text = await response.text();
  const isJson = /json/.test(response.headers.get('content-type') ?? '');
  if (!response.ok) throw new Refused(isJson ? (JSON.parse(text) as ProblemJson) : plainProblem(response));
  const answer = isJson && text !== '' ? (JSON.parse(text) as T) : (undefined as T);
  return { body: answer, etag: response.headers.get('etag'), status: response.status };
}

function plainProblem({ status, statusText }: Response): ProblemJson {
  const detail = `The server answered ${status}.`;
  return { type: 'about:blank', title: statusText, status, detail, code: 'fault', problems: [] };
}
