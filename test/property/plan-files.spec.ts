// Round trip: a plan and a calculation sheet that are exported and read back hash as they did, in every form; with any one
// value changed they do not. The hash of the inputs is made here once more, from the parts themselves.
import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { canonicalJson } from '#libs/contract/canonical-json.js';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import type { PlanInputs } from '#libs/contract/plan-content.js';
import {
  AlteredExport,
  calculationDocument,
  type PlanDocument,
  planDocument,
  takeBack,
} from '#libs/contract/plan-document.js';
import { readSite } from '#libs/contract/read-site.js';
import { recordBytes } from '#libs/contract/record-hash.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import {
  assessBank,
  ENGINE_VERSION,
  type EstimateResult,
  InputProblem,
  planBank,
  planEstimate,
  type Result,
} from '#libs/engine/index.js';
import { calculationFile, planFile } from '#libs/meter-files/plan-file.js';
import { MOST_PLAN_BYTES, mayBePlanFile, readPlanFile } from '#libs/meter-files/read-plan-file.js';
import { documentFile } from '#libs/meter-files/site-document.js';
import { TABLE_FORMS, type TableForm } from '#libs/meter-files/write-tables.js';
import { putEstimateInWords, putInWords } from '#libs/present/put-in-words.js';
import { calculationTable, planTables } from '#libs/present/result-tables.js';
import { generatedCase } from '../support/generated-site.js';
import { Chance, MUTATIONS, mutate } from '../support/mutate-file.js';
import { madeRecord } from '../support/outcome.js';
import { runs, SEED } from '../support/soak.js';

const hash = (text: string) => createHash('sha256').update(text).digest('hex');
const takes = { hash, tablesOf: planTables };
const taken = (bytes: Uint8Array) => readPlanFile(bytes, takes);

interface Made {
  inputs: PlanInputs;
  result: Result | EstimateResult;
}

/** A generated site, read as a site file is, planned or judged. */
function made(number: number): Made | null {
  const { parts, load } = generatedCase(number);
  let site: PlanInputs['site'];
  try {
    site = readSite({ ...parts, asOf: '2026-01-31' });
  } catch (error) {
    if (error instanceof InputProblem) return null;
    throw error;
  }
  const record = madeRecord(load);
  const recordHash = createHash('sha256');
  for (const chunk of recordBytes(record)) recordHash.update(chunk);
  const kind = site.bank !== undefined && number % 2 === 0 ? 'assess' : 'plan';
  const zone = zoneTableOf(site.timeZone, record);
  const { result } = (kind === 'plan' ? planBank : assessBank)(site, record, zone);
  const inputs = { kind, site, recordHash: recordHash.digest('hex'), zone, engineVersion: ENGINE_VERSION } as const;
  return { inputs, result: putInWords(result) };
}

function madeEstimate(): Made {
  const bills = [{ month: '2025-03', activeKwh: 90_000, laggingKvarh: 70_000, maxKw: 240 }];
  const site = readSite({ ...generatedCase(2).parts, asOf: '2026-01-31', estimate: { bills } });
  const zone = estimateZone(site);
  const { result } = planEstimate(site, zone);
  const inputs = { kind: 'plan', site, recordHash: null, zone, engineVersion: ENGINE_VERSION } as const;
  return { inputs, result: putEstimateInWords(result) };
}

const planBytes = ({ inputs, result }: Made, form: TableForm) =>
  planFile(planDocument(result, inputs, hash), planTables(result), form);

function sheetBytes({ inputs, result }: Made, form: TableForm): Buffer {
  const contentHash = hash(canonicalJson(inputs));
  return calculationFile(calculationDocument(result, contentHash, hash), calculationTable(result), form);
}

const refusal = (bytes: Uint8Array): Promise<InputProblem> =>
  taken(bytes).then(
    () => expect.unreachable() as never,
    (error: unknown) => {
      if (error instanceof InputProblem) return error;
      throw error;
    },
  );

