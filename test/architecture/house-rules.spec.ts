import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { houseRules } from '../../.config/house/house-rules.mjs';
import { readHouse } from '../../.config/house/read-house.mjs';

/** A house that keeps every rule: each control plants one breach in it. */
const soundHouse: Record<string, string> = {
  'libs/engine/index.ts': "export * from './plan/plan-bank.js';\n",
  'libs/engine/problem.ts': '/** What is wrong. */\nexport class InputProblem extends Error {}\n',
  'libs/engine/SOURCES.md': '# Sources\n- `iec-60050-131`: a vocabulary, part 131\n',
  'libs/engine/quantity/power-factor.ts': `import { InputProblem } from '../problem.js';
/**
 * Active over apparent power.
 * @param activeKw [kW]
 * @returns power factor
 * @source iec-60050-131 (power factor), taken over means
 */
export function powerFactor(activeKw: number): number {
  if (activeKw < 0) throw new InputProblem();
  return activeKw;
}
`,
  'libs/engine/plan/plan-bank.ts':
    "/** A power factor. */\nexport { powerFactor } from '../quantity/power-factor.js';\n",
  'libs/contract/site-schema.ts': "import * as z from 'zod';\nexport const name = z.string();\n",
  'libs/contract/time-zone.ts': 'export const zone = Intl.DateTimeFormat;\n',
  'libs/contract/formula.ts': "export const parse = async () => (await import('mathjs')).parse;\n",
  'libs/contract/formula.spec.ts':
    "import { parse } from 'mathjs';\nimport '../../test/support/sites.js';\nparse('1');\n",
  'libs/store/store.ts': "import 'typeorm';\nimport '#libs/contract/site-schema.js';\n",
  'libs/jobs/pool.ts': "import 'piscina';\nimport '#libs/engine/index.js';\n",
  'apps/cli/main.ts': "import 'node:fs';\nimport '#libs/jobs/pool.js';\nimport '#libs/engine/index.js';\n",
  'apps/server/main.ts': "import '@nestjs/core';\nimport '#libs/store/store.js';\n",
  'test/support/sites.ts': "import '#libs/engine/index.js';\n",
  'migrations/first.ts': "import 'typeorm';\n",
  'nest-cli.json': JSON.stringify({
    projects: {
      ...Object.fromEntries(['cli', 'server'].map((name) => [name, { type: 'application', root: `apps/${name}` }])),
      ...Object.fromEntries(
        ['engine', 'contract', 'store', 'jobs'].map((name) => [name, { type: 'library', root: `libs/${name}` }]),
      ),
    },
  }),
  ...Object.fromEntries(
    ['LICENSE', 'README.md', 'DEVELOPERS.md', 'package.json', 'package-lock.json', 'tsconfig.json'].map((f) => [f, '']),
  ),
};

const plain = (body: string) => `/** Something. */\nexport const something = () => ${body};\n`;
const doc = '/** A sentence. */\n';

