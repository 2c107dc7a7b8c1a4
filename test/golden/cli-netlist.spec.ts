import { existsSync, mkdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildProgram, site, Workplace } from './cli-program.js';

const work = new Workplace();
beforeAll(() => buildProgram(), 300_000);
afterAll(() => work.remove());

const out = (name: string): string => join(work.dir, name);

describe('scan --netlist', () => {
  it('writes the network and beside it the gravest closing, and still answers with the scan', () => {
    const args = ['scan', work.file(site()), '--netlist', out('mill.cir'), '--orders', '5:7:2', '--json'];
    const { code, stdout, stderr } = work.run(args);
    expect(code).toBe(0);
    expect(JSON.parse(stdout).levels[0].orders).toEqual([5, 7]);
    expect(stderr.match(/netlist written to .*/g)).toHaveLength(2);
    const network = readFileSync(out('mill.cir'), 'utf8');
    expect(network).toContain('* Invented Mill: ');
    expect(network).toContain('read at 2.5000000000000000e+2 Hz');
    expect(network).toContain('read at 3.5000000000000000e+2 Hz');
    expect(network.trimEnd().endsWith('.end')).toBe(true);
    expect(readFileSync(out('mill.inrush.cir'), 'utf8')).toContain('.tran ');
  });

  it('at a corner scans that corner alone and names it in the netlist', () => {
    const args = [
      'scan',
      work.file(site()),
      '--corner',
      '8',
      '--orders',
      '5:5:1',
      '--netlist',
      out('corner.net'),
      '--json',
    ];
    const { code, stdout } = work.run(args);
    expect(code).toBe(0);
    const { levels } = JSON.parse(stdout);
    // The last of eight: least fault level, most capacitance, most inductance.
    expect(levels).toHaveLength(1);
    expect(levels[0].corner).toMatchObject({ capacitanceFactor: 1.1, inductanceFactor: 1.03 });
    expect(readFileSync(out('corner.net'), 'utf8').split('\n')[0]).toContain('capacitance x 1.1, inductance x 1.03');
  });

  it('of a site without a bank has no closing to write', () => {
    const { code, stderr } = work.run(['scan', work.file(site({ bank: undefined })), '--netlist', out('bare.cir')]);
    expect(code).toBe(0);
    expect(stderr).toContain('bare.cir');
    expect(existsSync(out('bare.inrush.cir'))).toBe(false);
  });

  it.each([
    ['a corner there is not', 3, ['--corner', '9']],
    ['a corner in words', 2, ['--corner', 'worst']],
    ['orders below the fundamental', 2, ['--orders', '0.5:3:0.5']],
    ['a netlist on standard output', 2, ['--netlist', '-']],
    ['a place that is not there', 2, ['--netlist', '/none/such/a.cir']],
  ])('%s ends with %i', (_what, code, args) => {
    expect(work.run(['scan', work.file(site()), ...args, '--json']).code).toBe(code);
  });

  it('leaves neither file where the second cannot be written', () => {
    mkdirSync(out('half.inrush.cir'));
    const { code } = work.run(['scan', work.file(site()), '--netlist', out('half.cir'), '--json']);
    expect(code).toBe(2);
    expect(existsSync(out('half.cir'))).toBe(false);
  });
});