describe('a plan that is exported and taken back', () => {
  const cases: Made[] = [];
  beforeAll(() => {
    const generated = Array.from({ length: runs(8, 120) }, (_, number) => made(number));
    cases.push(...generated.filter((one) => one !== null), madeEstimate());
    // not every generated name may stand in a site file
    expect(cases.length).toBeGreaterThan(generated.length / 2);
  }, 3_600_000);

  it.each(TABLE_FORMS)('has the hash of its inputs and every value of its result, as %s', async (form) => {
    for (const one of cases) {
      const back = await taken(planBytes(one, form));
      if (back.kind !== 'plan') throw new Error('another kind');
      expect(back.contentHash).toBe(hash(canonicalJson(one.inputs)));
      expect(canonicalJson(back.inputs)).toBe(canonicalJson(one.inputs));
      expect(canonicalJson(back.result)).toBe(canonicalJson(JSON.parse(JSON.stringify(one.result))));
      // written again it is the same file, in this form and in every other
      for (const other of TABLE_FORMS) expect(planBytes(back, other).equals(planBytes(one, other))).toBe(true);
    }
  });

  it.each(TABLE_FORMS)('and its calculation sheet has every figure, and names its plan, as %s', async (form) => {
    for (const one of cases) {
      const back = await taken(sheetBytes(one, form));
      if (back.kind !== 'calculation') throw new Error('another kind');
      expect(back.contentHash).toBe(hash(canonicalJson(one.inputs)));
      expect(back.figures).toEqual(JSON.parse(JSON.stringify(one.result.figures)));
      expect(sheetBytes({ ...one, result: { ...one.result, figures: back.figures } }, form)).toEqual(
        sheetBytes(one, form),
      );
    }
  });

  it('is not taken back with any one value changed (control)', async () => {
    const chance = new Chance(SEED);
    let changed = 0;
    for (const { inputs, result } of cases) {
      const documents = [
        planDocument(result, inputs, hash),
        calculationDocument(result, hash(canonicalJson(inputs)), hash),
      ];
      for (const document of documents) {
        for (let tries = runs(20, 200); tries > 0; tries--) {
          const altered = withOneValueChanged(document, chance);
          await expect(takeBack(altered, hash)).rejects.toThrow(InputProblem);
          changed++;
        }
        await expect(takeBack(document, hash)).resolves.toBeDefined();
      }
    }
    expect(changed).toBe(cases.length * 2 * runs(20, 200));
  });

  it('says of a changed number that the file was changed, and of which plan it was', async () => {
    const [{ inputs, result }] = cases as [Made];
    const document = JSON.parse(planBytes(cases[0]!, 'json').toString()) as { requirement: { maxKvar: number } };
    document.requirement.maxKvar += 1;
    const error = await refusal(Buffer.from(JSON.stringify(document)));
    expect(error).toBeInstanceOf(AlteredExport);
    expect((error as AlteredExport).contentHash).toBe(hash(canonicalJson(inputs)));
    expect(error.problems[0]).toMatchObject({
      code: 'inconsistent',
      expected: expect.stringContaining('the numbers that were exported'),
    });
    expect(result.requirement.maxKvar).not.toBe(document.requirement.maxKvar);
  });

  it('is refused where a sheet of its workbook shows another number than its document holds', async () => {
    const one = cases[0]!;
    const tables = planTables(one.result);
    const at = tables.findIndex(({ name }) => name === 'duties');
    const column = tables[at]!.heads.indexOf('value');
    const rows = tables[at]!.rows.map((row, k) => (k === 1 ? row.with(column, 12345) : row));
    const altered = tables.with(at, { ...tables[at]!, rows });
    const error = await refusal(planFile(planDocument(one.result, one.inputs, hash), altered, 'xlsx'));
    expect(error).toBeInstanceOf(AlteredExport);
    expect(error.problems[0]).toMatchObject({ path: 'sheet "duties"', row: 3, column: column + 1, found: '"12345"' });
  });

  it.each([
    ['nothing', () => Buffer.alloc(0), 'empty-file'],
    ['a site file', () => documentFile(cases[0]!.inputs.site, 'json'), 'unknown-format'],
    ['a site file as rows', () => documentFile(cases[0]!.inputs.site, 'csv'), 'unknown-format'],
    ['a site file as a workbook', () => documentFile(cases[0]!.inputs.site, 'xlsx'), 'unknown-format'],
    ['a meter file', () => Buffer.from('time,kW,kvar\n'), 'unknown-format'],
    ['a PDF', () => Buffer.from('%PDF-1.7\n'), 'unknown-format'],
    ['half of one', () => planBytes(cases[0]!, 'json').subarray(0, 5000), 'unreadable'],
    ['other bytes', () => Buffer.from([0x7b, 0xff, 0xfe]), 'unreadable'],
    ['a result without inputs', () => Buffer.from(JSON.stringify(cases[0]!.result)), 'unknown-format'],
    ['a later form', () => withSeal({ form: 'plan 2' }), 'not-supported-yet'],
    ['a hash that is none', () => withSeal({ contentHash: 'x' }), 'inconsistent'],
    [
      'parts within parts without end',
      () => Buffer.from(`${'{"a":'.repeat(100_000)}1${'}'.repeat(100_000)}`),
      'unknown-format',
    ],
    ['numbers beyond all bounds', () => Buffer.from('{"frozen":{"form":"plan 1"},"a":1e999}'), 'unknown-format'],
    ['too much', () => Buffer.alloc(MOST_PLAN_BYTES + 1, 0x7b), 'too-large'],
  ])('is refused in words: %s', async (_, bytes, code) => {
    const { problems } = await refusal(bytes());
    expect(problems[0]!.code).toBe(code);
    expect(problems[0]!.expected).not.toBe('');
    expect(problems[0]!.found).not.toBe('');
  });

  const withSeal = (parts: object): Buffer => {
    const document = planDocument(cases[0]!.result, cases[0]!.inputs, hash);
    return Buffer.from(JSON.stringify({ ...document, frozen: { ...(document.frozen as object), ...parts } }));
  };

  it('is refused where it hashes right and is no plan', async () => {
    const { inputs, result } = cases[0]!;
    const made = (parts: object, more: object = {}) =>
      refusal(
        Buffer.from(
          JSON.stringify(planDocument({ ...result, ...parts } as Result, { ...inputs, ...more } as never, hash)),
        ),
      );
    for (const parts of [
      { bank: null },
      { duties: [1] },
      { verdict: 'good' },
      { figures: [{}] },
      { network: { levels: [{}] } },
    ]) {
      expect((await made(parts)).problems[0]).toMatchObject({ code: 'inconsistent' });
    }
    const zone = { ...inputs.zone, fromS: [1, 0] };
    for (const more of [
      { kind: 'guess' },
      { site: [] },
      { recordHash: 'x' },
      { zone },
      { engineVersion: '' },
      { note: 1 },
    ]) {
      expect((await made({}, more)).problems[0]).toMatchObject({ code: 'inconsistent', path: 'frozen.inputs' });
    }
    expect((await made({}, { site: { ...inputs.site, colour: 'red' } })).problems[0]).toMatchObject({
      code: 'unknown-key',
    });
  });

  it('is, with its bytes damaged, refused or what it was', async () => {
    const chance = new Chance(SEED);
    const files = TABLE_FORMS.flatMap((form) => [planBytes(cases[0]!, form), sheetBytes(cases[0]!, form)]);
    const same = await Promise.all(files.map(async (bytes) => canonicalJson(await taken(bytes))));
    for (let k = runs(60, 1500); k > 0; k--) {
      const at = chance.below(files.length);
      const { bytes, names } = mutate(files[at]!, chance);
      try {
        // what is not refused is the same plan: blanks, say, between the parts of a document
        expect(canonicalJson(await taken(bytes)), names.join()).toBe(same[at]);
      } catch (error) {
        if (!(error instanceof InputProblem)) throw error;
      }
    }
    expect(Object.keys(MUTATIONS).length).toBeGreaterThan(5);
  });

  it('is known by how its file begins', () => {
    for (const form of TABLE_FORMS) {
      expect(mayBePlanFile(planBytes(cases[0]!, form))).toBe(true);
      expect(mayBePlanFile(sheetBytes(cases[0]!, form))).toBe(true);
    }
    expect(mayBePlanFile(Buffer.from('%PDF-1.7 {'))).toBe(false);
  });
});

/** A copy with one leaf of another value of its kind. */
function withOneValueChanged(document: PlanDocument, chance: Chance): PlanDocument {
  const copy = structuredClone(document);
  for (;;) {
    let holder: Record<string, unknown> = copy;
    for (;;) {
      const keys = Object.keys(holder);
      if (keys.length === 0) break;
      const key = chance.of(keys);
      const value = holder[key];
      if (typeof value === 'object' && value !== null) {
        holder = value as Record<string, unknown>;
        continue;
      }
      holder[key] = changed(value, chance);
      return copy;
    }
  }
}

function changed(value: unknown, chance: Chance): unknown {
  if (typeof value === 'number')
    return chance.below(2) === 0 ? value + Math.max(1e-9, Math.abs(value) * 4e-16) : -value - 1;
  if (typeof value === 'string') return `${value}.`;
  return typeof value === 'boolean' ? !value : 0;
}
