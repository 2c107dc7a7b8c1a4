import { Injectable } from '@nestjs/common';
import { InputProblem } from '#libs/engine/index.js';
import { ApiKey } from '#libs/store/api-key.js';
import { keysOf, revokeKey } from '#libs/store/people.js';
import { Store } from '#libs/store/store.js';
import { isId } from '../sites/find-site.js';
import type { Actor } from './actor.js';

/** Whose keys somebody may see and revoke: their own, an administrator everybody's of the organisation. */
@Injectable()
export class Keys {
  constructor(private readonly store: Store) {}

  /** The keys, the newest first; revoked ones too. */
  all(actor: Actor): Promise<ApiKey[]> {
    return this.store.read((manager) => keysOf(manager, ownersOf(actor)));
  }

  /** @throws InputProblem `not-found`, also where it is not theirs to revoke */
  async revoke(actor: Actor, id: string): Promise<void> {
    const found = isId(id) ? (await this.all(actor)).some((key) => key.id === id) : false;
    if (!found) {
      const shown = JSON.stringify(id.slice(0, 60));
      throw new InputProblem([{ code: 'not-found', expected: 'an API key that exists', found: shown }]);
    }
    await this.store.write((manager) => revokeKey(manager, id, new Date()));
  }
}

function ownersOf({ personId, organisationId, role }: Actor) {
  return role === 'administrator' ? { organisationId } : { organisationId, id: personId };
}
