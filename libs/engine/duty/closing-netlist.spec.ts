import { describe, expect, it } from 'vitest';
import { closingNetlist } from './closing-netlist.js';
import type { ClosingCircuit } from './closing-parts.js';

const plain: ClosingCircuit = {
  sourceOhm: 0,
  sourceH: 3e-5,
  connected: [{ rOhm: 0, inductanceH: 0, capacitanceF: 1e-3 }],
  closing: { rOhm: 0.01, inductanceH: 2e-6, capacitanceF: 1e-3 },
  crestV: 326.6,
  frequencyHz: 50,
};

const lines = (title = 'x'): string[] => closingNetlist(plain, title).trimEnd().split('\n');

describe('the netlist of a closing', () => {
  it('leaves out what a part does not have: a source without resistance, a plain stage without coil', () => {
    expect(lines().filter((line) => /^(rsource|lin1|rin1) /.test(line))).toEqual([]);
    expect(lines().find((line) => line.startsWith('lsource'))).toContain(' feed bus ');
    expect(lines().find((line) => line.startsWith('cin1'))).toContain(' bus 0 ');
  });

  it('starts the closing stage uncharged and without current', () => {
    for (const part of ['lclosing', 'cclosing']) {
      expect(Number(/ic=(\S+)/.exec(lines().find((line) => line.startsWith(part))!)![1])).toBe(0);
    }
  });

  it('keeps a title of several lines in one comment', () => {
    expect(lines('a\nr1 bus 0 1\r\n.end')).toHaveLength(lines().length);
    expect(lines('a\nb')[0]).toBe('* a b');
  });
});
