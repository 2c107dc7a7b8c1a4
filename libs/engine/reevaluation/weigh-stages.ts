import { type DeviceRow, shortDevices, shortVerdict } from '../duty/device-row.js';
import { devices } from '../duty/devices.js';
import { firmVerdict } from '../duty/quick-judge.js';
import { CAPACITOR_RULES, graver, type Verdict } from '../duty/rules.js';
import type { BankInput } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import { effectiveKvar } from '../layout/stage.js';
import { billYear } from '../money/bill.js';
import { meetsTarget } from '../operation/operation.js';
import { basisOf, judge, type Judged, overallVerdict } from '../plan/judge-basis.js';
import { type MoneyStudy, moneyStudy } from '../plan/money-study.js';
import { setPointsOf } from '../plan/set-points.js';
import { settleBank, settleControl } from '../plan/settle-bank.js';
import type { Site } from '../plan/site.js';
import { operate, type Study, studySite } from '../plan/study.js';
import type { LoadRecord } from '../record/load-record.js';
import type { ZoneTable } from '../record/zone-table.js';

/** A site and its network without the bank, whatever the load is known from. */
export interface NetworkGround {
  site: Site;
  study: Judged;
}

/** A site, its record, and what does not depend on the bank. */
export interface Ground extends NetworkGround {
  study: Study;
  money: MoneyStudy | null;
}

/** A bank's own verdict, and what is nearest to its limit or farthest over it. */
export interface StagesVerdict {
  verdict: Verdict;
  worstDuty: string | null;
  worstGroup: number | null;
  worstRatio: number | null;
}

/** A bank weighed on the record. */
export interface WeighedStages extends StagesVerdict {
  setPointPowerFactor: number;
  effectiveKvar: number;
  /** lowest billing month with the bank, at the meter; null without energy */
  lowestPowerFactor: number | null;
  monthsBelow: number;
  switchingsPerDay: number;
  /** null without a tariff */
  billPerDay: number | null;
  meetsTarget: boolean;
}

/**
 * Prepares a site and its record for weighing banks.
 * @param site validated site
 * @param record the meter's record
 * @param zone the site's zone over the record
 * @returns study and money
 * @source method-reevaluation
 */
export function groundOf(site: Site, record: LoadRecord, zone: ZoneTable): Ground {
  const study = studySite(site, record, zone);
  return { site, study, money: moneyStudy(study, site) };
}

/**
 * The verdict of a bank by the network alone.
 * @param ground site and its network
 * @param input the bank
 * @returns the verdict and the worst duty
 * @source method-limits
 */
export function networkVerdict(ground: NetworkGround, input: BankInput): StagesVerdict {
  const { study, site } = ground;
  const { bank } = settleBank(input, site.frequencyHz);
  const { control } = settleControl(site.control, bank, study.site);
  const firm = firmVerdict(study.model, bank, basisOf(study, control));
  return {
    verdict: overallVerdict(study, firm),
    worstDuty: firm.worst?.name ?? null,
    worstGroup: firm.worst?.group ?? null,
    worstRatio: firm.worst?.ratio ?? null,
  };
}

/**
 * Devices of a bank that fall short of what it asks of them, of those that were entered.
 * @param ground site and its network
 * @param input the bank
 * @returns rows, none for an empty bank
 * @source method-devices
 */
export function shortDevicesOf({ study, site }: NetworkGround, input: BankInput): DeviceRow[] {
  const { bank } = settleBank(input, site.frequencyHz);
  if (bank.groups.length === 0) return [];
  const { control } = settleControl(site.control, bank, study.site);
  const { nominalV, rules } = study.site;
  const conductorMinA =
    (CAPACITOR_RULES[rules].conductorRatio * kvarOf(input, site) * 1000) / (Math.sqrt(3) * nominalV);
  const { rows } = devices(study.model, bank, bankLevels(bank, nominalV), {
    judge: basisOf(study, control),
    judgement: judge(study, bank, control),
    control,
    conductorMinA,
    facts: { ...study.site.facts, bank: input },
  });
  return shortDevices(rows);
}

/**
 * A verdict with what short devices make of it.
 * @param found the verdict by the network
 * @param short devices that fall short
 * @returns the graver of both
 * @source method-devices
 */
export function withDevices(found: StagesVerdict, short: readonly DeviceRow[]): StagesVerdict {
  return { ...found, verdict: short.reduce((worst, row) => graver(worst, shortVerdict(row)), found.verdict) };
}

function kvarOf(input: BankInput, site: Site): number {
  const { bank } = settleBank(input, site.frequencyHz);
  return bank.groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, site.bus.nominalV), 0);
}

/**
 * A bank weighed on the record: verdict, months, switchings and bill. The set point is the site's; where it misses the
 * target, the lowest above it that meets it.
 * @param ground site, record and study
 * @param input the bank
 * @param known the verdict, where it has been found already
 * @returns the bank in figures
 * @source method-reevaluation
 */
export function weighStages(ground: Ground, input: BankInput, known?: StagesVerdict): WeighedStages {
  const { study, site } = ground;
  const { bank } = settleBank(input, site.frequencyHz);
  const own = settleControl(site.control, bank, study.site).control;
  const higher = setPointsOf({ ...site, control: {} }, study.site.targetPowerFactor).filter(
    (point) => point > own.setPointPowerFactor + 1e-9,
  );
  let control = own;
  let operated = operate(study, bank, own);
  const met = (): boolean => meetsTarget(operated.months, study.site.targetPowerFactor);
  for (const setPointPowerFactor of bank.groups.length === 0 ? [] : higher) {
    if (met()) break;
    const tried = { ...own, setPointPowerFactor };
    const run = operate(study, bank, tried);
    if (!meetsTarget(run.months, study.site.targetPowerFactor)) continue;
    control = tried;
    operated = run;
  }
  const factors = operated.months.flatMap(({ powerFactorLagging: factor }) => (factor === null ? [] : [factor]));
  const days = (study.record.beginS.length * study.record.intervalS) / 86_400;
  return {
    ...(known ?? wholeVerdict(ground, input)),
    setPointPowerFactor: control.setPointPowerFactor,
    effectiveKvar: kvarOf(input, site),
    lowestPowerFactor: factors.length === 0 ? null : Math.min(...factors),
    monthsBelow: factors.filter((factor) => factor < study.site.targetPowerFactor * (1 - 1e-12)).length,
    switchingsPerDay: operated.run.switchings.reduce((sum, count) => sum + count, 0) / days,
    billPerDay: ground.money === null ? null : billYear(ground.money.prepared, operated.meter, false).total / days,
    meetsTarget: met(),
  };
}

function wholeVerdict(ground: Ground, input: BankInput): StagesVerdict {
  const found = networkVerdict(ground, input);
  return found.verdict === 'avoid' ? found : withDevices(found, shortDevicesOf(ground, input));
}
