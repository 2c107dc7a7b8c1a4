import { switchedBank } from '../operation/switched-bank.js';
import { type MeteredWithBank, type TurnedBack, turnBack } from '../operation/turn-back.js';
import { tanFromPowerFactor } from '../quantity/power-factor.js';
import type { LoadRecord } from '../record/load-record.js';
import type { BusLoad } from '../requirement/bus-load.js';
import { needColumn, type Target, targetKw } from '../requirement/need.js';
import { measuredBank } from './measured-bank.js';
import { settleBank, settleControl } from './settle-bank.js';
import type { SettledSite } from './settled-site.js';
import type { Site } from './site.js';

/** A record turned back into the load's own, in figures. */
export interface RecordedBankSummary {
  intervals: number;
  /** share of the intervals in which only one level of the old bank was possible [%] */
  certainPct: number;
  /** intervals that no level explains */
  unexplained: number;
  /** mean of what the old bank gave, and the range it lies in [kvar] */
  meanKvar: number;
  meanLowKvar: number;
  meanHighKvar: number;
  /** greatest need, and the range it lies in [kvar] */
  maxNeedKvar: number;
  maxNeedLowKvar: number;
  maxNeedHighKvar: number;
}

/** The load as it was without the old bank, with the loads at the ends of the range. */
export interface TurnedLoad {
  load: BusLoad;
  low: BusLoad;
  high: BusLoad;
  turned: TurnedBack;
}

/**
 * The load's own power from a record taken with a bank switching.
 * @param site validated site, its recorded bank `switching`
 * @param settled the same, settled
 * @param net power at the bus as metered, old bank in it, length n
 * @param record the meter's record
 * @returns the load and its range, or null where no bank was switching
 * @throws InputProblem where the old bank can't be read
 * @source method-recorded-bank
 */
export function turnedLoad(site: Site, settled: SettledSite, net: BusLoad, record: LoadRecord): TurnedLoad | null {
  const { recordedBank } = site;
  if (recordedBank?.state !== 'switching') return null;
  const given = recordedBank.bank ?? site.bank!;
  const path = recordedBank.bank === undefined ? 'bank' : 'recordedBank.bank';
  const { nominalV, frequencyHz, asOf, onExport } = settled;
  const nameplate = settleBank(given, frequencyHz).bank;
  const { bank } = measuredBank(given, nameplate, { nominalV, frequencyHz, asOf }, path);
  const { control } = settleControl(recordedBank.control ?? site.control, nameplate, settled);
  const bounds = recordedBank.loadPowerFactor;
  const metered: MeteredWithBank = {
    intervalS: record.intervalS,
    beginS: record.beginS,
    targetKw: net.activeKw.map((kw) => targetKw(kw, onExport)),
    netKvar: net.reactiveKvar,
    tanSet: tanFromPowerFactor(control.setPointPowerFactor),
    loadTan:
      bounds === undefined ? null : { least: tanFromPowerFactor(bounds.max), most: tanFromPowerFactor(bounds.min) },
    voltageScale: record.voltageV?.map((u) => (u / nominalV) ** 2) ?? null,
    standby: record.standby,
  };
  const turned = turnBack(switchedBank(bank, nominalV), control, metered);
  const plus = (kvar: Float64Array): BusLoad => ({
    ...net,
    reactiveKvar: net.reactiveKvar.map((q, i) => q + kvar[i]!),
  });
  return { load: plus(turned.kvar), low: plus(turned.lowKvar), high: plus(turned.highKvar), turned };
}

/**
 * The range of a record turned back, in figures.
 * @param given the load and its range
 * @param target what the target asks for
 * @param record the meter's record
 * @returns shares, means and the range of the greatest need
 * @source method-recorded-bank
 */
export function recordedBankSummary(given: TurnedLoad, target: Target, record: LoadRecord): RecordedBankSummary {
  const { turned } = given;
  const intervals = record.beginS.length;
  const mean = (column: Float64Array): number => column.reduce((sum, kvar) => sum + kvar, 0) / intervals;
  const most = (load: BusLoad): number =>
    needColumn(load, target, record.beginS).reduce((greatest, need) => Math.max(greatest, need), 0);
  return {
    intervals,
    certainPct: (100 * turned.certain) / intervals,
    unexplained: turned.unexplained,
    meanKvar: mean(turned.kvar),
    meanLowKvar: mean(turned.lowKvar),
    meanHighKvar: mean(turned.highKvar),
    maxNeedKvar: most(given.load),
    maxNeedLowKvar: most(given.low),
    maxNeedHighKvar: most(given.high),
  };
}
