import { couplesAtPrimary } from '../duty/limits-point.js';
import type { Bank } from '../layout/bank.js';
import { type NetworkModel, siteNetwork } from '../network/network-model.js';
import type { Control } from '../operation/control.js';
import type { ControllerView } from '../operation/controller-view.js';
import { type MeterAfter, meterAfterInto } from '../operation/meter-after.js';
import { type OperationMonth, operationMonths, type Simulated } from '../operation/operation.js';
import { simulate } from '../operation/simulate.js';
import { switchedBank } from '../operation/switched-bank.js';
import { type Remark, remark } from '../problem.js';
import { tanFromPowerFactor } from '../quantity/power-factor.js';
import type { LoadRecord } from '../record/load-record.js';
import { type RecordSummary, summarizeRecord } from '../record/record-summary.js';
import { type MonthIndex, monthIndex, type ZoneTable } from '../record/zone-table.js';
import { type BusLoad, busLoad, type OldBank } from '../requirement/bus-load.js';
import type { MonthlyBill } from '../requirement/estimate-input.js';
import { needColumn, type Target, targetKw } from '../requirement/need.js';
import { type RequirementSummary, summarizeRequirement } from '../requirement/requirement.js';
import { meteringOf } from './metering-of.js';
import { type TurnedLoad, turnedLoad } from './recorded-bank.js';
import { type RunColumns, runColumns } from './run-columns.js';
import { settleSite } from './settle-site.js';
import type { SettledSite } from './settled-site.js';
import type { Site } from './site.js';

/** Everything about a site and its record that does not depend on the bank. */
export interface Study {
  site: SettledSite;
  record: LoadRecord;
  zone: ZoneTable;
  assumptions: Remark[];
  target: Target;
  load: BusLoad;
  needKvar: Float64Array;
  months: MonthIndex;
  recordSummary: RecordSummary;
  requirement: RequirementSummary;
  /** bills that were typed in beside the record; empty where none were */
  bills: readonly MonthlyBill[];
  model: NetworkModel;
  /** (U/U_nom)² per interval, or null */
  voltageScale: Float64Array | null;
  /** the range of a record that was taken with a bank switching; null for any other */
  turned: TurnedLoad | null;
}

/**
 * Prepares a site and its record: defaults, load at the bus, need, network without the bank.
 * @param site validated site
 * @param record the meter's record
 * @param zone the site's zone over the record
 * @returns what every candidate bank is judged against
 * @throws InputProblem where the inputs contradict each other
 * @source method-requirement
 */
export function studySite(site: Site, record: LoadRecord, zone: ZoneTable): Study {
  const { site: settled, assumptions } = settleSite(site, record);
  const net = busLoad(record, meteringOf(settled), oldBank(settled));
  const turned = turnedLoad(site, settled, net, record);
  const load = turned?.load ?? net;
  const target: Target = { powerFactor: settled.targetPowerFactor, onExport: settled.onExport };
  const needKvar = needColumn(load, target, record.beginS);
  const months = monthIndex(record.beginS, zone);
  const loadA = (greatestKva(load) * 1000) / (Math.sqrt(3) * settled.nominalV);
  return {
    site: settled,
    record,
    zone,
    assumptions: [
      ...assumptions,
      ...(site.estimate === undefined ? [] : [remark('estimate.recordWins', {}, { path: 'estimate' })]),
    ],
    target,
    load,
    needKvar,
    months,
    recordSummary: summarizeRecord(record),
    requirement: summarizeRequirement(record, needKvar, months, settled.targetPowerFactor),
    bills: site.estimate?.bills ?? [],
    model: siteNetwork(settled.supply, settled.loads, {
      nominalV: settled.nominalV,
      loadA,
      topology: settled.topology,
      primary: couplesAtPrimary(settled),
    }),
    voltageScale: record.voltageV?.map((u) => (u / settled.nominalV) ** 2) ?? null,
    turned,
  };
}

function oldBank(site: SettledSite): OldBank {
  if (site.recordedBank.state === 'fixed') return { state: 'fixed', kvar: site.recordedBank.kvar };
  return site.recordedBank.state === 'logged' ? { state: 'logged' } : { state: 'none' };
}