/** One breach a row: the rule that must see it, the file it is planted in, and what that file then holds. */
const controls: [rule: string, file: string, text: string][] = [
  ['stage-order', 'libs/engine/quantity/ohm.ts', "import '../plan/plan-bank.js';\n"],
  ['stage-order', 'libs/engine/record/record.ts', "import type { A } from '../supply/supply.js';\nlet a: A;\n"],
  ['stage-order', 'libs/engine/record/record.ts', "let a: import('../network/scan.js').A;\n"],
  ['stage-order', 'libs/engine/record/record.ts', "import '../index.js';\n"],
  ['stage-order', 'libs/engine/problem.ts', "import './quantity/power-factor.js';\n"],
  ['stage-order', 'libs/engine/record/record.spec.ts', "import '../plan/plan-bank.js';\n"],
  ['stage-order', 'libs/engine/weather/rain.ts', ''],
  ['stage-order', 'libs/engine/loose.ts', ''],
  ['homes', 'libs/contract/reader.ts', "import '#libs/store/store.js';\n"],
  ['homes', 'libs/contract/reader.ts', "export { x } from '#apps/server/main.js';\n"],
  ['homes', 'libs/contract/reader.spec.ts', "import '#apps/server/main.js';\n"],
  ['homes', 'libs/contract/reader.ts', "import '../../test/support/sites.js';\n"],
  ['homes', 'libs/engine/record/record.ts', "import '#libs/contract/site-schema.js';\n"],
  ['homes', 'apps/cli/plan.ts', "import '#libs/store/store.js';\n"],
  ['homes', 'apps/cli/plan.ts', "await import('#libs/jobs/queue.js');\n"],
  ['homes', 'apps/cli/plan.ts', "import '#apps/server/main.js';\n"],
  ['homes', 'libs/newcomer/new.ts', "import '#libs/engine/index.js';\n"],
  ['pool-alone', 'libs/jobs/pool-worker.ts', "import '#libs/store/store.js';\n"],
  ['pool-alone', 'libs/jobs/pool.ts', "import './queue.js';\n"],
  ['engine-door', 'libs/contract/reader.ts', "import '#libs/engine/quantity/power-factor.js';\n"],
  ['engine-door', 'test/oracle/pf.spec.ts', "import '#libs/engine/quantity/power-factor.js';\n"],
  ['import-form', 'libs/contract/reader.ts', "import './site-schema';\n"],
  ['import-form', 'libs/contract/reader.ts', "import '../engine/index.js';\n"],
  ['import-form', 'libs/contract/reader.ts', "import '#libs/contract/site-schema.js';\n"],
  ['no-cycles', 'libs/contract/time-zone.ts', "import './time-zone.js';\n"],
  ['no-cycles', 'libs/engine/quantity/power-factor.ts', "import '../plan/plan-bank.js';\n"],
  ['package-homes', 'libs/contract/reader.ts', "import type { DataSource } from 'typeorm';\nlet a: DataSource;\n"],
  ['package-homes', 'libs/contract/reader.ts', "await import('pdfkit');\n"],
  ['package-homes', 'libs/contract/reader.ts', "import 'node:fs';\n"],
  ['package-homes', 'libs/engine/record/record.ts', "import 'papaparse';\n"],
  ['package-homes', 'libs/engine/record/record.ts', "import { createHash } from 'node:crypto';\ncreateHash('');\n"],
  ['package-homes', 'libs/store/nest.ts', "import { Injectable } from '@nestjs/common';\nInjectable();\n"],
  ['package-homes', 'apps/server/pool.ts', "import 'piscina';\n"],
  ['package-homes', 'apps/server/new.ts', "import 'left-pad';\n"],
  ['zod-form', 'libs/contract/reader.ts', "import * as z from 'zod';\nz.string();\n"],
  ['zod-form', 'libs/contract/site-schema.ts', "import { z } from 'zod';\nz.string();\n"],
  ['lazy-mathjs', 'libs/contract/formula.ts', "import { parse } from 'mathjs';\nparse('1');\n"],
  ...['Date.now()', 'new Date()', 'Date()', 'Math.random()', 'console.log(1)', 'process.env', 'performance.now()'].map(
    (body): [string, string, string] => ['pure', 'libs/engine/record/record.ts', plain(body)],
  ),
  ['pure', 'libs/engine/record/record.ts', plain('new Date(0).getHours()')],
  ['pure', 'libs/engine/record/record.ts', plain("'a'.localeCompare('b')")],
  ['pure', 'libs/engine/record/record.ts', plain('new Intl.NumberFormat()')],
  ['intl-home', 'libs/contract/reader.ts', plain('new Intl.NumberFormat()')],
  ['intl-home', 'libs/store/store.ts', plain('(1).toLocaleString()')],
  ['intl-home', 'apps/web/page.ts', plain('(1).toLocaleString()')],
  ['file-length', 'libs/contract/reader.ts', 'let a = 0;\n'.repeat(301)],
  ['names', 'libs/contract/utils.ts', ''],
  ['names', 'libs/contract/helpers/day.ts', ''],
  ['names', 'libs/contract/ReadSite.ts', ''],
  ['names', 'libs/contract/index.ts', ''],
  ['top-level', 'vite.config.ts', ''],
  ['nest-cli', 'libs/proposal/render.ts', ''],
  ['nest-cli', 'nest-cli.json', '{}'],
  ['docstrings', 'libs/engine/record/record.ts', 'export const x = 1;\n'],
  ['docstrings', 'libs/engine/record/record.ts', 'export interface Watch {}\n'],
  ['docstrings', 'libs/engine/record/record.ts', `${doc}export function f(aKw: number) {\n  aKw++;\n}\n`],
  ['docstrings', 'libs/engine/record/record.ts', `${doc}export function f(): number {\n  return 1;\n}\n`],
  [
    'docstrings',
    'libs/engine/record/record.ts',
    '/** @returns one */\nexport function f(): number {\n  return 1;\n}\n',
  ],
  ['sources', 'libs/engine/record/record.ts', '/** @source iec-99999 (all of it) */\n'],
  ['sources', 'libs/engine/record/record.ts', '/**\n * @source iec-60050-131 (this); no-such-book\n */\n'],
  ['sources', 'libs/engine/record/record.ts', '/** @source a book I once saw */\n'],
];

function rulesBrokenBy(files: Record<string, string>): string[] {
  const root = mkdtempSync(join(tmpdir(), 'varwright-house-'));
  try {
    for (const [file, text] of Object.entries(files)) {
      mkdirSync(dirname(join(root, file)), { recursive: true });
      writeFileSync(join(root, file), text);
    }
    const house = readHouse(root);
    return houseRules.filter((rule) => rule.find(house).length > 0).map((rule) => rule.name);
  } finally {
    rmSync(root, { recursive: true });
  }
}

describe('the rules of the house', () => {
  const root = fileURLToPath(new URL('../..', import.meta.url));
  const house = readHouse(root);

  test.each(houseRules)('$name holds: $why', (rule) => {
    expect(rule.find(house)).toEqual([]);
  });

  test('see the modules they are to judge', () => {
    // A walk that finds nothing would keep every rule.
    const homes = new Set(house.modules.map((module) => module.home));
    expect([...homes]).toEqual(
      expect.arrayContaining(['libs/engine', 'apps/server', 'apps/cli', 'migrations', 'test']),
    );
    expect(house.modules.flatMap((module) => module.imports).length).toBeGreaterThan(house.modules.length);
  });
});

describe('controls', () => {
  test('a sound house breaks no rule', () => {
    expect(rulesBrokenBy(soundHouse)).toEqual([]);
  });

  test.each(controls)('%s catches its breach planted in %s: %j', (rule, file, text) => {
    expect(rulesBrokenBy({ ...soundHouse, [file]: text })).toContain(rule);
  });

  test('a stated reason lets a long file pass', () => {
    const long = `// long: a table of limits\n${'let a = 0;\n'.repeat(301)}`;
    expect(rulesBrokenBy({ ...soundHouse, 'libs/contract/reader.ts': long })).toEqual([]);
  });

  test('every rule has a control', () => {
    const covered = new Set(controls.map(([rule]) => rule));
    expect(houseRules.map((rule) => rule.name).filter((name) => !covered.has(name))).toEqual([]);
  });
});
