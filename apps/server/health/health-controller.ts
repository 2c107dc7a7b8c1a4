import { Controller, Get } from '@nestjs/common';
import { Milestone } from '#libs/store/milestone.js';
import { Store } from '#libs/store/store.js';
import { Public } from '../public.js';
import { RefusedRequest } from '../refused-request.js';

/** Asked by whatever watches over the process. */
@Controller()
export class HealthController {
  constructor(private readonly store: Store) {}

  @Get('healthz')
  @Public('Says that the process answers.')
  healthy() {
    return { status: 'ok' };
  }

  @Get('readyz')
  @Public('Says that the database answers.')
  async ready() {
    try {
      await this.store.read((manager) => manager.count(Milestone));
    } catch {
      throw new RefusedRequest(503, 'Not ready', {
        code: 'stopped',
        expected: 'a database',
        found: 'none that answers',
      });
    }
    return { status: 'ready' };
  }
}
