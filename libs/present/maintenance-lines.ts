import {
  type CheckBasis,
  type CheckName,
  type EstimateOutcome,
  type MaintenanceCheck,
  maintenanceChecks,
  type Outcome,
} from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { groupName } from './group-name.js';
import { say, words } from './language.js';

/** A line of the maintenance plan. */
export interface MaintenanceLine {
  check: string;
  every: string;
  expected: string;
  rejected: string;
  basis: string;
}

/** What is done, and what it is rejected for where no number says it. */
const WORDS: Record<CheckName, { check: string; rejected?: string }> = words({
  capacitance: { check: 'capacitance of each delta phase, discharged and isolated' },
  stageCurrent: { check: 'current of each phase of a stage, as at nominal voltage' },
  dischargeTime: { check: 'voltage left after switching off' },
  dischargeResistor: { check: 'discharge resistor' },
  distortion: { check: 'voltage distortion with all stages in' },
  switchings: {
    check: 'count of switchings, most of a stage in a year',
    rejected: 'the switch’s stated life for capacitors',
  },
  switch: { check: 'contacts of the switches', rejected: 'burnt, welded, or a phase that stays off' },
  connections: { check: 'torque of connections, heat under load', rejected: 'one joint warmer than its like by 10 K' },
  ventilation: { check: 'filters and fan', rejected: 'air below what section 7.2 asks for' },
  vessels: { check: 'capacitor cans and reactors', rejected: 'swollen, leaking, scorched or humming anew' },
  settings: {
    check: 'settings against the sheet of section 16',
    rejected: 'any that differs and was not written down',
  },
  record: { check: 'power factor of the month against section 8', rejected: 'a month below the target' },
});

const BASES: Record<CheckBasis, string> = words({
  computed: 'computed: the verdict turns there',
  standard: 'standard',
  limit: 'limit of the bus',
  practice: 'common practice',
});

/**
 * Checks of a bank in service, each with its interval, what is expected and what is rejected.
 * @param outcome plan or judgement
 * @returns one line a check
 */
export function maintenanceLines(outcome: Outcome | EstimateOutcome): MaintenanceLine[] {
  const several = outcome.bank.groups.length > 1;
  return maintenanceChecks(outcome).map((check) => ({
    check: nameOf(outcome, check, several),
    every: say`${formatNumber(check.everyMonths, 'whole')}\u00a0months`,
    expected: expectedOf(outcome, check),
    rejected: rejectedOf(check),
    basis: basisOf(check),
  }));
}

function nameOf({ result }: Outcome | EstimateOutcome, { check, group }: MaintenanceCheck, several: boolean): string {
  const { check: words } = WORDS[check];
  if (group === null) return words;
  const after =
    check === 'dischargeTime'
      ? say`, ${formatQuantity(result.charge.stages[group]!.dischargeWithinS, 's', 'given')} later`
      : '';
  return `${words}${after}${several ? `, ${groupName(group)}` : ''}`;
}

/** Without a stated resistor the one that the plan asks for is expected. */
function expectedOf({ result }: Outcome | EstimateOutcome, { check, group, expected, unit }: MaintenanceCheck): string {
  if (check === 'dischargeResistor' && expected === null && group !== null) {
    return say`at most ${formatQuantity(result.charge.stages[group]!.requiredOhm, unit)}`;
  }
  return expected === null ? '–' : formatQuantity(expected, unit);
}

function rejectedOf({ check, least, most, unit }: MaintenanceCheck): string {
  const parts = [
    ...(least === null ? [] : [say`below ${formatQuantity(least, unit)}`]),
    ...(most === null ? [] : [say`above ${formatQuantity(most, unit)}`]),
  ];
  return parts.length > 0 ? parts.join(', ') : (WORDS[check].rejected ?? '–');
}

function basisOf({ basis, source }: MaintenanceCheck): string {
  return basis === 'standard' || basis === 'limit' ? `${BASES[basis]}: ${engineName(source)}` : BASES[basis];
}
