import { naturalReconnectDelayS } from '../duty/charge.js';
import type { Duty } from '../duty/duty-row.js';
import type { Judgement } from '../duty/judge-bank.js';
import { PEAK_REACH_H } from '../duty/judge-bank.js';
import type { Bank } from '../layout/bank.js';
import type { Control } from '../operation/control.js';
import { type Remark, remark } from '../problem.js';
import { type Judged, overwhelmingKva } from './judge-basis.js';

/**
 * What the duties, the supply and the network give to say, gravest first.
 * @param judged settled site and its network
 * @param bank the bank
 * @param judgement the bank judged
 * @returns reasons, without words
 * @source method-limits
 */
export function judgementReasons(judged: Judged, bank: Bank, judgement: Judgement): Remark[] {
  const duties = (verdict: Duty['verdict']): Duty[] => judgement.duties.filter((duty) => duty.verdict === verdict);
  return [
    ...duties('avoid').map((duty) => dutyReason('limit.exceeded', duty)),
    ...duties('watch').map((duty) => dutyReason(watchCode(duty), duty)),
    ...supplyReasons(judged, judgement),
    ...networkReasons(judged, bank, judgement),
  ];
}

function watchCode(duty: Duty): string {
  if (duty.ratio === null || duty.ratio <= 1) return 'limit.near';
  return duty.name.startsWith('inrush current') ? 'inrush.assumedInductance' : 'limit.exceededAlready';
}

function dutyReason(code: string, duty: Duty): Remark {
  const values: Record<string, number | string> = { duty: duty.name, value: duty.value };
  if (duty.limit !== null) values.limit = duty.limit;
  if (duty.group !== null) values.group = duty.group + 1;
  if (duty.levelKvar !== null) values.levelKvar = duty.levelKvar;
  if (duty.orderH !== null) values.orderH = duty.orderH;
  if (duty.bus !== undefined && duty.bus !== 'primary') values.bus = duty.bus;
  if (duty.capacitors !== undefined) values.capacitors = duty.capacitors;
  if (duty.corner !== null) Object.assign(values, duty.corner);
  return remark(code, values, { unit: duty.unit, source: duty.source });
}

function supplyReasons(judged: Judged, { network: { shortCircuitMinMva } }: Judgement): Remark[] {
  const loadKva = overwhelmingKva(judged, shortCircuitMinMva);
  if (loadKva === null) return [];
  return [remark('supply.weakerThanLoad', { shortCircuitMinMva, loadKva }, { path: 'supply.faultLevelMva' })];
}

function networkReasons(judged: Judged, bank: Bank, judgement: Judgement): Remark[] {
  const found: Remark[] = [];
  const { nearPeak, distortingSharePct, ripple } = judgement;
  if (nearPeak !== null) {
    const { levelKvar, corner, peakOrderH, presentOrderH } = nearPeak;
    found.push(remark('peak.near', { levelKvar, peakOrderH, presentOrderH, reachH: PEAK_REACH_H, ...corner }));
  }
  if (distortingSharePct !== null) {
    found.push(remark('plain.distortingShare', { sharePct: distortingSharePct }, { unit: '%', source: 'practice' }));
  }
  if (ripple !== null) {
    const { levelKvar, corner, share } = ripple;
    const values = { rippleHz: judged.site.supply.rippleHz!, leftPct: 100 * share, levelKvar, ...corner };
    found.push(remark('ripple.absorbed', values, { path: 'supply.rippleHz', source: 'practice' }));
  }
  if (judgement.networkUnknown && bank.groups.length > 0) {
    if (judged.site.loads.distorting === null) {
      found.push(remark('network.unknownLoads', {}, { path: 'loads.distorting' }));
    }
    if (judged.site.loads.backgroundPct === null) {
      found.push(remark('network.unknownBackground', {}, { path: 'loads.backgroundPct' }));
    }
  }
  return found;
}

/**
 * A delay shorter than the rule's own resistor allows needs a faster one: named, and kept.
 * @param judged settled site and its network
 * @param bank the bank
 * @param control settings
 * @param judgement the bank judged
 * @returns one reason a group at most
 * @source method-limits
 */
export function reconnectionReasons(judged: Judged, bank: Bank, control: Control, judgement: Judgement): Remark[] {
  const { reconnectDelayS } = control;
  return bank.groups.flatMap((group, g) => {
    if (group.dischargeOhm !== null) return [];
    const naturalS = naturalReconnectDelayS([group], judged.site.rules, judged.site.frequencyHz);
    if (reconnectDelayS >= naturalS * (1 - 1e-9)) return [];
    const values = { group: g + 1, reconnectDelayS, naturalS, requiredOhm: judgement.charge[g]!.requiredOhm };
    return [remark('reconnection.short', values, { path: 'control.reconnectDelayS', unit: 's' })];
  });
}
