import { randomUUID } from 'node:crypto';
import type { Readable } from 'node:stream';
import { Controller, Post, Req, Res } from '@nestjs/common';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { InputProblem } from '#libs/engine/index.js';
import { isDocumentRows, readDocumentRows } from '#libs/meter-files/site-document.js';
import { insertSite } from '#libs/store/sites.js';
import { Store } from '#libs/store/store.js';
import { Once, replayed } from '../once/once.js';
import { actorOf } from '../people/actor.js';
import { Needs } from '../people/needs.js';
import { tagOf } from '../sites/version-tag.js';

/** As a site file in JSON may be. */
const MOST_BYTES = 1_000_000;

/** A site file that was exported as text or workbook, taken back. JSON goes to the sites themselves. */
@Controller('api/site-imports')
export class SiteImportsController {
  constructor(
    private readonly store: Store,
    private readonly once: Once,
  ) {}

  @Post()
  @Needs('planner', 'Adds a site from its file as site.csv or site.xlsx; the body is the file.')
  async take(@Req() request: FastifyRequest, @Res({ passthrough: true }) reply: FastifyReply) {
    const { organisationId } = actorOf(request);
    const bytes = await bodyOf(request);
    if (!isDocumentRows(bytes)) {
      const expected = 'a site file as rows of path, kind and value';
      throw new InputProblem([{ code: 'unknown-format', expected, found: 'another file' }]);
    }
    const document = (await readDocumentRows(bytes)) as object;
    const answered = await this.once.begin(request, document);
    if (answered !== null) return JSON.parse(replayed(reply, answered)) as object;
    const { name } = await readSiteWithMathjs(document);
    const site = await this.store.write((manager) =>
      insertSite(manager, { id: randomUUID(), organisationId, name, document }, new Date()),
    );
    reply.header('location', `/api/sites/${site.id}`).header('etag', tagOf(site.version));
    return { id: site.id, name, version: site.version, site: document };
  }
}

async function bodyOf(request: FastifyRequest): Promise<Uint8Array> {
  const parts: Uint8Array[] = [];
  let size = 0;
  if (request.isMultipart()) {
    throw new InputProblem([{ code: 'usage', expected: 'the file itself as the body', found: 'a form' }]);
  }
  for await (const chunk of request.body as Readable) {
    size += (chunk as Uint8Array).length;
    if (size > MOST_BYTES) {
      throw new InputProblem([{ code: 'too-large', expected: `at most ${MOST_BYTES} bytes`, found: 'more' }]);
    }
    parts.push(chunk as Uint8Array);
  }
  return Buffer.concat(parts);
}
