import { Body, Controller, Delete, Get, HttpCode, Param, Post, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { type NewKey, newKeySchema } from '#libs/contract/people-schema.js';
import type { ApiKey } from '#libs/store/api-key.js';
import { ContractPipe } from '../contract-pipe.js';
import { Accounts } from './accounts.js';
import { type Actor, CurrentActor } from './actor.js';
import { Keys } from './keys.js';
import { Needs } from './needs.js';

/** API keys: one's own, and for administrators everybody's of the organisation. */
@Controller('api/keys')
export class KeysController {
  constructor(
    private readonly keys: Keys,
    private readonly accounts: Accounts,
  ) {}

  @Get()
  @Needs('viewer', 'Lists one’s own API keys, an administrator’s list everybody’s; the keys themselves are not kept.')
  async list(@CurrentActor() actor: Actor) {
    return { keys: (await this.keys.all(actor)).map(showKey) };
  }

  @Post()
  @Needs('viewer', 'Makes an API key, which is shown this once; it may do at most what its maker may.')
  async make(
    @CurrentActor() actor: Actor,
    @Body({ schema: newKeySchema, pipes: [new ContractPipe()] }) { name, role, days }: NewKey,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const asked = { name, ...(role === undefined ? {} : { role }), ...(days === undefined ? {} : { days }) };
    const { key, row } = await this.accounts.makeKey(actor, asked);
    reply.header('cache-control', 'no-store');
    return { ...showKey(row), key };
  }

  @Delete(':keyId')
  @HttpCode(204)
  @Needs('viewer', 'Revokes an API key.')
  async revoke(@CurrentActor() actor: Actor, @Param('keyId') id: string) {
    await this.keys.revoke(actor, id);
  }
}

function showKey({ keyHash: _, ...shown }: ApiKey) {
  return shown;
}
