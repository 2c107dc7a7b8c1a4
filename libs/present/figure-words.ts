import type { Duty, Figure } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatNumber, GAP, inPoints, MINUS } from './format-number.js';
import { say, words } from './language.js';
import { plainName } from './plain-name.js';

/** What a figure is called; `[*]` stands for a group's number. */
const LABELS: Readonly<Record<string, string>> = words({
  'record.powerFactorLagging': 'power factor of the record, lagging kvarh only',
  'record.powerFactorNet': 'power factor of the record, leading kvarh taken off',
  'estimate.months[*].lowerKvar': 'lower bound of the need, estimated',
  'estimate.months[*].upperKvar': 'upper bound of the need, estimated',
  'estimate.equipment.rows[*].activeKw': 'active power, estimated',
  'estimate.equipment.rows[*].reactiveKvar': 'reactive power, estimated',
  'estimate.equipment.neededKvar': 'need of the equipment list, estimated',
  'requirement.maxKvar': 'greatest need',
  'requirement.p99Kvar': 'need passed in 1 % of the record',
  'requirement.p95Kvar': 'need passed in 5 % of the record',
  'requirement.meanKvar': 'mean need',
  'network.shortCircuitMva.sourceMohm': 'reactance of the supply at the greatest fault level',
  'network.shortCircuitMva': 'fault level at the bus',
  'network.shortCircuitMinMva.sourceMohm': 'reactance of the supply at the least fault level',
  'network.shortCircuitMinMva': 'least fault level at the bus',
  'bank.group[*].capacitiveOhm': 'capacitive reactance of one stage',
  'bank.group[*].effectiveKvar': 'effective kvar of one stage',
  'bank.group[*].capacitorV': 'voltage on the capacitor',
  'bank.group[*].ratedA': 'rated current of one stage',
  'bank.group[*].tunedOrderH': 'tuned order',
  'bank.effectiveKvar': 'effective kvar of the bank',
  'bank.voltageRisePct': 'voltage rise with all stages in',
  'network.parallelOrderClosedFormH': 'parallel resonance with all stages in, closed form',
  conductorMinA: 'least rated current of conductors and disconnector',
  'charge.stages[*].capacitanceUf': 'capacitance of one phase of the delta',
  'charge.stages[*].dischargeMaxOhm': 'greatest discharge resistor by the standard',
  'charge.stages[*].reconnectMaxOhm': 'greatest resistor for the reconnection delay',
  'charge.stages[*].timeToTenPctS': 'time to 10 % with the resistor fitted',
  'inrush.stages[*].singlePeakA': 'inrush peak of a single stage',
  'inrush.stages[*].ontoBankPeakA': 'inrush peak onto the rest of the bank',
  'operation.lowestMonthPowerFactor': 'power factor of the lowest month with the bank',
  'operation.totalSwitchings': 'switchings of all stages over the record',
  'operation.shareInTargetPct': 'share of the intervals that hold the target',
  'network.worstDistortionPct': 'voltage distortion of the worst level in its worst corner',
  'network.distortionWithoutBankPct': 'voltage distortion with no stage in, worst corner',
  'operation.freedKva': 'apparent power freed at the peak',
  'loads.truePowerFactorAfter': 'true power factor at the peak with the bank',
  'devices.group[*].voltageChangePct': 'voltage change when a stage is switched',
  'devices.group[*].leastRatedV': 'least rated voltage of the capacitor',
  'devices.group[*].linearA': 'current to which the reactor keeps its inductance',
  'devices.group[*].rippleOhm': 'reactance of a stage at the ripple frequency, above 0 where it blocks',
  'devices.greatestFaultKa': 'equipment fault current, not the fault level of resonance',
  'devices.peakFaultKa': 'peak of the equipment fault current',
  'devices.leastFaultKa': 'least fault current, two phases',
  'devices.instantaneousMinA': 'least instantaneous setting upstream',
  'devices.cabinetHeatW': 'heat of the cabinet, at most',
  'devices.airFlowM3PerH': 'air for that heat at the allowed rise',
  'devices.responseA': 'response current at the current transformer’s secondary',
  'money.savingPerYear': 'saving of the calendar months, January first',
  'money.npv': 'net present value: capital and each year’s net at present value',
  'money.paybackYears': 'payback: the last month below 0, and what it takes of the next',
  'money.discountedPaybackYears': 'payback of the present values',
  'money.irrPct': 'internal rate of return, between two rates next to it',
  'money.annuityPerYear': 'net present value as an equal amount a year',
  'loads.neutralA': 'neutral current of the single-phase loads’ third harmonics',
});

const SYMBOL = /[\p{L}_][\p{L}\d_]*/gu;

/**
 * A figure with its label and its working: the formula with the values put in.
 * @param figure from the engine
 * @param duties rows of the result, which name the figures of their shares
 * @returns the same figure, label and working filled
 */
export function figureInWords(figure: Figure, duties: readonly Duty[]): Figure {
  return { ...figure, label: labelOf(figure.id, duties), working: workingOf(figure) };
}

/**
 * What a figure is called.
 * @param id its stable name
 * @param duties rows of the result
 * @returns label in small letters; the id itself where the table holds none
 */
export function labelOf(id: string, duties: readonly Duty[]): string {
  const place = /\[(\d+)\]/.exec(id);
  const at = Number(place?.[1] ?? 0);
  if (id.startsWith('duties[')) {
    const duty = duties[at];
    return duty === undefined ? id : say`${dutyName(duty)}, share of its limit`;
  }
  const label = LABELS[id.replace(/\[\d+\]/, '[*]')];
  if (label === undefined) return id;
  return place === null ? label : `${label}, ${placeWord(id)}${GAP}${at + 1}`;
}

function placeWord(id: string): string {
  if (id.startsWith('estimate.months')) return say`bill`;
  return id.startsWith('estimate.equipment') ? say`entry` : say`group`;
}

/**
 * A duty's name with its group, order and place where it has them.
 * @param duty a row of the result
 * @returns "capacitor current, group 1", "harmonic voltage, order 19", "harmonic voltage, order 5, at MCC 2"
 */
export function dutyName(duty: Duty): string {
  const group = duty.group === null ? '' : say`, group\u00a0${duty.group + 1}`;
  const order = duty.orderH === null ? '' : say`, order\u00a0${formatNumber(duty.orderH, 'given')}`;
  const capacitors = duty.capacitors === undefined ? '' : `, ${plainName(duty.capacitors)}`;
  const bus = duty.bus === undefined || duty.bus === 'primary' ? '' : say`, at ${plainName(duty.bus)}`;
  return `${engineName(duty.name)}${group}${order}${capacitors}${bus}`;
}

/**
 * The formula with the values put in: plain arithmetic that gives the value within the digits printed.
 * @param figure formula and inputs
 * @returns for example "1 / √(0.07)"; π and the names of functions stay
 */
export function workingOf(figure: Figure): string {
  const values = new Map(figure.inputs.map(({ symbol, value }) => [symbol, value]));
  return figure.formula.replace(SYMBOL, (name) => {
    const value = values.get(name);
    return value === undefined ? name : plainNumber(value);
  });
}

/** Without gaps between thousands, so that the working is arithmetic for any calculator. */
function plainNumber(value: number): string {
  const text = inPoints(formatNumber(value, 'working')).replaceAll(GAP, '');
  return text.startsWith(MINUS) ? `(${text})` : text;
}
