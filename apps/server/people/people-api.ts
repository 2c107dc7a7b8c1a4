import {
  file,
  header,
  json,
  listOf,
  moment,
  nullable,
  objectOf,
  type Part,
  schemaOf,
  text,
  whole,
} from '../open-api-answers.js';
import { ROLES } from './actor.js';

const role = { type: 'string', enum: [...ROLES] };
const keyHead = {
  ...{ id: text, personId: text, name: text, role },
  ...{ createdAt: moment, expiresAt: nullable(moment), revokedAt: nullable(moment) },
};
const linkHead = { id: text, madeBy: text, createdAt: moment, expiresAt: moment, revokedAt: nullable(moment) };

/** The shapes of answers, by name. */
export const PEOPLE_SCHEMAS: Record<string, object> = {
  Actor: objectOf({ personId: text, organisationId: text, name: text, role }),
  Person: objectOf({
    ...{ id: text, signInName: text, name: text, role, version: whole },
    ...{ createdAt: moment, updatedAt: moment, closedAt: nullable(moment) },
  }),
  ApiKey: objectOf(keyHead),
  Link: objectOf(linkHead),
};

const people = '/api/people';
const person = `${people}/{personId}`;
const links = '/api/sites/{siteId}/revisions/{revision}/links';
const SEEN = header('If-Match', 'the ETag the account was read with', true);

/** Sessions, accounts, API keys and links, by method and path. */
export const PEOPLE_PARTS: Record<string, Part> = {
  'post /api/session': { responses: { 200: json('Who signed in.', schemaOf('Actor')) } },
  'get /api/session': { responses: { 200: json('Who makes the request.', schemaOf('Actor')) } },
  [`get ${people}`]: {
    responses: { 200: json('Everybody of the organisation.', objectOf({ people: listOf(schemaOf('Person')) })) },
  },
  [`post ${people}`]: { responses: { 201: json('The account.', schemaOf('Person')) } },
  [`get ${person}`]: { responses: { 200: json('The account.', schemaOf('Person')) } },
  [`put ${person}`]: { parameters: [SEEN], responses: { 200: json('The account as it is now.', schemaOf('Person')) } },
  [`delete ${person}`]: { parameters: [SEEN] },
  'get /api/keys': { responses: { 200: json('The keys.', objectOf({ keys: listOf(schemaOf('ApiKey')) })) } },
  'post /api/keys': { responses: { 201: json('The key, shown this once.', objectOf({ ...keyHead, key: text })) } },
  [`get ${links}`]: { responses: { 200: json('The links.', objectOf({ links: listOf(schemaOf('Link')) })) } },
  [`post ${links}`]: { responses: { 201: json('The link, shown this once.', objectOf({ ...linkHead, path: text })) } },
  'get /api/links/{token}': { responses: { 200: json('The revision.', schemaOf('Revision')) } },
  'get /api/links/{token}/proposal.pdf': { responses: { 200: file('Its proposal.', 'application/pdf') } },
};
