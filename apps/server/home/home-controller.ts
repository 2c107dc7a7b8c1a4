import { Controller, Get, Param, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { Store } from '#libs/store/store.js';
import { type Actor, actorOf, CurrentActor } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { Public } from '../public.js';
import { findSite } from '../sites/find-site.js';
import { homePage } from './home-page.js';
import { PAGE_STYLE } from './page-style.js';
import { siteView } from './site-view.js';

/** A plain page without scripts: one site, its verdict and the ways to its papers. */
@Controller()
export class HomeController {
  constructor(private readonly store: Store) {}

  @Get('plain')
  @Needs('viewer', 'Shows the first site on a page without scripts.')
  async first(@CurrentActor() actor: Actor, @Res() reply: FastifyReply) {
    return this.#show(actor, undefined, reply);
  }

  @Get('sites/:siteId')
  @Needs('viewer', 'Shows a site on a page without scripts.')
  async site(@Param('siteId') siteId: string, @Res() reply: FastifyReply) {
    const actor = actorOf(reply.request);
    const { id } = await findSite(this.store, actor, siteId);
    return this.#show(actor, id, reply);
  }

  @Get('page.css')
  @Public('Gives the page’s style sheet.')
  style(@Res() reply: FastifyReply) {
    return reply.type('text/css; charset=utf-8').header('cache-control', 'no-cache').send(PAGE_STYLE);
  }

  async #show(actor: Actor, siteId: string | undefined, reply: FastifyReply) {
    const page = homePage(await siteView(this.store, actor, siteId));
    return reply.type('text/html; charset=utf-8').header('cache-control', 'no-cache').send(page);
  }
}
