import type { Ageing } from '../duty/ageing.js';
import { type DeviceName, type DeviceRow, shortDevices, shortVerdict } from '../duty/device-row.js';
import { type Duty, EXCEEDED_RATIO } from '../duty/duty-row.js';
import type { LimitsPoint } from '../duty/limits-point.js';
import type { MeasuredCheck } from '../duty/measured-check.js';
import { CAPACITOR_RULES, graver, type RuleSet, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import type { Control } from '../operation/control.js';
import { type Remark, remark } from '../problem.js';
import type { Judged } from './judge-basis.js';

/** What is judged beside the network and the duties. */
export interface Beside {
  limits: LimitsPoint;
  devices: DeviceRow[];
  ageing: Ageing;
  measured: MeasuredCheck | null;
}

/**
 * What devices and measurements make of the verdict: a device short by a standard rules the bank out, by custom asks for a
 * second look; so do a capacitor's voltage that only the level's own rise takes over its limit, and a reading above every
 * corner of the model.
 * @param beside devices, ageing, measurement
 * @returns `clear` where nothing speaks against it; ageing never counts
 * @source method-devices, method-measured, method-ageing
 */
export function verdictBeside({ devices, measured }: Beside): Verdict {
  const short = shortDevices(devices).reduce<Verdict>((worst, row) => graver(worst, shortVerdict(row)), 'clear');
  const above = (measured?.rows ?? []).some(({ standing }) => standing === 'above');
  const risen = devices.some(({ device, state }) => RISEN_DEVICES.includes(device) && state === 'short');
  return graver(short, above || risen ? 'watch' : 'clear');
}

/**
 * What devices, measurement, ageing, fast loads and the point judged give to say.
 * @param judged settled site and its network
 * @param bank the bank
 * @param made settings, and the duties that were judged already
 * @param beside devices, ageing, measurement
 * @returns reasons, without words
 * @source method-devices, method-measured, method-ageing
 */
export function reasonsBeside(
  judged: Judged,
  bank: Bank,
  made: { control: Control; duties: readonly Duty[] },
  beside: Beside,
): Remark[] {
  const { control, duties } = made;
  return [
    ...shortDevices(beside.devices).map(deviceReason),
    ...riseReasons(beside.devices, duties, judged.site.rules),
    ...measuredReasons(beside.measured, judged.site.facts.measured?.bankKvar ?? 0),
    ...(bank.groups.length === 0 ? [] : [...ageingReasons(beside.ageing, duties), ...loadReasons(judged, control)]),
  ];
}

/** Rows that count the level's own rise, which the duties of the same name leave out. */
const RISEN_DEVICES: readonly DeviceName[] = ['capacitor.voltage', 'capacitor.crest'];

// Within its limit by the highest bus voltage that was entered, over it where the level's own rise is not in that voltage.
function riseReasons(devices: readonly DeviceRow[], duties: readonly Duty[], rules: RuleSet): Remark[] {
  const over = (group: number | null): boolean =>
    duties.some(
      ({ group: of, name, verdict }) => of === group && /, (?:highest|crest)$/.test(name) && verdict === 'avoid',
    );
  // what the rise asks for: a rated voltage may have to be higher for the continuous voltage, which has no rise in it
  const { highestVoltageRatio } = CAPACITOR_RULES[rules];
  const asked = ({ device, value, least }: DeviceRow): number =>
    device === 'capacitor.voltage' ? Number(value) / highestVoltageRatio : Number(least);
  const short = devices.filter(
    (row) =>
      RISEN_DEVICES.includes(row.device) && row.state === 'short' && asked(row) / Number(row.fitted) > EXCEEDED_RATIO,
  );
  const asksMost = (row: DeviceRow): boolean =>
    short.every((one) => one.group !== row.group || asked(one) <= asked(row));
  return short
    .filter((row) => asksMost(row) && !over(row.group))
    .map((row) => {
      const { group, fitted, unit, source } = row;
      const values = { group: group! + 1, value: fitted!, limit: asked(row) };
      return remark('device.riseOverLimit', values, { unit, source, path: 'bus.highestV' });
    });
}

function deviceReason(row: DeviceRow): Remark {
  const values: Record<string, number | string> = { device: row.device };
  if (row.group !== null) values.group = row.group + 1;
  if (row.fitted !== null) values.value = row.fitted;
  const { least, most } = row;
  const passed =
    typeof row.fitted === 'number' && typeof most === 'number' && row.fitted > most ? most : (least ?? most);
  if (passed !== null) values.limit = passed;
  return remark(shortCode(row), values, { unit: row.unit, source: row.source });
}

function shortCode(row: DeviceRow): string {
  if (row.basis === 'site') return 'device.noResponse';
  return shortVerdict(row) === 'avoid' ? 'device.short' : 'device.shortByPractice';
}

function measuredReasons(measured: MeasuredCheck | null, bankKvar: number): Remark[] {
  if (measured === null) return [];
  if (measured.levelKvar === null)
    return [remark('measured.noLevel', { bankKvar }, { path: 'loads.measured.bankKvar' })];
  const off = measured.rows.filter(({ standing }) => standing !== 'within');
  return off.map(({ quantity, orderH, unit, standing, low, high, ...row }) =>
    remark(
      standing === 'above' ? 'measured.above' : 'measured.below',
      { quantity, orderH, value: row.measured, limit: standing === 'above' ? high : low, bus: measured.bus },
      { unit, path: 'loads.measured' },
    ),
  );
}

function ageingReasons({ cases, stages }: Ageing, duties: readonly Duty[]): Remark[] {
  // What was measured, against the capacitance at which that stage must come out.
  const due = cases.flatMap(({ group, from, capacitanceUf }) => {
    const comesOutUf = group === null ? null : stages[group]!.comesOutUf;
    if (from !== 'measured' || group === null || capacitanceUf === null || comesOutUf === null) return [];
    if (capacitanceUf >= comesOutUf) return [];
    return [
      remark(
        'ageing.takeOut',
        { group: group + 1, capacitanceUf, comesOutUf },
        { path: `bank.stages[${group}].measuredUf` },
      ),
    ];
  });
  return [...due, ...limitReasons(cases, duties)];
}

// A limit that is passed as the bank stands is not passed by age; one that joins it is.
function limitReasons(cases: Ageing['cases'], duties: readonly Duty[]): Remark[] {
  const already = duties.filter(({ verdict }) => verdict === 'avoid');
  return cases.flatMap(({ group, capacitanceFactor, tunedOrderH, exceeded }) => {
    const passed = exceeded.find((one) =>
      already.every(({ name, group: of }) => name !== one.name || of !== one.group),
    );
    if (passed === undefined) return [];
    const values: Record<string, number | string> = { leftPct: 100 * capacitanceFactor, duty: passed.name };
    if (group !== null) values.group = group + 1;
    if (tunedOrderH !== null) values.tunedOrderH = tunedOrderH;
    return [remark('ageing.overLimit', values, { source: 'practice' })];
  });
}

function loadReasons(judged: Judged, control: Control): Remark[] {
  const { fast, photovoltaicKw } = judged.site.facts;
  const found = fast.map(({ name, swingS, swingKvar }) => {
    const values: Record<string, number | string> = { name, stepDelayS: control.stepDelayS };
    if (swingS !== undefined) values.swingS = swingS;
    if (swingKvar !== undefined) values.swingKvar = swingKvar;
    return remark('loads.fast', values, { path: 'loads.fast' });
  });
  if (photovoltaicKw > 0)
    found.push(remark('supply.photovoltaic', { photovoltaicKw }, { path: 'supply.photovoltaicKw' }));
  return found;
}

/**
 * Where a transformer lies between the bus and the network, that the bus is the point of coupling is an assumption.
 * @param judged settled site and its network
 * @param limits the point judged
 * @returns one line or none
 */
export function pointAssumption(judged: Judged, limits: LimitsPoint): Remark[] {
  const { site } = judged;
  if (site.topology !== null || site.supply.transformers.length === 0 || limits.couplingPoint === 'primary') return [];
  return [remark('default.limits.point', { point: limits.couplingPoint }, { path: 'meteredAt' })];
}

/**
 * Where copies of a standard disagree the tighter one is used, and said so where an order present meets it.
 * @param judged settled site and its network
 * @returns one line or none
 */
export function copyNote(judged: Judged): Remark[] {
  const { limits, emcClass } = judged.site;
  const met = judged.model.excitation.ordersH.includes(DISPUTED.orderH);
  if (limits.edition !== DISPUTED.edition || emcClass !== DISPUTED.emcClass || !met) return [];
  const { edition, orderH, usedPct, otherPct } = DISPUTED;
  return [remark('limits.tighterCopy', { edition, orderH, usedPct, otherPct }, { path: 'limits.edition' })];
}

/** The one row of which copies were seen to differ. */
const DISPUTED = {
  edition: 'IEC 61000-2-4:2002',
  emcClass: 2,
  orderH: 21,
  usedPct: 0.2,
  otherPct: 0.3,
} as const;
