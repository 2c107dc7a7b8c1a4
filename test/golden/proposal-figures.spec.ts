// Every figure of the paper against the result it was drawn from, read back by a text extractor (poppler's pdftotext).
import { describe, expect, it } from 'vitest';
import { controllerSettings, type Outcome } from '#libs/engine/index.js';
import { controllerSheet } from '#libs/present/controller-sheet.js';
import { dutyName } from '#libs/present/figure-words.js';
import { maintenanceLines } from '#libs/present/maintenance-lines.js';
import { operatorPage } from '#libs/present/operator-page.js';
import { plainName } from '#libs/present/plain-name.js';
import { revisionCells, revisionNumbers } from '#libs/present/revision-numbers.js';
import { scheduleOfMaterials } from '#libs/present/schedule-of-materials.js';
import { workedInterval } from '#libs/present/worst-interval.js';
import { renderProposal } from '#libs/proposal/render-proposal.js';
import { generatedCase } from '../support/generated-site.js';
import { MADE_BANK, madeFrame, madeOutcome } from '../support/outcome.js';
import { printedNumber, squeezed, textOf, wordsOf } from '../support/pdf-text.js';
import { printedWorkings, wrongWorkings } from '../support/printed-workings.js';
import { runs, SOAKED } from '../support/soak.js';

const NUMBER = '(−?\\d+(?:\\.\\d+)?)';
const MARGIN = 44;

/** What stands after a label in the squeezed text, as a number; null where it is not found. */
function numberAfter(text: string, label: string, from = 0): { value: number; half: number } | null {
  const at = text.indexOf(squeezed(label), from);
  if (at < 0) return null;
  const found = new RegExp(`^${NUMBER}`).exec(text.slice(at + squeezed(label).length));
  return found === null ? null : printedNumber(found[1]!);
}

/** Labels whose printed number is not the JSON's within half a unit of its last digit. */
function wrongOnPaper(
  text: string,
  expected: readonly (readonly [label: string, value: number])[],
  from = 0,
): string[] {
  return expected.flatMap(([label, value]) => {
    const printed = numberAfter(text, label, from);
    if (printed === null) return [`${label}: not found, expected ${value}`];
    return Math.abs(printed.value - value) <= printed.half * (1 + 1e-9)
      ? []
      : [`${label}: ${printed.value} for ${value}`];
  });
}

/** The figures of the method sheet: formula, working, value, in the order they are drawn. */
function methodSheet(outcome: Outcome): [string, number][] {
  return outcome.result.figures.map(({ formula, working, value }) => [`${formula}=${working}`, value]);
}

function decidingFigures({ result }: Outcome): [string, number][] {
  const { record, requirement, operation, network, control } = result;
  const lowest = (months: readonly { powerFactorLagging: number | null }[]) =>
    Math.min(...months.flatMap(({ powerFactorLagging: value }) => (value === null ? [] : [value])));
  const all: [string, number | null][] = [
    ['needed, at most', requirement.maxKvar],
    ['needed, 99 %', requirement.p99Kvar],
    ['effective', result.bank.effectiveKvar],
    ['set point', control.setPointPowerFactor],
    ['lowest month before', lowest(requirement.months)],
    ['lowest month after', lowest(operation.months)],
    ['in target', operation.shareInTargetPct],
    ['valid intervals', record.intervals],
    ['missing intervals', record.missing],
    ['greatest demand', record.maxKw],
    ['greatest apparent power', record.maxKva],
    ['power factor, lagging only', record.powerFactorLagging],
    ['power factor, net', record.powerFactorNet],
    ['mean need', requirement.meanKvar],
    ['intervals in need', requirement.intervalsInNeed],
    ['need: half the time under', requirement.p50Kvar],
    ['need: 95 % of the time under', requirement.p95Kvar],
    ...(result.bank.stages.length > 0
      ? ([
          ['conductors and disconnector for', result.conductorMinA],
          ['The fault level at the bus lies between', network.shortCircuitMinMva],
          ['Switchings:', operation.totalSwitchings],
        ] as [string, number][])
      : []),
  ];
  return all.flatMap(([label, value]) => (value === null ? [] : [[label, value]]));
}

function dutyRows({ result }: Outcome): [string, number][] {
  return result.duties.map((duty) => [dutyName(duty), duty.value]);
}

/** Numbers of the sheets that leave the paper, after their names. */
function sheetNumbers(outcome: Outcome): [string, number][] {
  const settings = controllerSettings(outcome);
  const lines = controllerSheet(outcome);
  return settings.flatMap(({ value, from }, at): [string, number][] =>
    typeof value === 'number' && from !== 'open' ? [[lines[at]!.setting, value]] : [],
  );
}

