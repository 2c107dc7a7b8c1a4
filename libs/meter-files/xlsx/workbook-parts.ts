import { InputProblem } from '#libs/engine/index.js';
import { damaged } from '../sheet/read-sheet-text.js';
import { readXml, type XmlListener } from './xml-part.js';
import type { ZipArchive } from './zip-archive.js';

/** A sheet of rows and cells. */
export interface Worksheet {
  name: string;
  hidden: boolean;
  /** name of its part in the archive */
  part: string;
}

/** What a workbook says of itself. */
export interface Workbook {
  sheets: Worksheet[];
  /** days are counted from 1904 instead of 1900 */
  since1904: boolean;
  /** parts of the texts and of the cell styles, where it has them */
  strings: string | null;
  styles: string | null;
}

interface Relation {
  id: string;
  /** last word of its type */
  kind: string;
  target: string;
}

const MOST_SHEETS = 256;
const MOST_RELATIONS = 4096;
const OPEN_DOCUMENT = 'mimetype';

/**
 * Finds the sheets of a workbook (ECMA-376 part 1, 18.2, and part 2, 9.3).
 * @param archive the file
 * @throws InputProblem where it is no workbook of this kind
 */
export async function readWorkbook(archive: ZipArchive): Promise<Workbook> {
  if (!archive.has('_rels/.rels')) refuseOther(archive);
  const main = (await relationsOf(archive, '')).find(({ kind }) => kind === 'officeDocument');
  if (main === undefined) refuseOther(archive);
  if (/\.bin$/i.test(main.target)) refuseKind('a workbook in binary parts (.xlsb)');
  const listener = new WorkbookListener();
  await readXml(main.target, archive.part(main.target), listener);
  if (listener.root !== 'workbook') refuseKind('another kind of document');
  const relations = await relationsOf(archive, main.target);
  const sheets = listener.sheets.flatMap(({ name, id, hidden }) => {
    const relation = relations.find((other) => other.id === id);
    if (relation === undefined) throw damaged(main.target, `a part for the sheet "${name}"`, 'none');
    return relation.kind === 'worksheet' ? [{ name, hidden, part: relation.target }] : [];
  });
  if (sheets.length === 0) throw damaged(main.target, 'a sheet of cells', 'none');
  const partOf = (kind: string) => relations.find((relation) => relation.kind === kind)?.target ?? null;
  return { sheets, since1904: listener.since1904, strings: partOf('sharedStrings'), styles: partOf('styles') };
}

class WorkbookListener implements XmlListener {
  root: string | null = null;
  since1904 = false;
  readonly sheets: { name: string; id: string; hidden: boolean }[] = [];

  opened(name: string, attributes: Readonly<Record<string, string>>): void {
    this.root ??= name;
    if (name === 'workbookPr') this.since1904 = /^(?:1|true|on)$/.test(attributes.date1904 ?? '');
    if (name !== 'sheet') return;
    const id = Object.entries(attributes).find(([key]) => key.endsWith(':id'))?.[1] ?? '';
    const hidden = /hidden/i.test(attributes.state ?? '');
    this.sheets.push({ name: attributes.name ?? `sheet ${this.sheets.length + 1}`, id, hidden });
    if (this.sheets.length > MOST_SHEETS) refuseMany(`${MOST_SHEETS} sheets`);
  }

  text(): void {}

  closed(): void {}
}

/** Relations of a part, of the whole package where the part is ''. */
async function relationsOf(archive: ZipArchive, part: string): Promise<Relation[]> {
  const slash = part.lastIndexOf('/') + 1;
  const name = `${part.slice(0, slash)}_rels/${part.slice(slash)}.rels`;
  const relations: Relation[] = [];
  if (!archive.has(name)) return relations;
  await readXml(name, archive.part(name), {
    opened(element, { Id: id = '', Type: type = '', Target: target = '', TargetMode: mode }) {
      if (element !== 'Relationship' || mode === 'External') return;
      relations.push({ id, kind: type.slice(type.lastIndexOf('/') + 1), target: resolved(part, target) });
      if (relations.length > MOST_RELATIONS) refuseMany(`${MOST_RELATIONS} relations of a part`);
    },
    text() {},
    closed() {},
  });
  return relations;
}

/** A target is counted from the folder of its part, or from the top where it begins with a slash. */
function resolved(part: string, target: string): string {
  const steps = target.startsWith('/') ? [] : part.split('/').slice(0, -1);
  for (const step of target.split('/')) {
    if (step === '..') steps.pop();
    else if (step !== '' && step !== '.') steps.push(step);
  }
  return steps.join('/');
}

function refuseOther(archive: ZipArchive): never {
  if (archive.has(OPEN_DOCUMENT)) refuseKind('an OpenDocument file');
  const inner = archive.names.find((name) => !name.endsWith('/')) ?? 'nothing';
  return refuseKind(`a ZIP archive of other files, such as ${JSON.stringify(inner.slice(0, 60))}`);
}

function refuseKind(found: string): never {
  const expected = 'a workbook saved as .xlsx';
  throw new InputProblem([{ code: 'unknown-format', expected, found }]);
}

function refuseMany(most: string): never {
  throw new InputProblem([{ code: 'too-large', expected: `at most ${most}`, found: 'more' }]);
}
