import { readFile } from 'node:fs/promises';
import { Controller, Get, HttpCode, Post, Query, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { InputProblem } from '#libs/engine/index.js';
import { numberWords, paperWords } from '#libs/present/review-words.js';
import { contentNumber, MOST_PAPER_BYTES } from '#libs/review/paper-standing.js';
import { Store } from '#libs/store/store.js';
import { ofOrganisation, verifyNumber, verifyPaper } from '#libs/store/verify-paper.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { Spool } from '../records/spool.js';
import { VERIFY_SCRIPT, verifyPage } from './verify-page.js';

/** Says what a paper is worth. */
@Controller()
export class VerifyController {
  constructor(
    private readonly store: Store,
    private readonly spool: Spool,
  ) {}

  @Get('verify')
  @Needs('viewer', 'Shows the page a paper is dropped on to be verified.')
  page(@Res() reply: FastifyReply) {
    return reply.type('text/html; charset=utf-8').header('cache-control', 'no-cache').send(verifyPage());
  }

  @Get('verify.js')
  @Needs('viewer', 'Gives that page’s script.')
  script(@Res() reply: FastifyReply) {
    return reply.type('text/javascript; charset=utf-8').header('cache-control', 'no-cache').send(VERIFY_SCRIPT);
  }

  @Post('api/verify')
  @HttpCode(200)
  @Needs(
    'viewer',
    'Says of a PDF whether it is approved as it stands, superseded, withdrawn, a draft, altered or unknown.',
  )
  async file(@Req() request: FastifyRequest) {
    const { file } = await this.spool.receive(request);
    try {
      if (file.bytes > MOST_PAPER_BYTES) {
        const expected = `a paper of at most ${MOST_PAPER_BYTES} bytes`;
        throw new InputProblem([{ code: 'too-large', expected, found: `${file.bytes}` }]);
      }
      const bytes = await readFile(file.path);
      const seen = ofOrganisation(actorOf(request).organisationId);
      const { paper, faults, ...answer } = await this.store.read((manager) => verifyPaper(manager, bytes, seen));
      const name = paper === null ? null : `${paper.number}, revision ${paper.revision}`;
      const { state = null, supersededBy = null } = paper ?? {};
      const text = paperWords({ ...answer, name, state, supersededBy, registerHolds: faults.length === 0 });
      return { ...answer, text, paper, faults, sha256: file.sha256 };
    } finally {
      await this.spool.discard(file);
    }
  }

  @Get('api/verify')
  @Needs('viewer', 'Says what a content number, typed from a scan as ?number=, stands for.')
  async number(@Query('number') typed: unknown, @Req() request: FastifyRequest) {
    const digits = typeof typed === 'string' ? contentNumber(typed) : null;
    if (digits === null) {
      const expected = 'the 16 digits behind "content" at the head of a page, or all 64';
      const found = JSON.stringify(String(typed ?? '').slice(0, 80));
      throw new InputProblem([{ code: 'out-of-range', path: 'number', expected, found }]);
    }
    const seen = ofOrganisation(actorOf(request).organisationId);
    const found = await this.store.read((manager) => verifyNumber(manager, digits, seen));
    return {
      number: digits,
      papers: found.map((paper) => {
        const name = `${paper.number}, revision ${paper.revision}`;
        const { state, supersededBy, faults } = paper;
        const broken = { standing: 'altered', signedAfterwards: false, name, state, supersededBy } as const;
        const text =
          faults.length === 0
            ? numberWords(name, state, supersededBy)
            : paperWords({ ...broken, registerHolds: false });
        return { ...paper, text };
      }),
    };
  }
}
