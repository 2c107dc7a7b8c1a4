import type { BankOutcome } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { say } from '#libs/present/language.js';
import { blankCell } from './blank-cell.js';
import type { Paper } from './paper.js';
import { type Cell, drawTable } from './table.js';

/** What is to be done and noted on site before the bank goes into service. */
export function drawSiteActions(paper: Paper, outcome: BankOutcome): void {
  if (outcome.bank.groups.length === 0) {
    paper.heading('14', say`Site actions: none, since nothing is built`);
    paper.paragraph([say`Plan again when load, tariff or supply change.`]);
    return;
  }
  const actions = siteActions(outcome);
  paper.heading('14', say`Site actions: ${actions.length} before the bank goes into service`);
  const columns = [
    { head: '', share: 5 },
    { head: say`action`, share: 62 },
    { head: say`expected`, share: 25 },
    { head: say`found`, share: 16 },
  ];
  const rows = actions.map(([action, expected], at): Cell[] => [String(at + 1), action, expected, blankCell(paper)]);
  drawTable(paper, columns, rows);
}

function siteActions(outcome: BankOutcome): [string, string][] {
  const { site, result, bank } = outcome;
  const { control, charge } = result;
  const met = (name: string): number | null => {
    const value = result.devices.find(({ device }) => device === name)?.value;
    return typeof value === 'number' ? value : null;
  };
  const [faultKa, peakKa] = [met('mainDevice.breaking'), met('busbar.withstand')] as const;
  const currents = bank.groups.map((group, at) => {
    const stage = result.bank.stages.find(
      (one) => one.ratedKvar === group.ratedKvar && one.reactorPct === group.reactorPct,
    );
    const ampere = ((stage?.effectiveKvar ?? 0) * 1000) / (Math.sqrt(3) * site.nominalV);
    return say`group\u00a0${at + 1}: ${formatQuantity(ampere, 'A')}`;
  });
  const capacitance = charge.stages.map(
    (stage) => say`group\u00a0${stage.group + 1}: ${formatQuantity(stage.capacitanceUf, 'µF')}`,
  );
  const resistors = charge.stages.map(
    (stage) => say`group\u00a0${stage.group + 1}: ${formatQuantity(stage.requiredOhm, 'Ω')} or less`,
  );
  return [
    [
      say`Compare the nameplates of transformer, capacitors and reactors with section 7 and the single-line diagram.`,
      say`as printed`,
    ],
    [
      say`Ask the network operator for the greatest and least fault level, in writing.`,
      say`${formatNumber(site.supply.faultLevelMva.min, 'given')} and ${formatQuantity(site.supply.faultLevelMva.max, 'MVA', 'given')}`,
    ],
    [
      say`Check breaking capacity and withstand of what is fitted against the equipment fault current of section 7.2.`,
      say`${formatQuantity(faultKa, 'kA')}, peak ${formatQuantity(peakKa, 'kA')}`,
    ],
    [say`Measure the capacitance of one delta phase of every stage, discharged and isolated.`, capacitance.join('; ')],
    [say`Measure or read the discharge resistors.`, resistors.join('; ')],
    [
      say`Check the place and direction of the controller’s current transformer: it sees the load and the bank.`,
      say`sign of kvar agrees with the meter`,
    ],
    [
      say`Set the controller by the sheet of section 16.`,
      say`${formatNumber(control.setPointPowerFactor, 'given')}; step ${formatQuantity(control.stepDelayS, 's', 'given')}; reconnection ${formatQuantity(control.reconnectDelayS, 's', 'given')}`,
    ],
    [say`Test insulation, torque of the connections, and phase rotation.`, say`by the maker’s values`],
    [
      say`Switch stage by stage and note the current of each at the voltage then measured.`,
      say`at ${formatQuantity(site.nominalV, 'V', 'given')}, ${currents.join('; ')}`,
    ],
    [say`Measure voltage distortion at every level, before and after.`, say`section 9.6`],
    [say`Put a label on each stage with its waiting time.`, say`section 7.3`],
  ];
}
