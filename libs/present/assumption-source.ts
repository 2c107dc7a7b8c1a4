import type { Remark } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { say, words } from './language.js';

/** Where an assumed value comes from, by the beginning of its code; the longest that fits counts. */
const SOURCES: Readonly<Record<string, string>> = words({
  'default.bus.highestV': 'usual tolerance of the supply',
  'default.limits.emcClass': 'usual class of an industrial bus',
  'default.limits.point': 'nothing said',
  'default.recordedBank': 'nothing said',
  'default.supply.faultLevelMva.min': 'the greatest fault level',
  'default.supply.transformers.impedanceTolerancePct': 'usual tolerance of a transformer',
  'default.supply.transformers.loadLossKw': 'severe end',
  'default.supply.transformers.noLoad': 'nothing said',
  'default.loads.dampingKw.max': 'the record',
  'default.loads.dampingKw.min': 'severe end',
  'default.loads.summation': 'IEC TR 61000-3-6',
  'default.control.reconnectDelayS': 'the discharge resistor',
  'default.control.setPointPowerFactor': 'the target',
  'default.tariff': 'the record',
  'loads.distorting.none': 'declared for the site',
  'loads.backgroundPct.none': 'declared for the site',
  'loads.angles': 'the site file',
  'loads.dampingListed': 'the site file',
  'supply.noTransformer': 'nothing said',
  'limits.tighterCopy': 'copies of the standard',
  'money.unused': 'the site file',
  'bank.ignored': 'the site file',
  'estimate.calendarMonths': 'the bills',
  estimate: 'the estimate’s method',
});

/**
 * What an assumption rests on.
 * @param assumption of a result
 * @returns its source in words; common practice where no better one is known
 */
export function assumptionSource({ code, source }: Remark): string {
  if (source !== null && source !== 'practice') return engineName(source);
  const known = Object.keys(SOURCES)
    .filter((begin) => code.startsWith(begin))
    .sort((a, b) => b.length - a.length)[0];
  return known === undefined ? say`common practice` : SOURCES[known]!;
}
