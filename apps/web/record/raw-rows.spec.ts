import { describe, expect, it } from 'vitest';
import { rowsAtEnds } from './raw-rows.js';

describe('first and last rows of a file', () => {
  it('are those of the file, whatever ends its lines', async () => {
    const lines = ['time,kW', ...Array.from({ length: 9 }, (_, i) => `${i},${10 * i}`)];
    for (const end of ['\n', '\r\n', '\r']) {
      const found = await rowsAtEnds(new Blob([lines.join(end) + end]));
      expect(found).toEqual({ first: lines.slice(0, 7), last: lines.slice(-4) });
    }
  });

  it('are whole rows of a file that is larger than what is read of it', async () => {
    const lines = Array.from({ length: 50_000 }, (_, i) => `2025-01-01 00:00,${i},0.5`);
    const found = await rowsAtEnds(new Blob([lines.join('\n')]));
    expect(found).toEqual({ first: lines.slice(0, 7), last: lines.slice(-4) });
  });

  it('are none in a file that is no text', async () => {
    expect(await rowsAtEnds(new Blob([Uint8Array.of(80, 75, 3, 4, 0, 0, 7)]))).toBeNull();
  });
});
