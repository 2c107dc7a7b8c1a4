import type { BankOutcome } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { HISTORY_HEADS, historyRows } from '#libs/present/stage-history-words.js';
import { verdictWords } from '#libs/present/verdict-words.js';
import { NOTE, type Paper } from './paper.js';
import { type Column, drawTable } from './table.js';

const COLUMNS: Column[] = [
  { head: 'which capacitors', share: 30 },
  { head: 'capacitance left', share: 17, align: 'right' },
  { head: 'reactor ratio', share: 14, align: 'right' },
  { head: 'tuned order', share: 13, align: 'right' },
  { head: 'verdict', share: 18 },
  { head: 'take a stage out at', share: 24, align: 'right' },
];

const FROM = {
  new: 'end of life of a new one',
  installed: 'installed, not measured',
  measured: 'as measured',
} as const;

/** What becomes of the verdict as capacitors age, and the capacitance at which a stage must come out. */
export function drawAgeing(paper: Paper, outcome: BankOutcome): void {
  const { cases, stages, measured } = outcome.result.ageing;
  if (cases.length === 0) return;
  const graver = cases.filter(({ verdict }) => verdict === 'avoid').length;
  paper.heading('12.1', `Ageing: ${graver === 0 ? 'no case passes a limit' : 'a limit is passed as capacitors age'}`, {
    level: 3,
  });
  const rows = cases.map(({ group, capacitanceFactor, from, reactorPct, tunedOrderH, verdict }) => {
    const end = group === null ? null : stages[group]!;
    const which = group === null ? 'all stages alike' : `one stage of group ${group + 1}`;
    return [
      `${which}, ${FROM[from]}`,
      formatQuantity(100 * capacitanceFactor, '%', 'given'),
      reactorPct === null || reactorPct === 0 ? '–' : formatQuantity(reactorPct, '%'),
      formatQuantity(tunedOrderH, ''),
      verdictWords(verdict),
      end === null || end.comesOutUf === null
        ? '–'
        : `${formatQuantity(end.comesOutUf, 'µF')} (${formatNumber(end.comesOutPct!)} %)`,
    ];
  });
  drawTable(paper, COLUMNS, rows, { after: 4 });
  paper.paragraph(
    [
      'Judged beside the corners, not among them: the reactor stays, so ratio and tuned order move as the capacitance falls. ' +
        'A stage comes out where the verdict turns graver with that one stage, one phase of the delta measured; a dash means ' +
        'that it stands down to half of the nameplate’s capacitance, or is over a limit already.',
    ],
    { style: NOTE },
  );
  if (measured.length === 0) return;
  const shares = [17, 25, 20, 12, 13, 21];
  const columns = HISTORY_HEADS.map((head, k) => ({
    head,
    share: shares[k]!,
    align: k < 2 ? ('left' as const) : ('right' as const),
  }));
  drawTable(paper, columns, historyRows(measured), { after: 4 });
  paper.paragraph(
    [
      'Measured stages: kvar of the capacitors at their rated voltage, Q_N · ΣC/(3 · C_N), from three line currents at the ' +
        'bus voltage, the reactor taken off, or from three capacitances between terminals. Harmonics read with the ' +
        'currents make a stage look larger.',
    ],
    { style: NOTE },
  );
}
