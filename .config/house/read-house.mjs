// The source as the rules see it: every module with its text, its syntax tree and what it imports.
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join, posix } from 'node:path';
import ts from 'typescript';

/**
 * @typedef {object} Import
 * @property {string} specifier as written
 * @property {string | null} target the module meant, as a path from the root; null for a package
 * @property {string | null} packageName null for a module of ours; `node:` for what the runtime brings
 * @property {number} line counted from 1
 * @property {boolean} dynamic `await import()`
 * @property {boolean} namespace `import * as`
 *
 * @typedef {object} Module
 * @property {string} path from the root, with forward slashes
 * @property {string} home `libs/engine`, `apps/cli`, `migrations`, `test`, `.config`
 * @property {boolean} spec
 * @property {string} text
 * @property {ts.SourceFile} tree
 * @property {Import[]} imports
 *
 * @typedef {object} House
 * @property {string} root
 * @property {Module[]} modules
 * @property {string[]} topLevel
 *
 * @typedef {{ file: string, line: number, message: string }} Breach
 * @typedef {{ name: string, why: string, find: (house: House) => Breach[] }} Rule
 */

const SOURCE_FOLDERS = ['apps', 'libs', 'migrations', 'test', '.config'];

/**
 * @param {string} root
 * @returns {House}
 */
export function readHouse(root) {
  const paths = SOURCE_FOLDERS.flatMap((folder) => modulePaths(root, folder)).sort();
  const modules = paths.map((path) => readModule(root, path));
  // A component is imported by the name of what it compiles to, as every module is.
  const components = new Map(paths.filter((path) => path.endsWith('.tsx')).map((path) => [path.slice(0, -1), path]));
  for (const entry of modules.flatMap(({ imports }) => imports)) {
    entry.target = components.get(entry.target ?? '') ?? entry.target;
  }
  return { root, modules, topLevel: readdirSync(root).sort() };
}

/**
 * @param {string} root
 * @param {string} folder
 */
function modulePaths(root, folder) {
  if (!existsSync(join(root, folder))) return [];
  return readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|tsx|mts|mjs)$/.test(entry.name) && !entry.name.endsWith('.d.ts'))
    .map((entry) => posix.join(folder, posix.relative(join(root, folder), posix.join(entry.parentPath, entry.name))));
}

/**
 * @param {string} root
 * @param {string} path
 * @returns {Module}
 */
function readModule(root, path) {
  const text = readFileSync(join(root, path), 'utf8');
  const tree = ts.createSourceFile(path, text, ts.ScriptTarget.ESNext, true);
  return { path, home: homeOf(path), spec: isTest(path), text, tree, imports: importsOf(path, tree) };
}

/** @param {string} path */
function isTest(path) {
  return /\.spec\.tsx?$/.test(path) || path.startsWith('test/');
}

/** @param {string} path */
export function homeOf(path) {
  const [first = '', second = ''] = path.split('/');
  return first === 'libs' || first === 'apps' ? `${first}/${second}` : first;
}

/**
 * @param {string} path
 * @param {ts.SourceFile} tree
 * @returns {Import[]}
 */
function importsOf(path, tree) {
  /** @type {Import[]} */
  const found = [];
  /** @param {ts.Node} node */
  const visit = (node) => {
    const literal = specifierOf(node);
    if (literal !== undefined && ts.isStringLiteralLike(literal)) {
      const specifier = literal.text;
      const target = resolve(path, specifier);
      found.push({
        specifier,
        target,
        packageName: target === null ? packageOf(specifier) : null,
        line: lineOf(tree, literal),
        dynamic: ts.isCallExpression(node),
        namespace:
          ts.isImportDeclaration(node) &&
          node.importClause?.name === undefined &&
          node.importClause?.namedBindings?.kind === ts.SyntaxKind.NamespaceImport,
      });
    }
    ts.forEachChild(node, visit);
  };
  visit(tree);
  return found;
}

/**
 * What a node imports from: of an import, a re-export, `import()`, `require()` or a type `import('…').Name`.
 * @param {ts.Node} node
 * @returns {ts.Node | undefined}
 */
function specifierOf(node) {
  if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) return node.moduleSpecifier;
  if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) return node.argument.literal;
  if (!ts.isCallExpression(node)) return undefined;
  const called = node.expression;
  const imports = called.kind === ts.SyntaxKind.ImportKeyword || (ts.isIdentifier(called) && called.text === 'require');
  return imports ? node.arguments[0] : undefined;
}

/**
 * @param {string} from
 * @param {string} specifier
 */
function resolve(from, specifier) {
  if (specifier.startsWith('#')) return specifier.slice(1).replace(/\.js$/, '.ts');
  if (!specifier.startsWith('.')) return null;
  return posix.join(posix.dirname(from), specifier).replace(/\.js$/, '.ts');
}

/** @param {string} specifier */
function packageOf(specifier) {
  if (specifier.startsWith('node:')) return 'node:';
  return specifier
    .split('/')
    .slice(0, specifier.startsWith('@') ? 2 : 1)
    .join('/');
}

/**
 * @param {ts.SourceFile} tree
 * @param {ts.Node} node
 */
export function lineOf(tree, node) {
  return tree.getLineAndCharacterOfPosition(node.getStart(tree)).line + 1;
}
