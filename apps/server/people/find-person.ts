import { noPerson } from '#libs/store/people.js';
import { Person } from '#libs/store/person.js';
import type { Store } from '#libs/store/store.js';
import { isId } from '../sites/find-site.js';
import type { Actor } from './actor.js';

/**
 * A person of the actor's organisation by their id.
 * @throws InputProblem `not-found`, also where they belong to another organisation
 */
export async function findPerson(store: Store, { organisationId }: Actor, id: string): Promise<Person> {
  const own = { id, organisationId };
  const person = isId(id) ? await store.read((manager) => manager.findOneBy(Person, own)) : null;
  if (person === null) throw noPerson(JSON.stringify(id.slice(0, 60)));
  return person;
}

/** A person as the API shows them. */
export function showPerson({ password: _, organisationId: __, ...shown }: Person) {
  return shown;
}
