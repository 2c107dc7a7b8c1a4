import { type EstimateOutcome, type Figure, isEstimate, type Outcome } from '#libs/engine/index.js';
import { engineName } from '#libs/present/engine-name.js';
import { formatNumber, formatQuantity, printedArithmetic } from '#libs/present/format-number.js';
import { say, words } from '#libs/present/language.js';
import { formatMoment } from '#libs/present/local-stamp.js';
import { workedInterval } from '#libs/present/worst-interval.js';
import { SOFT } from './ink.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, type Column, drawTable } from './table.js';
import { BODY, NEW_LINE, type Piece, type Style } from './typesetter.js';

const STYLE: Style = { ...BODY, size: 9.2 };

const ESTIMATE = words([
  'Estimate. From a month’s bill the need has two bounds: the constant kvar that lifts the month’s power factor to the target, ' +
    'and the kvar at the greatest demand if that had the month’s power factor. From a list the load is the sum of rated power over ' +
    'efficiency, by load factor and coincidence, with its own power factors. The bank is sized by the upper bound; nothing is simulated.',
]);

const FROM_RECORD = words([
  'Need. In every interval the kvar at the bus beyond P · tan φ of the target. Metered at the primary, the bus power is ' +
    'what the meter reads less the transformer’s own part, and the need is the kvar at the bus that brings the meter to its target.',
  'Simulation. In time order, on interval means: the controller holds while the deviation is within its response, else takes ' +
    'the level its mode asks for from the stages that are free. Switchings happen at the beginning of an interval.',
]);

const METHOD = words([
  'Bank. A stage gives Q_N · (U / U_N)^2 / (1 − p) at the bus voltage U, with reactor ratio p; its levels are the distinct sums.',
  'Network. Supply, transformer and damping load as impedances over the order, the bank as an admittance on them. Every level ' +
    'is judged in every corner of fault level, capacitance, inductance and damping, all stages moving together.',
  'Harmonics. Each source alone, then summed by the exponents of IEC TR 61000-3-6: 1 below order 5, 1.4 to order 10, 2 above, ' +
    'unless the arithmetic sum was asked for.',
  'Verdict. A value over its limit in any corner is over a limit; near it from 80 % for currents, kvar, inrush and distortion, ' +
    'and from 95 % for voltages. A network limit passed without the bank already is laid to the bank only beyond 1 % of the limit.',
]);

/** How it was computed, a worst interval in full, and every figure with the values put in. */
export function drawMethod(paper: Paper, outcome: Outcome | EstimateOutcome): void {
  const { figures } = outcome.result;
  paper.heading('6', say`Method and working: ${figures.length} figures, each with its values put in`);
  const load = isEstimate(outcome) ? ESTIMATE : FROM_RECORD;
  for (const sentence of [...load, ...METHOD]) paper.paragraph([sentence], { after: 3.5 });
  if (!isEstimate(outcome)) drawWorked(paper, outcome);
  paper.heading('6.2', say`Every figure, with its source and the units of what was put in`, {
    level: 3,
    keep: 110,
  });
  const rows = figures.map((figure): Cell[] => [
    [figure.label, NEW_LINE, { text: `${engineName(figure.source)}. ${unitWords(figure)}`, ink: SOFT, size: 8.4 }],
    formulaCell(figure),
    valueCell(figure),
  ]);
  drawTable(paper, columns(say`figure and source`), rows, { style: STYLE, padding: 2.6 });
}

function drawWorked(paper: Paper, outcome: Outcome): void {
  const worked = workedInterval(outcome);
  const stamp = formatMoment(outcome.zone, worked.beginS);
  const what = worked.misses ? say`The worst interval` : say`No interval misses the target; the one of greatest need`;
  paper.heading('6.1', say`${what} begins ${stamp}`, { level: 3 });
  const rows = worked.steps.map((step): Cell[] => [step.label, formulaCell(step), valueCell(step)]);
  drawTable(paper, columns(say`step`), rows, { style: STYLE, padding: 2.6, after: 4 });
  if (outcome.site.meteredAt !== 'primary') return;
  const worst = outcome.result.operation.worstIntervals[0];
  if (worst === undefined) return;
  paper.paragraph(
    [
      say`Behind the transformer, at the meter, ${formatQuantity(worst.shortfallKvar, 'kvar')} are short of the target in this interval.`,
    ],
    { style: NOTE },
  );
}

function columns(first: string): Column[] {
  return [
    { head: first, share: 36 },
    { head: say`formula, and with the values put in`, share: 50 },
    { head: say`gives`, share: 18, align: 'right' },
  ];
}

/** "Q_N in kvar, U_N in V"; a pure number goes without saying. */
function unitWords({ inputs }: Figure): string {
  const named = inputs
    .filter(({ unit }) => unit !== '')
    .map(({ symbol, unit }) => say`${symbol}\u00a0in\u00a0${engineName(unit)}`);
  return named.length === 0 ? '' : `${named.join(', ')}.`;
}

function formulaCell({ formula, working }: { formula: string; working: string }): Piece[] {
  if (formula === '') return [{ text: say`as measured`, ink: SOFT }];
  return [{ text: printedArithmetic(formula), ink: SOFT }, NEW_LINE, `= ${printedArithmetic(working)}`];
}

function valueCell({ value, unit, formula }: { value: number; unit: string; formula: string }): Piece[] {
  const number = formula === '' ? formatNumber(value, 'working') : formatNumber(value, 'answer');
  return [{ text: number, weight: 'semibold' }, ...(unit === '' ? [] : [`\u00a0${engineName(unit)}`])];
}
