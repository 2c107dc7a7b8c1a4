import { Body, Controller, Delete, Get, HttpCode, Post, Put, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { type OwnPassword, ownPasswordSchema, type SignIn, signInSchema } from '#libs/contract/people-schema.js';
import { ContractPipe } from '../contract-pipe.js';
import { Public } from '../public.js';
import { Accounts, SESSION_S } from './accounts.js';
import { type Actor, CurrentActor } from './actor.js';
import { Needs } from './needs.js';
import { endedCookie, sessionCookie } from './session-cookie.js';

/** One's own session: a random token in a cookie no script can read. */
@Controller('api/session')
export class SessionController {
  constructor(private readonly accounts: Accounts) {}

  @Post()
  @HttpCode(200)
  @Public('Signs in: sets the session’s cookie and says who it is.')
  async begin(
    @Body({ schema: signInSchema, pipes: [new ContractPipe()] }) body: SignIn,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const { token, actor } = await this.accounts.signIn(body);
    this.#setCookie(reply, sessionCookie(token, SESSION_S, this.accounts.reach.isSecure));
    return actor;
  }

  @Get()
  @Needs('viewer', 'Says who makes the request.')
  async tell(@CurrentActor() actor: Actor) {
    return actor;
  }

  @Put('password')
  @HttpCode(204)
  @Needs('viewer', 'Changes one’s own password, which ends every other session.')
  async changePassword(
    @CurrentActor() actor: Actor,
    @Body({ schema: ownPasswordSchema, pipes: [new ContractPipe()] }) { present, password }: OwnPassword,
    @Res({ passthrough: true }) reply: FastifyReply,
  ) {
    const token = await this.accounts.changeOwnPassword(actor, present, password);
    this.#setCookie(reply, sessionCookie(token, SESSION_S, this.accounts.reach.isSecure));
  }

  @Delete()
  @HttpCode(204)
  @Public('Signs out.')
  async end(@Req() request: FastifyRequest, @Res({ passthrough: true }) reply: FastifyReply) {
    await this.accounts.signOut(request);
    this.#setCookie(reply, endedCookie(this.accounts.reach.isSecure));
  }

  #setCookie(reply: FastifyReply, cookie: string): void {
    reply.header('set-cookie', cookie).header('cache-control', 'no-store');
  }
}
