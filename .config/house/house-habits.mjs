// How the house is laid out: sizes, names, the top level, docstrings and their sources.
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import ts from 'typescript';
import { lineOf } from './read-house.mjs';

/** @typedef {import('./read-house.mjs').Breach} Breach */
/** @typedef {import('./read-house.mjs').Rule} Rule */
/** @typedef {import('./read-house.mjs').House} House */
/** @typedef {import('./read-house.mjs').Module} Module */

const LONGEST = 300;

/** @type {Rule} */
const fileLength = {
  name: 'file-length',
  why: `a file has at most ${LONGEST} lines, unless a line beginning "// long:" gives the reason`,
  find: (house) =>
    house.modules.flatMap((module) => {
      const lines = module.text.replace(/\n$/, '').split('\n').length;
      if (lines <= LONGEST || /^\/\/ long: \S/m.test(module.text)) return [];
      return [{ file: module.path, line: LONGEST + 1, message: `${lines} lines` }];
    }),
};

const NO_NAMES = /^(utils?|common|helpers?|types|misc|mappers?|shared)$/;
const KEBAB = /^[a-z0-9]+(-[a-z0-9]+)*$/;

/** @type {Rule} */
const names = {
  name: 'names',
  why: 'folders and files carry trade words in kebab-case; no barrel but the engine’s door',
  find: (house) =>
    house.modules.flatMap(({ path }) => {
      const parts = path.split('/').map((part) => part.replace(/^\./, ''));
      const file = parts.pop() ?? '';
      const stem = file.replace(/(\.(spec|config|bench|d))?\.(ts|tsx|mts|mjs)$/, '');
      /** @type {string[]} */
      const faults = [];
      for (const part of [...parts, stem]) {
        if (NO_NAMES.test(part)) faults.push(`"${part}" says nothing of what it holds`);
        if (!KEBAB.test(part)) faults.push(`"${part}" is not kebab-case`);
      }
      if (stem === 'index' && path !== 'libs/engine/index.ts') faults.push('only the engine has an index');
      return faults.map((message) => ({ file: path, line: 1, message }));
    }),
};

const TOP_LEVEL = [
  'apps',
  'libs',
  'migrations',
  'test',
  'LICENSE',
  'README.md',
  'DEVELOPERS.md',
  'nest-cli.json',
  'package.json',
  'package-lock.json',
  'tsconfig.json',
];
const MADE = ['node_modules', 'dist', 'var'];

/** @type {Rule} */
const topLevel = {
  name: 'top-level',
  why: 'the top level holds the agreed entries and no more; settings of tools stand in .config',
  find({ topLevel: entries }) {
    const extra = entries.filter((name) => !name.startsWith('.') && ![...TOP_LEVEL, ...MADE].includes(name));
    const absent = TOP_LEVEL.filter((name) => !entries.includes(name));
    return [
      ...extra.map((name) => ({ file: name, line: 1, message: 'not among the agreed entries' })),
      ...absent.map((name) => ({ file: name, line: 1, message: 'missing' })),
    ];
  },
};

/** @type {Rule} */
const nestProjects = {
  name: 'nest-cli',
  why: 'nest-cli.json has an entry for each app and each lib, and for nothing else',
  find({ root }) {
    const file = join(root, 'nest-cli.json');
    if (!existsSync(file)) return [];
    /** @type {{ projects?: Record<string, { root: string, type: string }> }} */
    const { projects = {} } = JSON.parse(readFileSync(file, 'utf8'));
    const said = Object.entries(projects).map(([name, { root: at, type }]) => `${type} ${at} as ${name}`);
    const stand = [...projectFolders(root, 'apps', 'application'), ...projectFolders(root, 'libs', 'library')];
    return [
      ...stand.filter((line) => !said.includes(line)).map((line) => `no entry for ${line}`),
      ...said.filter((line) => !stand.includes(line)).map((line) => `no folder for ${line}`),
    ].map((message) => ({ file: 'nest-cli.json', line: 1, message }));
  },
};

/**
 * @param {string} root
 * @param {string} folder
 * @param {string} type
 */
