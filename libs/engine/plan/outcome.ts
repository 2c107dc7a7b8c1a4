import type { MarginMap } from '../duty/margin-map.js';
import type { Bank } from '../layout/bank.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';
import type { BankResult, Result } from './result.js';
import type { SettledSite } from './settled-site.js';
import type { PricedWays } from './weighed-bank.js';

/** Columns of the simulated record, one entry a valid interval, length n. */
export interface OperationSeries {
  /** UTC epoch seconds of the beginning [s] */
  beginS: Float64Array;
  /** active power at the bus [kW] */
  busKw: Float64Array;
  /** the load's own net reactive power at the bus, lagging > 0 [kvar] */
  busKvar: Float64Array;
  /** kvar needed at the bus for the target at the meter [kvar] */
  needKvar: Float64Array;
  /** effective kvar connected [kvar] */
  connectedKvar: Float64Array;
  /** after the bank, at the meter [kW] */
  meterKw: Float64Array;
  /** after the bank, at the meter [kvar] */
  meterLaggingKvar: Float64Array;
  /** after the bank, at the meter [kvar] */
  meterLeadingKvar: Float64Array;
}

/** The same kvar built the other way (without reactors where the bank has them), for comparison on the same scales. */
export interface Rival {
  bank: Bank;
  verdict: 'clear' | 'watch' | 'avoid';
  margins: MarginMap;
  /** levels at which a limit is exceeded in some corner, and levels above 0 in all */
  levelsOver: number;
  levelsAll: number;
}

/** A bank judged on its network: what a page or a paper says of it, whatever the load is known from. */
export interface BankOutcome {
  kind: 'plan' | 'assess';
  site: SettledSite;
  bank: Bank;
  result: BankResult;
  /** I_L, the load current distortion is held against [A] */
  loadA: number;
  margins: MarginMap;
  rival: Rival | null;
  /** what was weighed by its money, to be weighed again; null without a tariff or a bank */
  priced: PricedWays | null;
}

/** Everything a page or a paper needs: the settled inputs, the result and the series behind it. */
export interface Outcome extends BankOutcome {
  record: LoadRecord;
  zone: ZoneTable;
  result: Result;
  series: OperationSeries;
}
