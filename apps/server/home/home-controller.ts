import { Controller, Get, Param, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { Store } from '#libs/store/store.js';
import { Public } from '../public.js';
import { findSite } from '../sites/find-site.js';
import { homePage } from './home-page.js';
import { PAGE_STYLE } from './page-style.js';
import { siteView } from './site-view.js';

/** A plain page for people: one site, its verdict and the ways to its papers. */
@Controller()
export class HomeController {
  constructor(private readonly store: Store) {}

  @Get()
  @Public('Shows the first site.')
  async first(@Res() reply: FastifyReply) {
    return this.#show(undefined, reply);
  }

  @Get('sites/:siteId')
  @Public('Shows a site.')
  async site(@Param('siteId') siteId: string, @Res() reply: FastifyReply) {
    const { id } = await findSite(this.store, siteId);
    return this.#show(id, reply);
  }

  @Get('page.css')
  @Public('Gives the page’s style sheet.')
  style(@Res() reply: FastifyReply) {
    return reply.type('text/css; charset=utf-8').header('cache-control', 'no-cache').send(PAGE_STYLE);
  }

  async #show(siteId: string | undefined, reply: FastifyReply) {
    const page = homePage(await siteView(this.store, siteId));
    return reply.type('text/html; charset=utf-8').header('cache-control', 'no-cache').send(page);
  }
}
