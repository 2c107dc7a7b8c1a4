import { Body, Controller, Get, Param, Post, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { newKeySchema, ownPasswordSchema } from '#libs/contract/people-schema.js';
import { readBySchema } from '#libs/contract/schema-problems.js';
import { accountPage, type AccountView } from './account-page.js';
import { Accounts, SESSION_S } from './accounts.js';
import { type Actor, actorOf, CurrentActor } from './actor.js';
import { Keys } from './keys.js';
import { Needs } from './needs.js';
import { refusedForm } from './refused-form.js';
import { sendForm } from './send-form.js';
import { sessionCookie } from './session-cookie.js';

type Form = Record<string, string>;

/** One's own account on a page without scripts. */
@Controller('account')
export class AccountPageController {
  constructor(
    private readonly accounts: Accounts,
    private readonly keys: Keys,
  ) {}

  @Get()
  @Needs('viewer', 'Shows one’s own account: password, API keys, the end of the session.')
  async show(@CurrentActor() actor: Actor, @Res() reply: FastifyReply) {
    return this.#show(actor, reply, 200);
  }

  @Post('password')
  @Needs('viewer', 'Takes the form that changes one’s own password.')
  async changePassword(@CurrentActor() actor: Actor, @Body() form: Form, @Res() reply: FastifyReply) {
    try {
      const { present, password } = readBySchema(ownPasswordSchema, form);
      const token = await this.accounts.changeOwnPassword(actor, present, password);
      reply.header('set-cookie', sessionCookie(token, SESSION_S, this.accounts.reach.isSecure));
    } catch (error) {
      const { status, refused } = refusedForm(error);
      return this.#show(actor, reply, status, { refused });
    }
    return reply.redirect('/account', 303);
  }

  @Post('keys')
  @Needs('viewer', 'Takes the form that makes an API key, and shows it this once.')
  async makeKey(@CurrentActor() actor: Actor, @Body() { days = '', ...form }: Form, @Res() reply: FastifyReply) {
    try {
      const asked = days.trim() === '' ? form : { ...form, days: Number(days) };
      const { name, role = 'viewer', ...rest } = readBySchema(newKeySchema, asked);
      const until = rest.days === undefined ? {} : { days: rest.days };
      const { key } = await this.accounts.makeKey(actor, { name, role, ...until });
      return this.#show(actor, reply, 201, { made: key });
    } catch (error) {
      const { status, refused } = refusedForm(error);
      return this.#show(actor, reply, status, { refused });
    }
  }

  @Post('keys/:keyId/revoke')
  @Needs('viewer', 'Takes the form that revokes an API key.')
  async revokeKey(@Param('keyId') id: string, @Res() reply: FastifyReply) {
    await this.keys.revoke(actorOf(reply.request), id);
    return reply.redirect('/account', 303);
  }

  async #show(actor: Actor, reply: FastifyReply, status: number, said: Partial<AccountView> = {}) {
    const [keys, isLocal] = [await this.keys.all(actor), await this.accounts.areNone()];
    return sendForm(reply, status, accountPage({ actor, keys, isLocal, made: null, refused: null, ...said }));
  }
}