function greatestKva(load: BusLoad): number {
  let square = 0;
  for (let i = 0; i < load.activeKw.length; i++) {
    square = Math.max(square, load.activeKw[i]! ** 2 + load.reactiveKvar[i]! ** 2);
  }
  return Math.sqrt(square);
}

/** A bank simulated over the record. */
export interface Operated extends Simulated {
  control: Control;
  months: OperationMonth[];
}

/**
 * Columns for a bank's simulation; where the meter stands at the bus, its active power is the record's own.
 * @param study site and record
 * @returns columns of length n
 */
export function meterColumns({ record, load }: Study): RunColumns {
  return runColumns(record.beginS.length, load.metering.at === 'bus' ? record.activeKw : undefined);
}

/** What a simulation may be given. */
export interface OperateGiven {
  /** what the controller sees, length n; the interval's own averages where absent */
  view?: ControllerView;
  /** columns of the same study, written over; new ones where absent */
  columns?: RunColumns;
}

/**
 * Simulates a bank over the record and totals the meter after it.
 * @param study site and record
 * @param bank the bank
 * @param control settings
 * @param given what is there already
 * @returns columns and monthly energies at the meter
 * @source method-controller
 */
export function operate(
  study: Study,
  bank: Bank,
  control: Control,
  { view = controllerView(study, control.setPointPowerFactor), columns = meterColumns(study) }: OperateGiven = {},
): Operated {
  const { record, load } = study;
  const { connectedKvar, meter } = columns;
  const run = simulate(switchedBank(bank, study.site.nominalV), control, view, connectedKvar);
  const deliveredKvar = atVoltage(run.connectedKvar, study.voltageScale);
  meterAfterInto(meter, { record, load, connectedKvar: deliveredKvar }, 0, deliveredKvar.length);
  return {
    beginS: record.beginS,
    intervalS: record.intervalS,
    load,
    run,
    deliveredKvar,
    meter,
    control,
    months: operationMonths(meter, study.months, record.intervalS / 3600),
  };
}

/**
 * What a controller sees of the record at a set point: wanted = Q − P⁺·tan φ_set at the bus.
 * @param study site and record
 * @param setPointPowerFactor λ steered towards
 * @param wantedKvar receives what is wanted, length n; new where absent [kvar]
 * @returns columns of length n
 * @source method-controller
 */
export function controllerView(
  study: Study,
  setPointPowerFactor: number,
  wantedKvar: Float64Array = new Float64Array(study.record.beginS.length),
): ControllerView {
  const { record, load } = study;
  wantedInto(wantedKvar, load, tanFromPowerFactor(setPointPowerFactor), study.target.onExport);
  const { intervalS, beginS, standby } = record;
  return { intervalS, beginS, wantedKvar, voltageScale: study.voltageScale, standby };
}

function wantedInto(wantedKvar: Float64Array, load: BusLoad, tanSet: number, onExport: Target['onExport']): void {
  const { activeKw, reactiveKvar } = load;
  for (let i = 0; i < wantedKvar.length; i++) {
    wantedKvar[i] = reactiveKvar[i]! - targetKw(activeKw[i]!, onExport) * tanSet;
  }
}

/**
 * Meter columns with the same stages connected throughout; a bound on what any bank of that size can do.
 * @param study site and record
 * @param kvar effective kvar connected at the bus, at nominal voltage; each interval's voltage scales it [kvar]
 * @param columns written over; new ones where absent
 * @returns columns at the meter
 */
export function meterWithConstant(
  study: Study,
  kvar: number,
  { connectedKvar, meter } = runColumns(study.record.beginS.length),
): MeterAfter {
  const { record, load, voltageScale } = study;
  connectedKvar.fill(kvar);
  if (voltageScale !== null) for (let i = 0; i < connectedKvar.length; i++) connectedKvar[i]! *= voltageScale[i]!;
  meterAfterInto(meter, { record, load, connectedKvar }, 0, connectedKvar.length);
  return meter;
}

function atVoltage(connectedKvar: Float64Array, voltageScale: Float64Array | null): Float64Array {
  return voltageScale === null ? connectedKvar : connectedKvar.map((kvar, i) => kvar * voltageScale[i]!);
}
