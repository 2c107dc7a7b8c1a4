import { describe, expect, it } from 'vitest';
import { progressLine, withProgress } from './reading-progress.js';

/** A megabyte every so many milliseconds, by a clock of its own. */
function slowFile(chunks: number, everyMs: number, sizeBytes: number | undefined) {
  let clockMs = 5000;
  const bytes = (async function* () {
    for (let i = 0; i < chunks; i++) {
      clockMs += everyMs;
      yield new Uint8Array(1_000_000);
    }
  })();
  const lines: string[] = [];
  const passed = withProgress(
    { bytes, sizeBytes },
    (line) => lines.push(line),
    () => clockMs,
  );
  return { lines, passed };
}

async function total(chunks: AsyncIterable<Uint8Array>): Promise<number> {
  let bytes = 0;
  for await (const chunk of chunks) bytes += chunk.length;
  return bytes;
}

describe('the progress of a reading', () => {
  it('is said once a second, and every byte passes', async () => {
    const { lines, passed } = slowFile(10, 400, 10_000_000);
    expect(await total(passed)).toBe(10_000_000);
    // 2.5 MB/s; a line at 1.2 s, 2.4 s and 3.6 s
    expect(lines).toEqual([
      '30 % of 10 MB read, 2.5 MB/s, about 3 s left',
      '60 % of 10 MB read, 2.5 MB/s, about 2 s left',
      '90 % of 10 MB read, 2.5 MB/s, about 1 s left',
    ]);
  });

  it('is silent within the first second', async () => {
    const { lines, passed } = slowFile(9, 110, 9_000_000);
    await total(passed);
    expect(lines).toEqual([]);
  });

  it('has no share and no time left where the size is not known', async () => {
    const { lines, passed } = slowFile(2, 1000, undefined);
    await total(passed);
    expect(lines).toEqual(['1.0 MB read, 1.0 MB/s', '2.0 MB read, 1.0 MB/s']);
  });

  it('says neither of a file that grew while it was read', () => {
    expect(progressLine({ readBytes: 3e6, sizeBytes: 2e6, elapsedS: 2 })).toBe('3.0 MB read, 1.5 MB/s');
  });

  it('gives long waits in minutes', () => {
    const line = progressLine({ readBytes: 50e6, sizeBytes: 1e9, elapsedS: 10 });
    expect(line).toBe('5 % of 1000 MB read, 5.0 MB/s, about 3 min left');
  });
});
