import type { ZoneTable } from '../record/zone-table.js';
import { type BillBounds, billBounds } from './bill-bounds.js';
import type { Metering } from './bus-load.js';
import type { EstimateInput } from './estimate-input.js';
import { type ListNeed, listNeed } from './list-need.js';
import type { Target } from './need.js';

/** Bills and list side by side, at the meter, in the month of greatest demand. */
export interface EstimateCompared {
  month: string;
  billedKw: number;
  listedKw: number;
  billedKvar: number;
  listedKvar: number;
}

/** What is known of a load without a meter's record. */
export interface LoadEstimate {
  basis: 'bills' | 'equipment' | 'bills and equipment';
  /** empty without bills */
  months: BillBounds[];
  /** null without a list */
  equipment: ListNeed | null;
  /** null unless there are both */
  compared: EstimateCompared | null;
  /** greatest lower bound over the months; null without bills [kvar] */
  lowerKvar: number | null;
  /** greatest upper bound over the months; null without bills [kvar] */
  upperKvar: number | null;
  /** what a bank is sized by: the upper bound, or the list's need without bills [kvar] */
  sizedKvar: number;
}

/** What an estimate is read by. */
export interface EstimateBasis {
  zone: ZoneTable;
  metering: Metering;
  target: Target;
  /** of an old bank that was connected throughout the bills [kvar] */
  addedKvar: number;
}

/**
 * The load from bills, an equipment list, or both; where there are both the bills, which were measured, size the bank.
 * @param input validated, with bills or equipment
 * @param basis zone, metering, target, old bank
 * @returns bounds, list and comparison
 * @throws InputProblem where a bill contradicts itself or the transformers can't carry the list
 * @source method-estimate
 */
export function loadEstimate(input: EstimateInput, basis: EstimateBasis): LoadEstimate {
  const { zone, target, addedKvar } = basis;
  const bills = input.bills ?? [];
  const months = billBounds(bills, { zone, targetPowerFactor: target.powerFactor, addedKvar });
  const equipment = input.equipment === undefined ? null : listNeed(input.equipment, basis.metering, target);
  const most = (key: 'lowerKvar' | 'upperKvar'): number | null =>
    months.length === 0 ? null : Math.max(...months.map((month) => month[key]));
  const upperKvar = most('upperKvar');
  return {
    basis: basisName(months.length > 0, equipment !== null),
    months,
    equipment,
    compared: equipment === null || months.length === 0 ? null : compared(months, equipment, addedKvar),
    lowerKvar: most('lowerKvar'),
    upperKvar,
    sizedKvar: upperKvar ?? equipment?.neededKvar ?? 0,
  };
}

function basisName(hasBills: boolean, hasEquipment: boolean): LoadEstimate['basis'] {
  if (hasBills && hasEquipment) return 'bills and equipment';
  return hasBills ? 'bills' : 'equipment';
}

function compared(months: readonly BillBounds[], { meter }: ListNeed, addedKvar: number): EstimateCompared {
  const peak = months.reduce((most, month) => (month.maxKw > most.maxKw ? month : most));
  return {
    month: peak.month,
    billedKw: peak.maxKw,
    listedKw: meter.activeKw,
    billedKvar: peak.peakKvar + addedKvar,
    listedKvar: meter.reactiveKvar,
  };
}
