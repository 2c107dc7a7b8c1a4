import { type EstimateResult, type Figure, InputProblem, type Problem, type Result } from '#libs/engine/index.js';
import { canonicalJson } from './canonical-json.js';
import { type PlanInputs, planContent } from './plan-content.js';
import { isFigures, isPlain, isPlanInputs, isResult } from './plan-shape.js';
import { readSiteWithMathjs } from './read-site-with-mathjs.js';

/** SHA-256 of a text, 64 hexadecimal digits; the rims have it. */
export type TextHash = (text: string) => string;

/** Forms of the files a plan goes out as. */
export const PLAN_FORM = 'plan 1';
export const CALCULATION_FORM = 'calculation 1';

/** A plan as it was exported: its inputs hash to its content hash, its numbers to the result's. */
export interface TakenPlan {
  kind: 'plan';
  contentHash: string;
  /** SHA-256 over content hash and result, 64 hexadecimal digits */
  resultHash: string;
  inputs: PlanInputs;
  result: Result | EstimateResult;
}

/** A calculation sheet as it was exported, without the inputs of its plan. */
export interface TakenCalculation {
  kind: 'calculation';
  /** of the plan it belongs to */
  contentHash: string;
  /** SHA-256 over content hash and figures, 64 hexadecimal digits */
  sheetHash: string;
  figures: Figure[];
}

/** The document of an export, as it was written and as it is taken back. */
export type PlanDocument = Record<string, unknown>;

/** Thrown where a file names one hash and holds something of another. */
export class AlteredExport extends InputProblem {
  readonly kind: 'plan' | 'calculation';
  /** of the plan it says it is, 64 hexadecimal digits */
  readonly contentHash: string;

  constructor(problem: Problem, { kind, contentHash }: Pick<AlteredExport, 'kind' | 'contentHash'>) {
    super([problem]);
    this.kind = kind;
    this.contentHash = contentHash;
  }
}

/**
 * A plan as a document that can be taken back: its result, and under `frozen` what it was made from.
 * @param result plan or judgement, in words
 * @param inputs what it depends on
 * @param hash of the rim
 */
export function planDocument(result: Result | EstimateResult, inputs: PlanInputs, hash: TextHash): PlanDocument {
  const plain = JSON.parse(JSON.stringify(result)) as PlanDocument;
  const contentHash = hash(planContent(inputs));
  const resultHash = resultHashOf(plain, contentHash, hash);
  return { ...plain, frozen: { form: PLAN_FORM, contentHash, resultHash, inputs } };
}

/**
 * A calculation sheet as a document that can be taken back.
 * @param result plan or judgement, in words
 * @param contentHash of the plan
 * @param hash of the rim
 */
export function calculationDocument(
  { figures }: Pick<Result, 'figures'>,
  contentHash: string,
  hash: TextHash,
): PlanDocument {
  const plain = JSON.parse(JSON.stringify(figures)) as Figure[];
  const sheetHash = sheetHashOf(plain, contentHash, hash);
  return { figures: plain, frozen: { form: CALCULATION_FORM, contentHash, sheetHash } };
}

/**
 * SHA-256 of a result as a plan's export gives it.
 * @param result plan or judgement, in words
 * @param contentHash of its inputs
 * @param hash of the rim
 */
export function resultHashOf(result: object, contentHash: string, hash: TextHash): string {
  return hash(canonicalJson({ form: PLAN_FORM, contentHash, result }));
}

function sheetHashOf(figures: readonly Figure[], contentHash: string, hash: TextHash): string {
  return hash(canonicalJson({ form: CALCULATION_FORM, contentHash, figures }));
}

/**
 * Takes an exported plan or calculation sheet back.
 * @param document of the file
 * @param hash of the rim
 * @returns what was exported, to the bit
 * @throws AlteredExport where it was changed, InputProblem where it is none, or of a form that this version does not know
 */
