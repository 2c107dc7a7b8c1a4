import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { portWatch } from './port-watch.js';
import { packAnswer } from './worker-answer.js';
import { WorkerPool } from './worker-pool.js';

const WORKER = `
export const twice = ({ task }) => ({ value: task * 2 });
export const sum = ({ task }) => ({ value: task.column.reduce((sum, value) => sum + value, 0) });
export const refuse = () => ({ problems: [{ code: 'missing', path: 'a.b', expected: 'a', found: 'nothing' }] });
export const fault = () => { throw new Error('ours'); };
export const spin = () => { for (;;); };
export const steps = ({ port }) => { for (let i = 1; i <= 3; i++) port.postMessage(i / 4); return { value: 'done' }; };
`;

describe('a pool of worker threads', () => {
  const dir = mkdtempSync(join(tmpdir(), 'varwright-pool-'));
  let pool: WorkerPool;
  const faults: unknown[] = [];

  beforeAll(() => {
    writeFileSync(join(dir, 'worker.mjs'), WORKER);
    pool = new WorkerPool(pathToFileURL(join(dir, 'worker.mjs')), (error) => faults.push(error), 2);
  });

  afterAll(async () => {
    await pool.close();
    rmSync(dir, { recursive: true });
  });

  it('gives what the function gives', async () => {
    expect(await pool.run<number>('twice', 21)).toBe(42);
  });

  it('is handed a column over, and copies any other', async () => {
    const column = Float64Array.of(1, 2, 3);
    expect(await pool.run<number>('sum', { column })).toBe(6);
    expect(column.length).toBe(3);
    expect(await pool.run<number>('sum', { column }, { handedOver: [column, column, null] })).toBe(6);
    expect(column.length).toBe(0);
  });

  it('throws an input problem as one, with its list', async () => {
    const error = await pool.run('refuse', null).catch((thrown: InputProblem) => thrown);
    expect(error).toBeInstanceOf(InputProblem);
    expect((error as InputProblem).problems[0]).toMatchObject({ code: 'missing', path: 'a.b' });
  });

  it('throws a fault as a fault', async () => {
    await expect(pool.run('fault', null)).rejects.toThrow('ours');
  });

  it('ends a thread that never returns, and works on', async () => {
    const stop = new AbortController();
    const spinning = pool.run('spin', null, { signal: stop.signal });
    setTimeout(() => stop.abort(), 100);
    await expect(spinning).rejects.toMatchObject({ name: 'AbortError' });
    expect(await pool.run<number>('twice', 1)).toBe(2);
  });

  it('whose worker file is broken says so and ends no process', async () => {
    writeFileSync(join(dir, 'broken.mjs'), `import './nowhere.mjs';`);
    const broken = new WorkerPool(pathToFileURL(join(dir, 'broken.mjs')), (error) => faults.push(error), 1);
    await expect(broken.run('twice', 1)).rejects.toThrow(/nowhere/);
    await broken.close();
  });

  it('passes progress on', async () => {
    const seen: number[] = [];
    await pool.run('steps', null, { report: (fraction) => seen.push(fraction) });
    expect(seen).toEqual([0.25, 0.5, 0.75]);
  });
});

describe('a worker', () => {
  it('packs problems but not faults', async () => {
    const problem = { code: 'missing', expected: 'a', found: 'b' } as const;
    expect(
      await packAnswer(() => {
        throw new InputProblem([problem]);
      }),
    ).toEqual({ problems: [problem] });
    expect(await packAnswer(async () => 1)).toEqual({ value: 1 });
    await expect(
      packAnswer(() => {
        throw new Error('ours');
      }),
    ).rejects.toThrow('ours');
  });

  it('says its progress a hundred times at most', () => {
    const said: number[] = [];
    const watch = portWatch({ postMessage: (fraction: number) => said.push(fraction) } as never);
    for (let i = 0; i <= 10_000; i++) watch.report(i / 10_000);
    expect(said.length).toBeGreaterThan(50);
    expect(said.length).toBeLessThanOrEqual(100);
    expect(watch.stopped()).toBe(false);
  });
});
