import { Readable } from 'node:stream';
import { Controller, Get, Res } from '@nestjs/common';
import type { FastifyReply } from 'fastify';
import { Public } from '../public.js';
import { demoLoad } from './demo-load.js';
import { DEMO_SITE } from './demo-site.js';

/** The example as files, to be tried on the command line or uploaded as another site. */
@Controller('api/demo')
export class DemoController {
  @Get('site.json')
  @Public('Gives the example’s site file.')
  site() {
    return DEMO_SITE;
  }

  @Get('load.csv')
  @Public('Gives the example’s meter file: a year of quarter hours.')
  load(@Res() reply: FastifyReply) {
    return reply
      .type('text/csv; charset=utf-8')
      .header('content-disposition', 'attachment; filename="load.csv"')
      .send(Readable.from(demoLoad()));
  }
}
