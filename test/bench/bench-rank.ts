import { Worker } from 'node:worker_threads';
import type { RankShare } from '#libs/engine/index.js';
import { ms } from './compare-twins.js';
import { median } from './stopwatch.js';

/** Two workers rank so many times as fast as one, at least. */
const LEAST = 1.8;
const ROUNDS = 3;

interface Answer {
  best: number;
  candidates: number;
}

/** The full ranking, every candidate simulated whole, by one worker and shared out between two. */
export async function benchRank(): Promise<boolean> {
  const file = new URL('./rank-worker.js', import.meta.url);
  const workers = [new Worker(file), new Worker(file)];
  try {
    const [alone, shared]: [number[], number[]] = [[], []];
    let whole: Answer = { best: 0, candidates: 0 };
    await rank(workers, 16);
    for (let round = 0; round < ROUNDS; round++) {
      const one = await rank(workers.slice(0, 1), 1);
      const two = await rank(workers, 1);
      alone.push(one.ns);
      shared.push(two.ns);
      whole = one.answer;
      if (two.answer.best !== whole.best || two.answer.candidates !== whole.candidates) {
        throw new Error(`ranked by two: ${JSON.stringify(two.answer)}, by one: ${JSON.stringify(whole)}`);
      }
    }
    const times = median(alone) / median(shared);
    const met = times >= LEAST;
    const said = `${times.toFixed(2)} times as fast, at least ${LEAST}: ${met ? 'met' : 'MISSED'}`;
    const title = `full ranking of ${whole.candidates} candidates`;
    console.log(`${title}: one worker ${ms(median(alone))}, two ${ms(median(shared))}; ${said}`);
    return met;
  } finally {
    await Promise.all(workers.map((worker) => worker.terminate()));
  }
}

/** Shares the candidates out, or of every so many one to begin with. */
async function rank(workers: Worker[], sample: number): Promise<{ ns: number; answer: Answer }> {
  const start = process.hrtime.bigint();
  const every = workers.length * sample;
  const answers = await Promise.all(workers.map((worker, first) => ask(worker, { first, every })));
  const ns = Number(process.hrtime.bigint() - start);
  const best = Math.max(...answers.map((answer) => answer.best));
  return { ns, answer: { best, candidates: answers.reduce((sum, { candidates }) => sum + candidates, 0) } };
}

function ask(worker: Worker, share: RankShare): Promise<Answer> {
  return new Promise((resolve, reject) => {
    worker.once('error', reject);
    worker.once('message', (answer: Answer) => {
      worker.off('error', reject);
      resolve(answer);
    });
    worker.postMessage(share);
  });
}