/** Lines of the sheets without numbers of their own in the result: each has to stand on the paper as it is. */
function sheetLines(outcome: Outcome): string[] {
  return [
    ...maintenanceLines(outcome).map(
      ({ check, every, expected, rejected }) => `${check}${every}${expected}${rejected}`,
    ),
    ...scheduleOfMaterials(outcome).map(({ item, number, rating }) => `${item}${number}${rating}`),
    ...operatorPage(outcome).effects.map(({ what, value, limit }) => `${what}${value}${limit}`),
    `0${revisionCells(revisionNumbers(outcome.result)).join('')}`,
  ];
}

/** Time of one core that a task takes [s]. */
async function coreS(task: () => Promise<Uint8Array>): Promise<{ bytes: Uint8Array; tookS: number }> {
  const before = process.cpuUsage();
  const bytes = await task();
  const { user, system } = process.cpuUsage(before);
  return { bytes, tookS: (user + system) / 1e6 };
}

/** Characters of a name that the shipped fonts draw from left to right, in order. */
function readableName(name: string): string {
  return squeezed(plainName(name)).replace(/[^\u0020-\u024f\u0370-\u04ff\u2000-\u22ff]+/gu, '\u0000');
}

function offThePage(bytes: Uint8Array): string[] {
  return wordsOf(bytes).flatMap(({ width, height, words }, page) =>
    words
      .filter(({ xMin, xMax, yMin, yMax }) => xMin < MARGIN || xMax > width - MARGIN || yMin < 20 || yMax > height - 18)
      .map(({ text, xMin, xMax }) => `page ${page + 1}: "${text}" from ${xMin} to ${xMax} of ${width}`),
  );
}

describe('a proposal read back', () => {
  const numbers = Array.from({ length: runs(12, 200) }, (_, at) => at);

  it.each(numbers)(
    'prints the result’s own figures and nothing outside its margins, generated site %i',
    async (number) => {
      const { parts, load } = generatedCase(number);
      const outcome = madeOutcome(parts, load);
      const paper = number % 2 === 0 ? 'A4' : 'Letter';
      const draw = () => renderProposal(outcome, madeFrame({ paper }));
      const { bytes, tookS } = await coreS(draw);
      expect(tookS).toBeLessThan(3);
      if (number % 4 === 0 || SOAKED) expect(Buffer.from(await draw()).equals(Buffer.from(bytes))).toBe(true);
      const raw = textOf(bytes);
      const text = squeezed(raw);
      expect(wrongOnPaper(text, methodSheet(outcome))).toEqual([]);
      expect(wrongOnPaper(text, decidingFigures(outcome))).toEqual([]);
      for (const { label, source } of outcome.result.figures) expect(text).toContain(squeezed(`${label}${source}`));
      const duties = text.indexOf(squeezed('Duties, worst level and corner'));
      expect(wrongOnPaper(text, dutyRows(outcome), Math.max(duties, 0))).toEqual([]);
      const settings = text.lastIndexOf(squeezed('16Controller settings'));
      expect(wrongOnPaper(text, sheetNumbers(outcome), settings)).toEqual([]);
      expect(sheetLines(outcome).filter((line) => !text.includes(squeezed(line)))).toEqual([]);
      const workings = printedWorkings(bytes);
      const steps = workedInterval(outcome).steps.filter(({ formula }) => formula !== '');
      expect(workings).toHaveLength(outcome.result.figures.length + steps.length);
      expect(wrongWorkings(workings)).toEqual([]);
      expect(raw).not.toContain('\ufffd');
      for (const part of readableName(outcome.site.name).split('\u0000')) expect(text).toContain(part);
      expect(offThePage(bytes)).toEqual([]);
    },
  );

  it('shows a working that does not give its figure (control)', async () => {
    const outcome = madeOutcome({ bank: MADE_BANK }, { days: 20 });
    const spoilt = structuredClone(outcome);
    spoilt.result.figures[1]!.value *= 1.001;
    expect(wrongWorkings(printedWorkings(await renderProposal(spoilt, madeFrame())))).toHaveLength(1);
  });

  it('is told apart from a paper with another number (control)', async () => {
    const outcome = madeOutcome({ bank: MADE_BANK }, { days: 20 });
    const spoilt = structuredClone(outcome);
    spoilt.result.requirement.p99Kvar *= 1.02;
    spoilt.result.figures[2]!.value += 0.5;
    const text = squeezed(textOf(await renderProposal(spoilt, madeFrame())));
    expect(wrongOnPaper(text, decidingFigures(outcome))).toHaveLength(1);
    expect(wrongOnPaper(text, methodSheet(outcome))).toHaveLength(1);
  });
});
