import { Worker } from 'node:worker_threads';

/** Median of some times. */
export function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

/** Median time of one call [ns], after warm-up calls. */
export function timeNs(runs: number, work: () => void): number {
  for (let run = 0; run < Math.min(runs, 30); run++) work();
  const times: number[] = [];
  for (let run = 0; run < runs; run++) {
    const start = process.hrtime.bigint();
    work();
    times.push(Number(process.hrtime.bigint() - start));
  }
  return median(times);
}

const SPIN = `const { parentPort } = require('node:worker_threads');
parentPort.on('message', () => {
  const start = process.hrtime.bigint();
  let x = 1;
  for (let i = 0; i < 3e8; i++) x = (x * 1664525 + 1013904223) | 0;
  parentPort.postMessage([Number(process.hrtime.bigint() - start), x]);
});`;

/**
 * How much longer a fixed piece of work takes while a second thread does the same: near 1 where the machine is
 * otherwise idle. Above 1.15 something else is running and no ratio below counts.
 */
export async function crowding(): Promise<number> {
  const workers = [new Worker(SPIN, { eval: true }), new Worker(SPIN, { eval: true })];
  const spin = (worker: Worker) =>
    new Promise<number>((resolve) => {
      worker.once('message', ([ns]: [number]) => resolve(ns));
      worker.postMessage(0);
    });
  const [first] = workers as [Worker, Worker];
  await Promise.all(workers.map(spin));
  const alone: number[] = [];
  const together: number[] = [];
  for (let round = 0; round < 3; round++) {
    alone.push(await spin(first));
    together.push(Math.max(...(await Promise.all(workers.map(spin)))));
  }
  await Promise.all(workers.map((worker) => worker.terminate()));
  return median(together) / median(alone);
}
