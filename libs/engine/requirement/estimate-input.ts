/** One month's bill; the greatest demand in kW or kVA, or both. */
export interface MonthlyBill {
  /** local calendar month "2024-01" */
  month: string;
  /** imported [kWh] */
  activeKwh: number;
  /** [kvarh] */
  laggingKvarh: number;
  /** greatest demand [kW] */
  maxKw?: number;
  /** greatest demand [kVA] */
  maxKva?: number;
}

/** Equal loads of an equipment list, as the site file gives them. */
export interface EquipmentEntry {
  name: string;
  /** 1 where absent */
  count?: number;
  /** what one gives at its shaft, or its output [kW] */
  ratedKw: number;
  /** of the entry at this load [%] */
  efficiencyPct: number;
  /** at this load, lagging */
  powerFactor: number;
  /** what one gives over what it is rated for, 1 where absent */
  loadFactor?: number;
  /** share of them that runs at the time of greatest demand, 1 where absent */
  coincidence?: number;
}

/** What stands in place of a meter's record. */
export interface EstimateInput {
  bills?: MonthlyBill[];
  equipment?: EquipmentEntry[];
}