function projectFolders(root, folder, type) {
  if (!existsSync(join(root, folder))) return [];
  return readdirSync(join(root, folder), { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map((entry) => `${type} ${folder}/${entry.name} as ${entry.name}`);
}

/** @type {Rule} */
const docstrings = {
  name: 'docstrings',
  why: 'every export of the engine has a docstring; a function names each parameter and what it returns',
  find: (house) => engineExports(house).flatMap(({ module, node }) => docFaults(module, node)),
};

/** @param {House} house */
function engineExports(house) {
  return house.modules
    .filter((module) => module.home === 'libs/engine' && !module.spec)
    .flatMap((module) => module.tree.statements.filter(isExported).map((node) => ({ module, node })));
}

/** @param {ts.Statement} node */
function isExported(node) {
  if (ts.isExportDeclaration(node)) return false;
  // The type of a documented list of names, as in (typeof CODES)[number], has nothing to add.
  if (ts.isTypeAliasDeclaration(node) && ts.isIndexedAccessTypeNode(node.type)) return false;
  return ts.canHaveModifiers(node) && node.modifiers?.some(({ kind }) => kind === ts.SyntaxKind.ExportKeyword);
}

/**
 * @param {Module} module
 * @param {ts.Statement} node
 * @returns {Breach[]}
 */
function docFaults(module, node) {
  const say = (/** @type {string} */ message) => [{ file: module.path, line: lineOf(module.tree, node), message }];
  const name = nameOf(node);
  const docs = ts.getJSDocCommentsAndTags(node).filter(ts.isJSDoc);
  const sentence = docs.map((doc) => ts.getTextOfJSDocComment(doc.comment) ?? '').join(' ');
  if (!/\w/.test(sentence)) return say(`${name} has no docstring`);
  if (!ts.isFunctionDeclaration(node)) return [];
  const tags = ts.getJSDocTags(node);
  const described = tags.filter(ts.isJSDocParameterTag).map((tag) => tag.name.getText().split('.')[0]);
  const missing = node.parameters
    .filter(({ name: own }) => (ts.isIdentifier(own) ? !described.includes(own.text) : described.length === 0))
    .flatMap(({ name: own }) => say(`${name}: no @param ${own.getText()}`));
  const returnsNothing = node.type === undefined || /^(void|never)$/.test(node.type.getText());
  const silent = !returnsNothing && !tags.some(ts.isJSDocReturnTag);
  return silent ? [...missing, ...say(`${name}: no @returns`)] : missing;
}

/** @param {ts.Statement} node */
function nameOf(node) {
  if (ts.isVariableStatement(node)) return node.declarationList.declarations.map((d) => d.name.getText()).join(', ');
  return 'name' in node && node.name !== undefined ? /** @type {ts.Identifier} */ (node.name).text : 'export';
}

/** @type {Rule} */
const sources = {
  name: 'sources',
  why: 'what @source names is a line of libs/engine/SOURCES.md, or the word derived',
  find(house) {
    const known = sourceIds(house.root);
    return house.modules
      .filter((module) => module.home === 'libs/engine' && !module.spec)
      .flatMap((module) =>
        module.text.split('\n').flatMap((line, index) => {
          const said = /@source\s+(.*)/.exec(line)?.[1];
          if (said === undefined || said.startsWith('derived')) return [];
          const unknown = namedSources(said).filter((id) => !known.has(id));
          return unknown.map((id) => ({ file: module.path, line: index + 1, message: `unknown source "${id}"` }));
        }),
      );
  },
};

/**
 * The ids a line names: its first word, and each further part that is an id as a whole; brackets hold remarks.
 * @param {string} said
 */
function namedSources(said) {
  const parts = said
    .replace(/\([^)]*\)/g, '')
    .split(/[;,]| and /)
    .map((part) => part.replace(/\*\/$/, '').trim());
  const [first = '', ...further] = parts;
  return [first.split(/[\s:]/)[0] ?? '', ...further.filter((part) => /^[a-z]\w*(-\w+)+$/.test(part))];
}

/**
 * The ids of the bibliography: the first word of a list item, a heading or a table row.
 * @param {string} root
 */
function sourceIds(root) {
  const file = join(root, 'libs', 'engine', 'SOURCES.md');
  const text = existsSync(file) ? readFileSync(file, 'utf8') : '';
  const found = text.matchAll(/^(?:(?:[-*|#]+|\d+\.)\s*)*[`*[]*([a-z]\w*(?:-\w+)+)/gm);
  return new Set([...found].map(([, id]) => id));
}

/** @type {Rule[]} */
export const habitRules = [fileLength, names, topLevel, nestProjects, docstrings, sources];
