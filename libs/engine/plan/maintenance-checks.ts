import { CAPACITOR_RULES } from '../duty/rules.js';
import { stageA } from '../duty/stage-devices.js';
import { ratedA } from '../layout/stage.js';
import { type EstimateOutcome, isEstimate } from './estimate-result.js';
import type { BankOutcome, Outcome } from './outcome.js';

/** What is looked at while the bank is in service. */
export const CHECK_NAMES = [
  'capacitance',
  'stageCurrent',
  'dischargeTime',
  'dischargeResistor',
  'distortion',
  'switchings',
  'switch',
  'connections',
  'ventilation',
  'vessels',
  'settings',
  'record',
] as const;

export type CheckName = (typeof CHECK_NAMES)[number];

/** What a reject value rests on. */
export type CheckBasis = 'computed' | 'standard' | 'limit' | 'practice';

/** One check of maintenance: how often, what is expected, and beyond what it is rejected. */
export interface MaintenanceCheck {
  check: CheckName;
  /** entry of `bank.stages`, null for the bank as a whole */
  group: number | null;
  /** time between two checks [months] */
  everyMonths: number;
  /** as it should be found, in `unit` */
  expected: number | null;
  /** rejected below and above, in `unit` */
  least: number | null;
  most: number | null;
  unit: string;
  basis: CheckBasis;
  source: string;
}

/** End of life of a capacitor where no verdict turns before it: share of the nameplate's; common practice. */
const END_OF_LIFE = { new: 0.9, installed: 0.8, measured: 0.8 } as const;
/** The largest capacitance that was judged, as a share of the nameplate's. */
const MOST_CAPACITANCE = 1.1;
const YEARLY = 12;
const HALF_YEARLY = 6;
const QUARTERLY = 3;
const YEAR_S = 365 * 86_400;

type Row = Pick<MaintenanceCheck, 'check' | 'basis'> & Partial<MaintenanceCheck>;

/**
 * Checks of a bank in service with their reject values. The capacitance at which a stage comes out is the one at which
 * the verdict turns graver; where none does, the customary end of life.
 * @param outcome plan or judgement
 * @returns checks, group by group and then of the bank; none for an empty bank
 * @source method-ageing, iec-60831-1, nec-460, practice
 */
export function maintenanceChecks(outcome: Outcome | EstimateOutcome): MaintenanceCheck[] {
  const { bank } = outcome;
  if (bank.groups.length === 0) return [];
  return [...bank.groups.flatMap((_, g) => groupChecks(outcome, g)), ...bankChecks(outcome)].map((row) => ({
    group: null,
    everyMonths: YEARLY,
    expected: null,
    least: null,
    most: null,
    unit: '',
    source: '',
    ...row,
  }));
}

function groupChecks({ bank, result, site }: BankOutcome, group: number): Row[] {
  const of = bank.groups[group]!;
  const rules = CAPACITOR_RULES[site.rules];
  const charge = result.charge.stages[group]!;
  const { share, basis, source } = leastCapacitance(result, group);
  const atNominalA = stageA(of, site.nominalV);
  return [
    {
      check: 'capacitance',
      group,
      expected: charge.capacitanceUf,
      least: share * charge.capacitanceUf,
      most: MOST_CAPACITANCE * charge.capacitanceUf,
      unit: 'µF',
      basis,
      source,
    },
    {
      check: 'stageCurrent',
      group,
      expected: atNominalA,
      least: share * atNominalA,
      most: rules.currentRatio * ratedA(of),
      unit: 'A',
      basis: 'standard',
      source: rules.source,
    },
    {
      check: 'dischargeTime',
      group,
      most: charge.dischargeToV,
      unit: 'V',
      basis: 'standard',
      source: rules.dischargeSource,
    },
    {
      check: 'dischargeResistor',
      group,
      expected: of.dischargeOhm,
      most: charge.requiredOhm,
      unit: 'Ω',
      basis: 'standard',
      source: rules.dischargeSource,
    },
  ];
}

function leastCapacitance(
  { ageing }: BankOutcome['result'],
  group: number,
): { share: number; basis: CheckBasis; source: string } {
  const comesOutPct = ageing.stages[group]?.comesOutPct ?? null;
  if (comesOutPct !== null) return { share: comesOutPct / 100, basis: 'computed', source: 'method-ageing' };
  const from = ageing.cases[0]?.from ?? 'new';
  return { share: END_OF_LIFE[from], basis: 'practice', source: 'practice' };
}

function bankChecks(outcome: Outcome | EstimateOutcome): Row[] {
  const { result } = outcome;
  const limit = result.duties.find(({ name }) => name === 'voltage distortion');
  const practice = { basis: 'practice', source: 'practice' } as const;
  return [
    {
      check: 'distortion',
      expected: limit?.value ?? null,
      most: limit?.limit ?? null,
      unit: '%',
      basis: limit?.limit == null ? 'practice' : 'limit',
      source: limit?.source ?? 'practice',
    },
    { check: 'switchings', ...practice, expected: yearlySwitchings(outcome) },
    { check: 'switch', ...practice },
    { check: 'connections', ...practice },
    { check: 'ventilation', ...practice, everyMonths: QUARTERLY },
    { check: 'vessels', ...practice, everyMonths: HALF_YEARLY },
    { check: 'settings', ...practice },
    { check: 'record', ...practice },
  ];
}

// Of the stage that is switched most, scaled from the record to a year.
function yearlySwitchings(outcome: Outcome | EstimateOutcome): number | null {
  if (isEstimate(outcome)) return null;
  const { record, result } = outcome;
  return (Math.max(0, ...result.operation.switchings) * YEAR_S) / (record.endS - record.firstS);
}
