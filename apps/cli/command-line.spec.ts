import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { readCommandLine } from './command-line.js';
import { COMMANDS, helpOf, overview } from './commands.js';

const plan = COMMANDS.plan!;

function problemsOf(args: string[]) {
  try {
    readCommandLine('plan', plan, args);
  } catch (error) {
    if (error instanceof InputProblem) return error.problems;
    throw error;
  }
  return [];
}

describe('the arguments of a command', () => {
  it('may stand in any order, values after a blank or an equals sign', () => {
    const line = readCommandLine('plan', plan, ['--json', '--load=load.csv', 'site.json', '--pdf', 'out.pdf']);
    expect(line).toEqual({
      command: 'plan',
      operand: 'site.json',
      operands: ['site.json'],
      loads: ['load.csv'],
      values: new Map([['pdf', 'out.pdf']]),
      lists: new Map([['load', ['load.csv']]]),
      flags: new Set(['json']),
    });
  });

  it('may hold further meter files, in the order they were typed', () => {
    const args = ['site.json', '--extend', 'b.csv', '--load', 'a.csv', '--extend=c.csv'];
    expect(readCommandLine('plan', plan, args).lists.get('extend')).toEqual(['b.csv', 'c.csv']);
  });

  it('may be several sites, each with its meter file', () => {
    const line = readCommandLine('plan', plan, ['a.json', '--load', 'a.csv', 'b.json', '--load=b.csv']);
    expect([line.operands, line.loads]).toEqual([
      ['a.json', 'b.json'],
      ['a.csv', 'b.csv'],
    ]);
    expect(() => readCommandLine('assess', COMMANDS.assess!, ['a.json', 'b.json'])).toThrow(
      /one SITE, found a\.json b/,
    );
  });

  it('may be "-" for standard input, once', () => {
    expect(problemsOf(['-', '--load', 'load.csv'])).toEqual([]);
    expect(problemsOf(['site.json', '--load', '-'])).toEqual([]);
    expect(problemsOf(['site.json', '--load', '-', '--extend', '-'])).toHaveLength(1);
    expect(problemsOf(['-', '--load', '-'])).toEqual([
      { code: 'usage', expected: '"-" for one file only', found: 'it 2 times' },
    ]);
  });

  it.each([
    ['no operand', [], 'one SITE', 'none'],
    [
      'a site without its meter file',
      ['a', 'b', '--load', 'c'],
      'a --load for each of the 2 SITE, in their order, or none',
      '1',
    ],
    ['a proposal of several sites', ['a', 'b', '--pdf', 'c'], '--pdf with one SITE only', '2'],
    ['an option without its value', ['a', '--load'], '--load METER-FILE', 'no value'],
    ['a further file without its name', ['a', '--extend'], '--extend METER-FILE', 'no value'],
    ['an option with an empty value', ['a', '--load='], '--load METER-FILE', 'no value'],
    ['a flag with a value', ['a', '--json=yes'], '--json without a value', '"yes"'],
    ['an option twice', ['a', '--load', 'b', '--load', 'c'], '--load once', 'it twice'],
    ['a proposal on standard output', ['a', '--pdf', '-'], '--pdf with the name of a file', '"-"'],
    [
      'an unknown option',
      ['a', '--lod', '--json'],
      'one of --pdf, --paper, --logo, --language, --export, --calculation, --figures, --format, --map, --time-zone, --load, --extend, --json',
      '--lod',
    ],
    [
      'a short option',
      ['a', '-j'],
      'one of --pdf, --paper, --logo, --language, --export, --calculation, --figures, --format, --map, --time-zone, --load, --extend, --json',
      '-j',
    ],
    [
      'a name of the language',
      ['a', '--constructor'],
      'one of --pdf, --paper, --logo, --language, --export, --calculation, --figures, --format, --map, --time-zone, --load, --extend, --json',
      '--constructor',
    ],
  ])('with %s are refused, naming it', (_what, args, expected, found) => {
    expect(problemsOf(args)).toEqual([{ code: 'usage', expected, found }]);
  });

  it('are refused with everything that is wrong at once', () => {
    expect(problemsOf(['--lod', 'x', 'y', '--load', 'z', '--json=1'])).toHaveLength(3);
  });
});

describe('the help', () => {
  it('names every command, and every option of each', () => {
    for (const [name, { values, lists, flags }] of Object.entries(COMMANDS)) {
      expect(overview()).toContain(name);
      for (const option of [...Object.keys(values), ...Object.keys(lists), ...flags])
        expect(helpOf(name)).toContain(`--${option} `);
    }
  });
});
