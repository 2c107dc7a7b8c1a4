import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import ts from 'typescript';

const LIBS = fileURLToPath(new URL('../../libs', import.meta.url));
/** Texts of these properties are no words: they say how a column stands. */
const NO_WORDS = new Set(['align']);

/** Keys of words in the source, by the files that hold them. */
export type SourceTexts = Map<string, string[]>;

/**
 * Every text that the source of papers looks up in a catalogue: the templates of say`…` and the texts of words(…).
 * @returns keys as a catalogue has them, with the files they stand in; texts without a letter are left out
 */
export function sourceTexts(): SourceTexts {
  const found: SourceTexts = new Map();
  for (const folder of ['present', 'proposal']) {
    const files = readdirSync(join(LIBS, folder)).filter((file) => /(?<!\.spec)\.ts$/.test(file));
    for (const file of files) textsInto(found, file, readFileSync(join(LIBS, folder, file), 'utf8'));
  }
  return found;
}

/**
 * Adds the keys of one file.
 * @param found what was found so far
 * @param file its name
 * @param source its text
 */
export function textsInto(found: SourceTexts, file: string, source: string): void {
  const add = (key: string) => {
    if (hasWords(key)) found.set(key, [...(found.get(key) ?? []), file]);
  };
  const visit = (node: ts.Node): void => {
    if (ts.isTaggedTemplateExpression(node) && node.tag.getText() === 'say') add(keyOf(node.template));
    if (ts.isCallExpression(node) && node.expression.getText() === 'words') {
      for (const table of node.arguments) for (const text of tableTexts(table)) add(text);
    }
    ts.forEachChild(node, visit);
  };
  visit(ts.createSourceFile(file, source, ts.ScriptTarget.Latest, true));
}

/** A text is looked up in vain where nothing but values and signs stands in it; quotation marks differ by language. */
function hasWords(key: string): boolean {
  return /[\p{L}“]/u.test(key.replace(/\{\w+\}/g, ''));
}

function keyOf(template: ts.TemplateLiteral): string {
  const parts = ts.isTemplateExpression(template)
    ? [template.head.text, ...template.templateSpans.map(({ literal }) => literal.text)]
    : [template.text];
  return parts.map((part) => part.replace(/\n\s*/g, ' ')).reduce((key, part, at) => `${key}{${at - 1}}${part}`);
}

function tableTexts(node: ts.Node): string[] {
  const text = constantText(node);
  if (text !== null) return [text];
  if (ts.isPropertyAssignment(node)) return NO_WORDS.has(node.name.getText()) ? [] : tableTexts(node.initializer);
  const texts: string[] = [];
  ts.forEachChild(node, (child) => {
    texts.push(...tableTexts(child));
  });
  return texts;
}

/** A text, or the sum of several. */
function constantText(node: ts.Node): string | null {
  if (ts.isStringLiteralLike(node)) return node.text;
  if (!ts.isBinaryExpression(node)) return null;
  const [left, right] = [constantText(node.left), constantText(node.right)];
  return left === null || right === null ? null : left + right;
}
