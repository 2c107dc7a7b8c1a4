import { createHash, randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdir, readdir, rm } from 'node:fs/promises';
import type { IncomingMessage } from 'node:http';
import { basename, join } from 'node:path';
import { type Readable, Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { FastifyRequest } from 'fastify';
import { InputProblem } from '#libs/engine/index.js';
import { RefusedRequest } from '../refused-request.js';

/** An upload on disk, not looked at yet. */
export interface SpooledFile {
  path: string;
  /** SHA-256 of its bytes, 64 hexadecimal digits */
  sha256: string;
  bytes: number;
  /** name the sender gave, null where there is none */
  name: string | null;
}

/** An upload and what came with it. */
export interface Upload {
  file: SpooledFile;
  fields: Record<string, string>;
}

const RATE_CHECK_MS = 10_000;
const LEAST_BYTES_A_CHECK = 10_000;
const LONGEST_NAME = 200;

/** Takes uploads to disk as they come: hashed, counted and capped, never whole in memory. */
export class Spool {
  readonly #dir: string;
  readonly #mostBytes: number;

  constructor(dir: string, mostBytes: number) {
    this.#dir = dir;
    this.#mostBytes = mostBytes;
  }

  /**
   * Empties the folder: what stands there was left by a process that ended in the middle of an upload.
   * @param wanted places of files whose import goes on
   */
  async prepare(wanted: readonly string[] = []): Promise<void> {
    await mkdir(this.#dir, { recursive: true });
    for (const place of await readdir(this.#dir)) {
      if (!wanted.includes(place)) await rm(join(this.#dir, place), { recursive: true, force: true });
    }
  }

  /** Where a spooled file stands in the folder, to be found again by another process. */
  placeOf(file: SpooledFile): string {
    return basename(file.path);
  }

  /** The path of a file by its place. */
  pathAt(place: string): string {
    return join(this.#dir, basename(place));
  }

  /**
   * Receives the one file of a request: the body itself, or the `file` part of a form.
   * @param request its body not read yet
   * @returns the file and the other fields; call `discard` when done with it
   */
  async receive(request: FastifyRequest): Promise<Upload> {
    try {
      if (request.isMultipart()) return await this.#receiveForm(request);
      const name = fileNameOf((request.query as Record<string, unknown>).name);
      return { file: await this.take(request.body as Readable, name), fields: {} };
    } catch (error) {
      await passOver(request.raw, this.#mostBytes);
      throw error;
    }
  }

  /** Takes a stream to disk. */
  async take(source: Readable, name: string | null): Promise<SpooledFile> {
    const path = join(this.#dir, randomUUID());
    const hash = createHash('sha256');
    const counter = new ByteCounter(this.#mostBytes, (chunk) => hash.update(chunk));
    try {
      // Not part of the pipeline, which would destroy the request and with it the way to say why.
      source.pipe(counter);
      source.once('error', () => counter.destroy(brokenOff()));
      source.once('close', () => {
        if (!source.readableEnded) counter.destroy(brokenOff());
      });
      await pipeline(counter, createWriteStream(path, { flags: 'wx', mode: 0o600 }));
      // The form's own reader cuts a file off at its cap without an error.
      if ('truncated' in source && source.truncated) throw tooLarge(this.#mostBytes);
    } catch (error) {
      source.unpipe(counter);
      source.resume();
      await rm(path, { force: true });
      throw error;
    }
    return { path, sha256: hash.digest('hex'), bytes: counter.bytes, name };
  }

  async discard(file: Pick<SpooledFile, 'path'> | null): Promise<void> {
    if (file !== null) await rm(file.path, { force: true });
  }

  async #receiveForm(request: FastifyRequest): Promise<Upload> {
    const fields: Record<string, string> = {};
    let file: SpooledFile | null = null;
    try {
      for await (const part of request.parts()) {
        if (part.type === 'field') {
          if (Object.hasOwn(fields, part.fieldname)) throw twice(part.fieldname);
          fields[part.fieldname] = String(part.value);
        } else if (part.fieldname === 'file' && file === null) {
          file = await this.take(part.file, fileNameOf(part.filename));
        } else throw twice(part.fieldname);
      }
      if (file !== null) return { file, fields };
      throw new InputProblem([{ code: 'missing', path: 'file', expected: 'a meter file', found: 'nothing' }]);
    } catch (error) {
      await this.discard(file);
      throw error;
    }
  }
}

/**
 * Lets the rest of a refused body pass, so that the sender gets to read why and the connection stays usable; a body that
 * does not end soon is cut off.
 */
async function passOver(body: IncomingMessage, mostBytes: number): Promise<void> {
  if (body.complete || body.destroyed) return;
  let bytes = 0;
  const patience = setTimeout(() => body.destroy(), RATE_CHECK_MS);
  const ended = new Promise((resolve) => body.once('end', resolve).once('close', resolve));
  body.on('data', (chunk: Buffer) => {
    bytes += chunk.length;
    if (bytes > mostBytes) body.destroy();
  });
  await ended;
  clearTimeout(patience);
}

/** Counts what passes; ends a stream that is too long or that hardly moves. */
class ByteCounter extends Transform {
  bytes = 0;
  readonly #most: number;
  readonly #take: (chunk: Buffer) => void;
  readonly #timer: NodeJS.Timeout;

  constructor(most: number, take: (chunk: Buffer) => void) {
    super();
    this.#most = most;
    this.#take = take;
    let before = 0;
    this.#timer = setInterval(() => {
      if (this.bytes - before < LEAST_BYTES_A_CHECK) this.destroy(tooSlow());
      before = this.bytes;
    }, RATE_CHECK_MS);
  }

  override _transform(chunk: Buffer, _encoding: string, done: (error: Error | null, chunk?: Buffer) => void): void {
    this.bytes += chunk.length;
    this.#take(chunk);
    if (this.bytes > this.#most) done(tooLarge(this.#most));
    else done(null, chunk);
  }

  override _flush(done: () => void): void {
    clearInterval(this.#timer);
    done();
  }

  override _destroy(error: Error | null, done: (error: Error | null) => void): void {
    clearInterval(this.#timer);
    done(error);
  }
}

function tooLarge(most: number): InputProblem {
  const found = 'more';
  return new InputProblem([{ code: 'too-large', path: 'file', expected: `at most ${most} bytes`, found }]);
}

function brokenOff(): RefusedRequest {
  const problem = { code: 'stopped', path: 'file', expected: 'a file to its end', found: 'an end before' } as const;
  return new RefusedRequest(400, 'The upload was broken off', problem);
}

function tooSlow(): RefusedRequest {
  const expected = `at least ${LEAST_BYTES_A_CHECK} bytes in ${RATE_CHECK_MS / 1000} s`;
  return new RefusedRequest(408, 'The upload hardly moves', {
    code: 'stopped',
    path: 'file',
    expected,
    found: 'fewer',
  });
}

function twice(field: string): InputProblem {
  const path = JSON.stringify(field.slice(0, 60));
  return new InputProblem([{ code: 'unknown-key', path, expected: 'one file, each field once', found: 'another' }]);
}

/** The last part of a name, without what could break a line or a header. */
function fileNameOf(name: unknown): string | null {
  if (typeof name !== 'string') return null;
  const last = name.split(/[\\/]/).at(-1) ?? '';
  const clean = last.replace(/[\p{Cc}\p{Cf}\p{Cs}]/gu, '').trim();
  return clean === '' ? null : clean.slice(0, LONGEST_NAME);
}