export async function takeBack(document: unknown, hash: TextHash): Promise<TakenPlan | TakenCalculation> {
  const { frozen, ...rest } = asObject(document);
  const seal = asObject(frozen);
  if (!isPlain(document)) throw other('numbers beyond all bounds, or parts within parts without end');
  if (frozen === undefined) throw other('figures' in rest ? WITHOUT_INPUTS : 'another document');
  if (seal.form === PLAN_FORM) return takenPlan(rest, seal, hash);
  if (seal.form === CALCULATION_FORM) return takenCalculation(rest, seal, hash);
  const expected = `a file of the form "${PLAN_FORM}" or "${CALCULATION_FORM}"`;
  const found = typeof seal.form === 'string' ? JSON.stringify(seal.form.slice(0, 60)) : 'none';
  throw new InputProblem([{ code: 'not-supported-yet', path: 'frozen.form', expected, found }]);
}

const WITHOUT_INPUTS = 'a result without what it was made from: export it again';

function other(found: string): InputProblem {
  const expected = 'a plan or a calculation sheet as it was exported';
  return new InputProblem([{ code: 'unknown-format', expected, found }]);
}

async function takenPlan(result: PlanDocument, seal: PlanDocument, hash: TextHash): Promise<TakenPlan> {
  const contentHash = hashIn(seal, 'contentHash');
  const resultHash = hashIn(seal, 'resultHash');
  const { inputs } = seal;
  if (!isPlanInputs(inputs)) throw misshapen('frozen.inputs', 'kind, site, record hash, zone and engine version');
  needSame('plan', { what: 'inputs', contentHash, named: contentHash, held: hash(planContent(inputs)) });
  needSame('plan', { what: 'numbers', contentHash, named: resultHash, held: resultHashOf(result, contentHash, hash) });
  if (!isResult(result)) throw misshapen('', 'a result with its parts');
  await needReadable(inputs);
  return { kind: 'plan', contentHash, resultHash, inputs, result };
}

function takenCalculation(rest: PlanDocument, seal: PlanDocument, hash: TextHash): TakenCalculation {
  const contentHash = hashIn(seal, 'contentHash');
  const sheetHash = hashIn(seal, 'sheetHash');
  const { figures } = rest;
  if (!isFigures(figures)) throw misshapen('figures', 'figures with formula, working, source and inputs');
  needSame('calculation', {
    what: 'figures',
    contentHash,
    named: sheetHash,
    held: sheetHashOf(figures, contentHash, hash),
  });
  return { kind: 'calculation', contentHash, sheetHash, figures };
}

/** The site of a plan is what reading it once more gives: nothing stands in it that this version does not know. */
async function needReadable({ site }: PlanInputs): Promise<void> {
  const read = await readSiteWithMathjs(siteDocumentOf(site));
  const { papers } = site;
  if (canonicalJson(papers === undefined ? read : { ...read, papers }) === canonicalJson(site)) return;
  throw misshapen('frozen.inputs.site', 'a site as this version reads it');
}

/**
 * The site file that a plan was made from; shared papers stand in it as the tariff and prices they were.
 * @param site frozen inputs
 */
export function siteDocumentOf({ papers: _, ...site }: PlanInputs['site']): Omit<PlanInputs['site'], 'papers'> {
  return site;
}

function asObject(value: unknown): PlanDocument {
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as PlanDocument) : {};
}

function hashIn(seal: PlanDocument, key: string): string {
  const text = seal[key];
  if (typeof text === 'string' && /^[0-9a-f]{64}$/.test(text)) return text;
  throw misshapen(`frozen.${key}`, '64 hexadecimal digits');
}

function misshapen(path: string, expected: string): InputProblem {
  const place = path === '' ? {} : { path };
  return new InputProblem([{ code: 'inconsistent', ...place, expected, found: 'something else' }]);
}

function needSame(
  kind: AlteredExport['kind'],
  of: { what: string; contentHash: string; named: string; held: string },
): void {
  const { what, contentHash, named, held } = of;
  if (named === held) return;
  const expected = `the ${what} that were exported, ${named.slice(0, 16)}`;
  const found = `others, ${held.slice(0, 16)}: the file was changed after it was exported`;
  throw new AlteredExport({ code: 'inconsistent', expected, found }, { kind, contentHash });
}
