import { Body, Controller, Get, Post, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { signInSchema } from '#libs/contract/people-schema.js';
import { readBySchema } from '#libs/contract/schema-problems.js';
import { InputProblem } from '#libs/engine/index.js';
import { Public } from '../public.js';
import { RefusedRequest } from '../refused-request.js';
import { Accounts, SESSION_S } from './accounts.js';
import { sendForm } from './send-form.js';
import { endedCookie, sessionCookie } from './session-cookie.js';
import { signInPage } from './sign-in-page.js';

/** Signing in and out in a browser, without scripts. */
@Controller()
export class SignInController {
  constructor(private readonly accounts: Accounts) {}

  @Get('sign-in')
  @Public('Shows the page to sign in on.')
  async show(@Res() reply: FastifyReply) {
    if (await this.accounts.areNone()) return reply.redirect('/', 303);
    return sendForm(reply, 200, signInPage(null));
  }

  @Post('sign-in')
  @Public('Takes the form of the page to sign in on.')
  async begin(@Body() body: unknown, @Res() reply: FastifyReply) {
    try {
      const { token } = await this.accounts.signIn(readBySchema(signInSchema, body));
      return reply
        .header('set-cookie', sessionCookie(token, SESSION_S, this.accounts.reach.isSecure))
        .redirect('/', 303);
    } catch (error) {
      if (!(error instanceof InputProblem)) throw error;
      const status = error instanceof RefusedRequest ? error.status : 422;
      const tooMany = `Too many tries: ${error.problems[0]?.expected}.`;
      const why = status === 429 ? tooMany : 'Organisation, sign-in name and password do not belong together.';
      return sendForm(reply, status, signInPage(why));
    }
  }

  @Post('sign-out')
  @Public('Ends the session and shows the page to sign in on.')
  async end(@Req() request: FastifyRequest, @Res() reply: FastifyReply) {
    await this.accounts.signOut(request);
    return reply.header('set-cookie', endedCookie(this.accounts.reach.isSecure)).redirect('/sign-in', 303);
  }
}
