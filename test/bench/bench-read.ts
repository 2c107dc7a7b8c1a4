import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parse } from 'csv-parse/sync';
import { createLoadRecord } from '#libs/engine/index.js';
import { fileChunks } from '#libs/meter-files/file-chunks.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { buildTwin, type CTwin } from './c-twin.js';
import { insistEqual, ms } from './compare-twins.js';
import { madeUpMinutes, madeUpMinutesCsv } from './made-up-minutes.js';
import { median } from './stopwatch.js';

const WARM_LIMIT = 2;
const FIRST_LIMIT = 5;
const LIBRARY_LIMIT = 20;
const ROUNDS = 7;
const RUNS = 5;
const WARM_UPS = 15;
const LIBRARY_WARM_UPS = 2;

/**
 * Reads a year of one-minute rows to a validated record: warm and in processes of their own, against a scanner in C and
 * against a CSV library whose cells become the same validated record.
 */
export async function benchRead(): Promise<boolean> {
  const dir = mkdtempSync(join(tmpdir(), 'varwright-bench-'));
  const path = join(dir, 'minutes.csv');
  const twin = buildTwin('meter-scan');
  try {
    writeFileSync(path, madeUpMinutesCsv(madeUpMinutes()));
    const title = `a year of minutes read, ${(statSync(path).size / 1e6).toFixed(1)} MB`;
    const times = await interleaved(path, twin);
    const met = [
      againstC(`${title}, warm`, times.warmNs, times.twinNs, WARM_LIMIT),
      againstC(`${title}, first in its process`, times.firstNs, times.twinNs, FIRST_LIMIT),
      againstLibrary(title, times.warmNs, times.libraryNs),
    ];
    return !met.includes(false);
  } finally {
    twin?.remove();
    rmSync(dir, { recursive: true });
  }
}

interface Times {
  warmNs: number[];
  firstNs: number[];
  twinNs: number[];
  libraryNs: number[];
  output: Float64Array;
}

/** Rounds in turn, so that a slow moment of the machine meets all of them. */
async function interleaved(path: string, twin: CTwin | null): Promise<Times> {
  for (let run = 1; run < WARM_UPS; run++) await readOnce(path);
  const output = joined((await readOnce(path)).columns);
  const times: Times = { warmNs: [], firstNs: [], twinNs: [], libraryNs: [], output };
  for (let run = 0; run < LIBRARY_WARM_UPS; run++) libraryTimeNs(path, output);
  for (let round = 0; round < ROUNDS; round++) {
    for (let run = 0; run < RUNS; run++) times.warmNs.push((await readOnce(path)).ns);
    times.firstNs.push(firstTimeNs(path));
    if (twin !== null) {
      const twins = twin.run(path, RUNS);
      times.twinNs.push(twins.ns);
      insistEqual('a year of minutes read', output, twins.output);
    }
    times.libraryNs.push(libraryTimeNs(path, output));
  }
  return times;
}

async function readOnce(path: string): Promise<{ ns: number; columns: Float64Array[] }> {
  const start = process.hrtime.bigint();
  const { record } = await readMeterFile(fileChunks(path), { sizeBytes: statSync(path).size });
  const ns = Number(process.hrtime.bigint() - start);
  return { ns, columns: [record.beginS, record.activeKw, record.laggingKvar, record.leadingKvar] };
}

function firstTimeNs(path: string): number {
  const program = fileURLToPath(new URL('./read-once.js', import.meta.url));
  return JSON.parse(execFileSync(process.execPath, [program, path], { encoding: 'utf8' })).ns;
}

/** The library's rows of text, each cell checked, turned into a record and held against the same columns. */
function libraryTimeNs(path: string, expected: Float64Array): number {
  const start = process.hrtime.bigint();
  const rows = parse(readFileSync(path), { from_line: 2 }) as [string, string, string][];
  const n = rows.length;
  const [beginS, activeKw, laggingKvar, leadingKvar] = Array.from({ length: 4 }, () => new Float64Array(n)) as [
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  for (let i = 0; i < n; i++) {
    const [stamp, kw, kvar] = rows[i]!;
    beginS[i] = Date.parse(`${stamp.replace(' ', 'T')}Z`) / 1000;
    activeKw[i] = numberOf(kw);
    const reactiveKvar = numberOf(kvar);
    laggingKvar[i] = Math.max(reactiveKvar, 0);
    leadingKvar[i] = Math.max(-reactiveKvar, 0);
  }
  createLoadRecord({ intervalS: 60, beginS, activeKw, laggingKvar, leadingKvar });
  const ns = Number(process.hrtime.bigint() - start);
  insistEqual('a year of minutes by a library', joined([beginS, activeKw, laggingKvar, leadingKvar]), expected);
  return ns;
}

/** An empty cell would be 0. */
function numberOf(cell: string): number {
  if (cell.trim() === '') throw new Error('a cell without a number');
  return Number(cell);
}

function joined(columns: readonly Float64Array[]): Float64Array {
  const all = new Float64Array(columns.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const column of columns) {
    all.set(column, at);
    at += column.length;
  }
  return all;
}

function againstC(title: string, oursNs: number[], twinNs: number[], limit: number): boolean {
  if (twinNs.length === 0) {
    console.log(`${title}: ${ms(median(oursNs))}; no C compiler here, so no ratio`);
    return true;
  }
  const ratio = median(oursNs) / median(twinNs);
  const met = ratio <= limit;
  const said = `${ratio.toFixed(2)} × C, at most ${limit}: ${met ? 'met' : 'MISSED'}`;
  console.log(`${title}: ${ms(median(oursNs))}, C ${ms(median(twinNs))}; ${said}`);
  return met;
}

function againstLibrary(title: string, oursNs: number[], libraryNs: number[]): boolean {
  const times = median(libraryNs) / median(oursNs);
  const met = times >= LIBRARY_LIMIT;
  const said = `${times.toFixed(1)} times as fast, at least ${LIBRARY_LIMIT}: ${met ? 'met' : 'MISSED'}`;
  console.log(`${title}: a CSV library ${ms(median(libraryNs))}; ${said}`);
  return met;
}
