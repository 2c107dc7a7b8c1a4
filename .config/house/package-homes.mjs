// Each heavy package has one named home, and some are loaded in one way only.
import ts from 'typescript';
import { judgeImports } from './import-direction.mjs';
import { lineOf } from './read-house.mjs';

/** @typedef {import('./read-house.mjs').Breach} Breach */
/** @typedef {import('./read-house.mjs').Rule} Rule */
/** @typedef {import('./read-house.mjs').Module} Module */

/** @type {Record<string, string[]>} */
const PACKAGE_HOMES = {
  zod: ['libs/contract'],
  mathjs: ['libs/contract'],
  papaparse: ['libs/meter-files'],
  sax: ['libs/meter-files'],
  yauzl: ['libs/meter-files'],
  hyparquet: ['libs/meter-files'],
  pdfkit: ['libs/proposal'],
  'dejavu-fonts-ttf': ['libs/proposal'],
  '@expo-google-fonts/sofia-sans-semi-condensed': ['libs/proposal'],
  typeorm: ['libs/store', 'migrations'],
  'better-sqlite3': ['libs/store'],
  pg: ['libs/store', 'libs/jobs'],
  piscina: ['libs/jobs'],
  'reflect-metadata': ['libs/store', 'apps/server'],
  '@nestjs': ['apps/server'],
  '@fastify': ['apps/server'],
  fastify: ['apps/server'],
  rxjs: ['apps/server'],
  pino: ['apps/server', 'apps/cli'],
  react: ['apps/web'],
  'react-dom': ['apps/web'],
};

/** What the page loads or the engine is made of runs in a browser too. */
const WITHOUT_RUNTIME = ['libs/engine', 'libs/contract', 'libs/present', 'libs/review', 'apps/web'];
const FREE = ['test', '.config'];

/** @type {Rule} */
const packageHomes = {
  name: 'package-homes',
  why: 'a package is imported only in the home the table names; the engine and present import none',
  find: (house) =>
    judgeImports(house, (module, { packageName }) => {
      if (packageName === null || module.spec || FREE.includes(module.home)) return null;
      if (packageName === 'node:') {
        return WITHOUT_RUNTIME.includes(module.home) ? `${module.home} may not import from node:` : null;
      }
      const allowed = PACKAGE_HOMES[packageName] ?? PACKAGE_HOMES[packageName.split('/')[0] ?? ''];
      if (allowed === undefined) return `${packageName} has no home in the table of packages`;
      return allowed.includes(module.home) ? null : `${packageName} lives in ${allowed.join(', ')}`;
    }),
};

/** @type {Rule} */
const zodForm = {
  name: 'zod-form',
  why: 'zod stands only in files of schemas, always as `import * as z`: the named import costs the page three times as much',
  find: (house) =>
    judgeImports(house, (module, { packageName, namespace }) => {
      if (packageName !== 'zod' || FREE.includes(module.home)) return null;
      if (!namespace) return 'write import * as z';
      return module.spec || /schema/.test(module.path.split('/').at(-1) ?? '') ? null : 'not a file of schemas';
    }),
};

/** @type {Rule} */
const lazyMathjs = {
  name: 'lazy-mathjs',
  why: 'mathjs takes seconds to load, so it is imported only where it is first used, by await import()',
  find: (house) =>
    judgeImports(house, (module, { packageName, dynamic }) =>
      packageName === 'mathjs' && !dynamic && !module.spec && !FREE.includes(module.home)
        ? 'import mathjs by await import()'
        : null,
    ),
};

const AMBIENT = new Set(
  'console process performance setTimeout setInterval setImmediate queueMicrotask fetch crypto globalThis Intl Buffer require'.split(
    ' ',
  ),
);
const AMBIENT_MEMBERS = new Set(['Math.random', 'Date.now']);
const LOCAL_CLOCK = /^(get|set)(Date|Day|FullYear|Hours|Minutes|Month|TimezoneOffset)$/;
const LOCALE = /^(toLocale\w*|localeCompare)$/;
const PURE = ['libs/engine', 'libs/present', 'libs/review'];
/** Time zones of any machine, and the decimal mark of the reader before the page. */
const LOCALE_HOMES = ['libs/contract/time-zone.ts', 'apps/web/readers-mark.ts'];

/** @type {Rule} */
const pure = {
  name: 'pure',
  why: 'the engine, present and review know no clock, no chance, no console, no locale: same input, same output to the bit',
  find: (house) =>
    house.modules
      .filter((module) => PURE.includes(module.home) && !module.spec)
      .flatMap((module) => findNodes(module, ambientUse)),
};

/** @type {Rule} */
const timeZoneHome = {
  name: 'intl-home',
  why: 'only libs/contract/time-zone.ts calls Intl, and only the page asks for its reader’s decimal mark; nothing else lets the machine’s locale decide anything',
  find: (house) =>
    house.modules
      .filter((module) => /^(libs|apps|migrations)/.test(module.home) && !module.spec)
      .filter((module) => !LOCALE_HOMES.includes(module.path))
      .flatMap((module) => findNodes(module, localeUse)),
};

/**
 * @param {Module} module
 * @param {(node: ts.Node) => string | null} judge
 */
function findNodes(module, judge) {
  /** @type {Breach[]} */
  const found = [];
  /** @param {ts.Node} node */
  const visit = (node) => {
    const message = judge(node);
    if (message !== null) found.push({ file: module.path, line: lineOf(module.tree, node), message });
    ts.forEachChild(node, visit);
  };
  visit(module.tree);
  return found;
}

/** @param {ts.Node} node */
function ambientUse(node) {
  if (ts.isNewExpression(node) && node.expression.getText() === 'Date' && (node.arguments ?? []).length === 0) {
    return 'new Date() reads the clock';
  }
  if (ts.isCallExpression(node) && node.expression.getText() === 'Date') return 'Date() reads the clock';
  if (ts.isPropertyAccessExpression(node)) {
    if (AMBIENT_MEMBERS.has(node.getText())) return `${node.getText()} is not a function of the input`;
    if (LOCAL_CLOCK.test(node.name.text)) return `${node.name.text} depends on the machine’s zone`;
    return LOCALE.test(node.name.text) ? `${node.name.text} depends on the machine’s locale` : null;
  }
  return isFreeIdentifier(node) && AMBIENT.has(node.text) ? `${node.text} is outside the engine` : null;
}

/** @param {ts.Node} node */
function localeUse(node) {
  if (isFreeIdentifier(node) && node.text === 'Intl') return 'Intl stands in libs/contract/time-zone.ts only';
  return ts.isPropertyAccessExpression(node) && LOCALE.test(node.name.text)
    ? `${node.name.text} depends on the machine’s locale`
    : null;
}

/**
 * Whether a node is a name looked up in the scope, rather than the name of a member.
 * @param {ts.Node} node
 * @returns {node is ts.Identifier}
 */
function isFreeIdentifier(node) {
  if (!ts.isIdentifier(node)) return false;
  const parent = node.parent;
  if (ts.isPropertyAccessExpression(parent)) return parent.name !== node;
  if (ts.isQualifiedName(parent)) return parent.right !== node;
  const member =
    ts.isPropertyAssignment(parent) ||
    ts.isPropertySignature(parent) ||
    ts.isPropertyDeclaration(parent) ||
    ts.isMethodDeclaration(parent) ||
    ts.isMethodSignature(parent);
  return !(member && parent.name === node);
}

/** @type {Rule[]} */
export const packageRules = [packageHomes, zodForm, lazyMathjs, pure, timeZoneHome];
