import { type BankOutcome, dischargeS, type StageGroup } from '#libs/engine/index.js';
import { countWord } from '#libs/present/findings.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { say, words } from '#libs/present/language.js';
import { formatLength } from '#libs/present/local-stamp.js';
import { bothRatings } from '#libs/present/single-line.js';
import { NOTE, type Paper } from './paper.js';
import { drawDevices } from './section-devices.js';
import { type Column, drawTable } from './table.js';

/** Stages with both ratings, what protects them, and how long each keeps its charge. */
export function drawStages(paper: Paper, outcome: BankOutcome): void {
  const { bank, result } = outcome;
  const count = result.bank.stages.length;
  if (count === 0) {
    paper.heading('7', say`Stages, protection, discharge: there is no bank`);
    paper.paragraph([say`Nothing is connected, so nothing has to be protected or discharged.`]);
    return;
  }
  const kvar = formatQuantity(result.bank.effectiveKvar, 'kvar');
  paper.heading(
    '7',
    say`Stages, protection, discharge: ${countWord(count)} ${count === 1 ? say`stage` : say`stages`}, ${kvar}`,
  );
  paper.heading('7.1', say`Stages, both ratings with their voltages`, { level: 3 });
  drawTable(
    paper,
    STAGE_COLUMNS,
    bank.groups.map((group, at) => stageRow(outcome, group, at)),
    { after: 4 },
  );
  paper.paragraph([levelWords(outcome)], { style: NOTE });
  drawControl(paper, outcome);
  drawDevices(paper, outcome);
  drawDischarge(paper, outcome);
}

const STAGE_COLUMNS: Column[] = words([
  { head: 'group', share: 8 },
  { head: 'stages', share: 9, align: 'right' },
  { head: 'ratings of one stage', share: 38 },
  { head: 'reactor', share: 12, align: 'right' },
  { head: 'on the capacitor', share: 18, align: 'right' },
  { head: 'tuned order', share: 14, align: 'right' },
  { head: 'switched', share: 14 },
]);

function stageRow(outcome: BankOutcome, group: StageGroup, at: number): string[] {
  const stage = outcome.result.bank.stages.find(
    (one) => one.ratedKvar === group.ratedKvar && one.ratedV === group.ratedV && one.reactorPct === group.reactorPct,
  );
  return [
    String(at + 1),
    String(group.count),
    bothRatings(outcome, group),
    group.reactorPct > 0 ? formatQuantity(group.reactorPct, '%', 'given') : say`none`,
    formatQuantity(stage?.capacitorV ?? null, 'V'),
    formatQuantity(stage?.tunedOrderH ?? null, ''),
    group.fixed ? say`never` : say`yes`,
  ];
}

function levelWords({ result }: BankOutcome): string {
  const levels = result.bank.levelsKvar.map((kvar) => formatNumber(kvar));
  const listed =
    levels.length <= 24 ? levels.join(', ') : `${levels.slice(0, 12).join(', ')} … ${levels.slice(-4).join(', ')}`;
  return say`${levels.length} levels, kvar: ${listed}.`;
}

function drawControl(paper: Paper, { result }: BankOutcome): void {
  const { control } = result;
  const modes = { nearestLevel: say`nearest level`, oneByOne: say`one by one` };
  const wear = { even: say`by turns`, inOrder: say`in order` };
  paper.paragraph([
    say`Controller: set point ${formatNumber(control.setPointPowerFactor, 'given')}, ${modes[control.mode]}, response
      ${formatNumber(control.responseRatio, 'given')} of the smallest stage, step delay ${formatQuantity(control.stepDelayS, 's', 'given')},
      reconnection delay ${formatQuantity(control.reconnectDelayS, 's', 'given')}, equal stages ${wear[control.wear]}.`,
  ]);
}

function drawDischarge(paper: Paper, outcome: BankOutcome): void {
  const { bank, result } = outcome;
  const waits = bank.groups.map((group, at) => waitS(outcome, group, at));
  const longest = Math.max(...waits);
  paper.heading('7.3', say`Discharge: wait ${waitWords(longest)} after switching off, then prove dead`, { level: 3 });
  const columns: Column[] = [
    { head: say`group`, share: 8 },
    { head: say`capacitance, one phase`, share: 20, align: 'right' },
    { head: say`to be reached`, share: 22, align: 'right' },
    { head: say`resistor at most`, share: 19, align: 'right' },
    { head: say`for the delay`, share: 18, align: 'right' },
    { head: say`fitted`, share: 15, align: 'right' },
    { head: say`its loss`, share: 12, align: 'right' },
    { head: say`waiting time`, share: 22, align: 'right' },
  ];
  const rows = result.charge.stages.map((stage, at) => [
    String(stage.group + 1),
    formatQuantity(stage.capacitanceUf, 'µF'),
    say`${formatQuantity(stage.dischargeToV, 'V', 'given')} in ${formatQuantity(stage.dischargeWithinS, 's', 'given')}`,
    formatQuantity(stage.dischargeMaxOhm, 'Ω'),
    formatQuantity(stage.reconnectMaxOhm, 'Ω'),
    bank.groups[at]?.dischargeOhm == null
      ? say`not stated`
      : formatQuantity(bank.groups[at].dischargeOhm, 'Ω', 'given'),
    formatQuantity(stage.dischargeLossW, 'W'),
    waitWords(waits[at]!),
  ]);
  drawTable(paper, columns, rows, { after: 4 });
  const required = result.charge.stages.map(
    (stage) => say`group\u00a0${stage.group + 1}: ${formatQuantity(stage.requiredOhm, 'Ω')}`,
  );
  paper.paragraph([
    say`Required, the smaller of the two, across each delta phase: ${required.join('; ')}. A stage is switched in again only below
      10 % of its rated voltage, so the reconnection delay of ${formatQuantity(result.control.reconnectDelayS, 's', 'given')} runs by hand as well.
      The loss is that of the required resistor in one phase. Section 15 says how to make safe before touching.`,
  ]);
}

/** The standard's time, or the fitted resistor's own where that is longer. */
function waitS(outcome: BankOutcome, group: StageGroup, at: number): number {
  const stage = outcome.result.charge.stages[at]!;
  const fitted =
    group.dischargeOhm === null
      ? 0
      : dischargeS(group.dischargeOhm, stage.capacitanceUf, group.ratedV, stage.dischargeToV);
  return Math.max(stage.dischargeWithinS, fitted);
}

function waitWords(seconds: number): string {
  const whole = Math.ceil(seconds - 1e-6);
  const plain = formatQuantity(whole, 's', 'given');
  return whole >= 60 ? `${plain} (${formatLength(whole)})` : plain;
}
