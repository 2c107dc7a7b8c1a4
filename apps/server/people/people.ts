import { randomUUID } from 'node:crypto';
import { Injectable } from '@nestjs/common';
import type { NewPersonGiven, PersonChangeGiven } from '#libs/contract/people-schema.js';
import { InputProblem } from '#libs/engine/index.js';
import { changePerson, insertPerson } from '#libs/store/people.js';
import { Person } from '#libs/store/person.js';
import { Store } from '#libs/store/store.js';
import { Accounts, spelledName } from './accounts.js';
import type { Actor } from './actor.js';
import { findPerson } from './find-person.js';

/** An account and the version of it that was seen. */
export type Seen = Pick<Person, 'id' | 'version'>;

/** Opens, changes and closes the accounts of an organisation. */
@Injectable()
export class People {
  constructor(
    private readonly store: Store,
    private readonly accounts: Accounts,
  ) {}

  /** Everybody of the actor's organisation, by name; closed accounts too. */
  all({ organisationId }: Actor): Promise<Person[]> {
    return this.store.read((manager) =>
      manager.find(Person, { where: { organisationId }, order: { name: 'ASC', id: 'ASC' } }),
    );
  }

  /**
   * Opens an account in the actor's organisation.
   * @throws InputProblem `conflict` where the sign-in name is taken, or nobody would be an administrator
   */
  async open({ organisationId }: Actor, { signInName, name, role, password }: NewPersonGiven): Promise<Person> {
    const person = {
      ...{ id: randomUUID(), organisationId, name, role },
      signInName: spelledName(signInName),
      password: await this.accounts.hash(password),
    };
    return this.store.write((manager) => insertPerson(manager, person, new Date()));
  }

  /**
   * Changes what is given of an account.
   * @throws InputProblem `not-found`, `stale`, or `conflict` where the last administrator would go
   */
  async change(actor: Actor, { id, version }: Seen, { name, role, password }: PersonChangeGiven): Promise<Person> {
    const { organisationId, closedAt } = await findPerson(this.store, actor, id);
    if (closedAt !== null) throw closed();
    const change = {
      ...(name === undefined ? {} : { name }),
      ...(role === undefined ? {} : { role }),
      ...(password === undefined ? {} : { password: await this.accounts.hash(password) }),
    };
    const seen = { id, organisationId, version };
    return this.store.write((manager) => changePerson(manager, seen, change, new Date()));
  }

  /**
   * Closes an account for good.
   * @throws InputProblem `not-found`, `stale`, or `conflict` where it is the last administrator's
   */
  async close(actor: Actor, { id, version }: Seen): Promise<void> {
    const { organisationId, closedAt } = await findPerson(this.store, actor, id);
    if (closedAt !== null) throw closed();
    const now = new Date();
    await this.store.write((manager) => changePerson(manager, { id, organisationId, version }, { closedAt: now }, now));
  }
}

function closed(): InputProblem {
  return new InputProblem([{ code: 'conflict', expected: 'an account that is open', found: 'a closed one' }]);
}
