import type { Judgement } from '../duty/judge-bank.js';
import { type Remark, remark } from '../problem.js';

const ALWAYS = [
  'caution.storedCharge',
  'caution.qualifiedPeople',
  'caution.currentTransformer',
  'caution.inrush',
  'caution.resonance',
  'caution.overCorrection',
  'caution.temperature',
  'caution.faultLevel',
  'caution.earthing',
  'caution.dataGiven',
  'caution.localCodes',
  'caution.notPermission',
] as const;

/**
 * The cautions every plan carries; stored charge names the longest discharge time of the bank.
 * @param judgement the bank judged
 * @returns one remark a caution, always all of them
 * @source method-cautions
 */
export function cautions(judgement: Judgement): Remark[] {
  const waitS = judgement.charge.reduce((longest, stage) => Math.max(longest, stage.dischargeWithinS), 0);
  const toV = judgement.charge[0]?.dischargeToV ?? 0;
  return ALWAYS.map((code) =>
    code === 'caution.storedCharge' ? remark(code, { waitS, toV }, { unit: 's' }) : remark(code),
  );
}
