import type { BankInput } from '../layout/bank.js';
import type { FastLoad, MeasuredDistortion } from '../network/loads.js';
import type { Earthing } from '../supply/supply.js';

/** Where the bank stands. */
export interface BankPlace {
  /** greatest air temperature around the bank [°C] */
  ambientMaxC?: number;
  /** highest mean over a day [°C] */
  ambientDayC?: number;
  /** mean over a year [°C] */
  ambientYearC?: number;
  altitudeM?: number;
  indoors?: boolean;
  /** protection of the enclosure, "IP31" */
  enclosureIp?: string;
  ventilation?: 'none' | 'natural' | 'forced';
  /** air that the ventilation moves [m³/h] */
  airFlowM3PerH?: number;
  /** how much warmer than its surroundings the air in the enclosure may get [K] */
  allowedRiseK?: number;
}

/** The controller's current transformer. */
export interface CurrentTransformer {
  /** what flows through it: everything, the loads without the bank, or the bank alone */
  place?: 'incomer' | 'load' | 'bank';
  ratioPrimaryA: number;
  ratioSecondaryA: number;
  phase?: 'L1' | 'L2' | 'L3';
  /** one transformer, or several incomers added by a summing one (then the ratio is that of the sum) */
  wiring?: 'single' | 'summed';
  /** least current the controller answers to, as its maker states it [A] */
  sensitivityA?: number;
}

/** What the bank may do while a generator feeds the site. */
export interface GeneratorRule {
  /** the bank is held off */
  holdOff?: boolean;
  /** most kvar that may be connected [kvar] */
  allowedKvar?: number;
}

/** Facts of a site that devices are held against; absent ones leave their rows open. */
export interface SiteFacts {
  place: BankPlace;
  earthing: Earthing | null;
  photovoltaicKw: number;
  fast: readonly FastLoad[];
  measured: MeasuredDistortion | null;
  currentTransformer: CurrentTransformer | null;
  generator: GeneratorRule;
  /** the bank as the site file gives it; a plan does without */
  bank: BankInput | null;
}
