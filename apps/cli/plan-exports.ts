import { mkdir, writeFile } from 'node:fs/promises';
import { extname, join } from 'node:path';
import { type PlanInputs, planContent } from '#libs/contract/plan-content.js';
import { calculationDocument, planDocument } from '#libs/contract/plan-document.js';
import {
  type EstimateOutcome,
  type EstimateResult,
  InputProblem,
  type Outcome,
  type Result,
} from '#libs/engine/index.js';
import { TABLE_FORMS, type TableForm } from '#libs/meter-files/write-tables.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { textHash } from './frozen-inputs.js';
import { type ProposalTarget, proposalTarget } from './proposal-target.js';

/** A plan to be written out. */
export interface ToExport {
  /** as it is answered, in words */
  result: Result | EstimateResult;
  outcome: Outcome | EstimateOutcome;
  inputs: PlanInputs;
}

/** What is written of a plan besides its proposal. */
export interface PlanExports {
  /** whether anything is */
  areWanted: boolean;
  /** @returns the files that were written */
  write(plan: ToExport): Promise<string[]>;
}

/**
 * The form that a file's ending asks for.
 * @param path what was typed
 * @param option the option it was typed after
 * @throws InputProblem of code `usage` for another ending
 */
export function formOf(path: string, option: string): TableForm {
  const form = TABLE_FORMS.find((one) => extname(path).toLowerCase() === `.${one}`);
  if (form !== undefined) return form;
  throw new InputProblem([usage(`--${option} with a file that ends in .json, .csv or .xlsx`, JSON.stringify(path))]);
}

/**
 * Makes sure that everything asked for can be written, before anything is computed.
 * @param line with --export, --calculation and --figures
 * @throws InputProblem of code `usage` where it can't
 */
export async function planExports({ values }: CommandLine): Promise<PlanExports> {
  const tables: (TablesAsked & { path: string })[] = [];
  for (const option of ['export', 'calculation'] as const) {
    const path = values.get(option);
    if (path === undefined) continue;
    tables.push({ option, path, form: formOf(path, option), target: await proposalTarget(path, option) });
  }
  const folder = values.get('figures');
  if (folder !== undefined) await prepared(folder);
  return {
    areWanted: tables.length > 0 || folder !== undefined,
    async write(plan) {
      for (const one of tables) await one.target.write(await tablesOf(plan, one.option, one.form));
      const figures = folder === undefined ? [] : await writeFigures(plan.outcome, folder);
      return [...tables.map(({ path }) => path), ...figures];
    },
  };
}

interface TablesAsked {
  option: 'export' | 'calculation';
  form: TableForm;
  target: ProposalTarget;
}

/**
 * A plan, or its calculation sheet, as a file; what writes it is loaded only here.
 * @param plan result and inputs
 * @param option which of the two
 * @param form of the file
 */
export async function tablesOf(
  { result, inputs }: Pick<ToExport, 'result' | 'inputs'>,
  option: TablesAsked['option'],
  form: TableForm,
): Promise<Uint8Array> {
  const { calculationFile, planFile } = await import('#libs/meter-files/plan-file.js');
  const { calculationTable, planTables } = await import('#libs/present/result-tables.js');
  if (option === 'export') return planFile(planDocument(result, inputs, textHash), planTables(result), form);
  const document = calculationDocument(result, textHash(planContent(inputs)), textHash);
  return calculationFile(document, calculationTable(result), form);
}

async function writeFigures(outcome: Outcome | EstimateOutcome, folder: string): Promise<string[]> {
  const { renderFigures } = await import('#libs/proposal/render-figures.js');
  const files = await renderFigures(outcome);
  const paths = files.map(({ name }) => join(folder, `${name}.svg`));
  for (const [at, { svg }] of files.entries()) await writeFile(paths[at]!, svg);
  return paths;
}

async function prepared(folder: string): Promise<void> {
  try {
    await mkdir(folder, { recursive: true });
  } catch (error) {
    if (!(error instanceof Error && 'code' in error)) throw error;
    const found = `${JSON.stringify(folder)} (${error.code})`;
    throw new InputProblem([usage('--figures with a folder that can be written', found)]);
  }
}
