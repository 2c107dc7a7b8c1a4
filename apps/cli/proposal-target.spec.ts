import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { proposalTarget } from './proposal-target.js';

let dir: string;
beforeEach(() => {
  dir = mkdtempSync(join(tmpdir(), 'varwright-proposal-'));
});
afterEach(() => rmSync(dir, { recursive: true }));

describe('the file a proposal is written to', () => {
  it('holds the old content until the new one is whole, and nothing is left beside it', async () => {
    const path = join(dir, 'proposal.pdf');
    writeFileSync(path, 'old');
    const target = await proposalTarget(path);
    expect(readFileSync(path, 'utf8')).toBe('old');
    await target.write(new TextEncoder().encode('new'));
    expect(readFileSync(path, 'utf8')).toBe('new');
    expect(readdirSync(dir)).toEqual(['proposal.pdf']);
  });

  it('is refused before anything is computed where nothing can be written', async () => {
    const usage = { problems: [{ code: 'usage', expected: '--pdf with a file that can be written' }] };
    await expect(proposalTarget(join(dir, 'none', 'proposal.pdf'))).rejects.toMatchObject(usage);
    await expect(proposalTarget(dir)).rejects.toMatchObject(usage);
    expect(existsSync(join(dir, 'none'))).toBe(false);
  });
});
