import { Controller, Get, NotFoundException, Param, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { Needs } from '../people/needs.js';
import { Public } from '../public.js';
import { type PageFile, PageFiles } from './page-files.js';

/** The planner's page: one document, and its files by names that change with what they hold. */
@Controller()
export class PageController {
  constructor(private readonly files: PageFiles) {}

  @Get()
  @Needs('viewer', 'Shows the planner’s page, or leads to the plain one where the page was not built.')
  first(@Req() request: FastifyRequest, @Res() reply: FastifyReply) {
    const file = this.files.find('index.html');
    if (file === null) return reply.redirect('/plain');
    return send(file, request, reply.header('cache-control', 'no-cache'));
  }

  @Get('page/*')
  @Public('Gives a file of the page.')
  file(@Param('*') name: string, @Req() request: FastifyRequest, @Res() reply: FastifyReply) {
    const file = this.files.find(`page/${name}`);
    if (file === null) throw new NotFoundException('there is nothing at this address');
    const keeps = /-[\w-]{8}\.\w+$/.test(name) ? 'public, max-age=31536000, immutable' : 'no-cache';
    return send(file, request, reply.header('cache-control', keeps));
  }
}

function send({ type, plain, gzip }: PageFile, request: FastifyRequest, reply: FastifyReply) {
  const takesGzip = /\bgzip\b/.test(String(request.headers['accept-encoding'] ?? ''));
  reply.type(type).header('vary', 'accept-encoding');
  if (gzip === null || !takesGzip) return reply.send(plain);
  return reply.header('content-encoding', 'gzip').send(gzip);
}
