import { readFile } from 'node:fs/promises';
import { Controller, Get, HttpCode, Post, Query, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { InputProblem } from '#libs/engine/index.js';
import { type HeldExport, heldExport } from '#libs/meter-files/read-plan-file.js';
import { exportWords } from '#libs/present/export-words.js';
import { planTables } from '#libs/present/result-tables.js';
import { numberWords, paperWords } from '#libs/present/review-words.js';
import { contentNumber, MOST_PAPER_BYTES } from '#libs/review/paper-standing.js';
import { Store } from '#libs/store/store.js';
import { sha256 } from '#libs/store/audit-log.js';
import { verifyExport } from '#libs/store/verify-export.js';
import { ofOrganisation, type Seen, verifyNumber, verifyPaper } from '#libs/store/verify-paper.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { Spool } from '../records/spool.js';
import { VERIFY_SCRIPT, verifyPage } from './verify-page.js';

/** So many of the values that differ are told. */
const MOST_DIFFERENCES = 200;

/** Says what a paper, or an exported plan or calculation sheet, is worth. */
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
    'Says of a PDF, or of an exported plan or calculation sheet, whether it is approved, superseded, a draft, altered, …',
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
      const held = await heldExport(bytes, { hash: sha256, tablesOf: planTables });
      if (held !== null) return { ...(await this.#ofExport(held, seen)), sha256: file.sha256 };
      const { paper, faults, ...answer } = await this.store.read((manager) => verifyPaper(manager, bytes, seen));
      const name = paper === null ? null : `${paper.number}, revision ${paper.revision}`;
      const { state = null, supersededBy = null } = paper ?? {};
      const text = paperWords({ ...answer, name, state, supersededBy, registerHolds: faults.length === 0 });
      return { ...answer, text, paper, faults, sha256: file.sha256 };
    } finally {
      await this.spool.discard(file);
    }
  }

  async #ofExport({ fault, ...held }: HeldExport, seen: Seen) {
    const { kind, contentHash } = held;
    const { differences, ...answer } = await this.store.read((manager) => verifyExport(manager, held, seen));
    const { paper, faults } = answer;
    const name = paper === null ? null : `${paper.number}, revision ${paper.revision}`;
    const { state = null, supersededBy = null } = paper ?? {};
    const told = { ...answer, kind, differences, fault, name, state, supersededBy };
    const text = exportWords({ ...told, registerHolds: faults.length === 0 });
    const exported = { kind, contentHash, differences: differences.slice(0, MOST_DIFFERENCES), fault };
    return { ...answer, signedAfterwards: false, text, exported };
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
