import { firmVerdict } from '../duty/quick-judge.js';
import { CAPACITOR_RULES, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { MOST_VECTORS } from '../layout/levels.js';
import { effectiveKvar } from '../layout/stage.js';
import { type CostBasis, capitalOf } from '../money/capital.js';
import type { Control } from '../operation/control.js';
import { basisOf, type Judged, overallVerdict } from './judge-basis.js';

/** What a bank needs to be ready for stages that may be added later. */
export interface SpareWays {
  /** stages added, of the largest kind the bank has */
  added: number;
  ratedKvar: number;
  /** of the whole bank with them [kvar] */
  effectiveKvar: number;
  /** conductors and disconnector of the whole bank with them [A] */
  conductorMinA: number;
  /** what the whole bank costs more with them, cabinets among it; null without prices */
  capital: number | null;
  /** of the whole bank with them */
  verdict: Verdict;
  worstDuty: string | null;
  worstRatio: number | null;
}

/** How many more stages are looked at. */
const MOST_ADDED = 3;

/**
 * What one, two and three more stages need: kvar, conductors, capital, and whether the bank still holds with them.
 * @param study settled site and network
 * @param bank the bank
 * @param control settings
 * @param cost what it is paid from, null without prices
 * @returns one entry a stage added; none for an empty bank, or where the combinations of stages get too many
 * @source method-robustness
 */
export function spareWays(study: Judged, bank: Bank, control: Control, cost: CostBasis | null): SpareWays[] {
  const { nominalV, rules } = study.site;
  const output = bank.groups.map((group) => (group.fixed ? 0 : effectiveKvar(group, nominalV)));
  const largest = output.indexOf(Math.max(...output));
  const found: SpareWays[] = [];
  for (let added = 1; added <= MOST_ADDED && bank.groups.length > 0; added++) {
    const groups = bank.groups.map((group, g) => (g === largest ? { ...group, count: group.count + added } : group));
    if (vectorsOf(groups) > MOST_VECTORS) break;
    const grown = { ...bank, groups };
    const judged = firmVerdict(study.model, grown, basisOf(study, control));
    const kvar = groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, nominalV), 0);
    found.push({
      added,
      ratedKvar: groups[largest]!.ratedKvar,
      effectiveKvar: kvar,
      conductorMinA: (CAPACITOR_RULES[rules].conductorRatio * kvar * 1000) / (Math.sqrt(3) * nominalV),
      capital: cost === null ? null : capitalOf(grown, cost).total - capitalOf(bank, cost).total,
      verdict: overallVerdict(study, judged),
      worstDuty: judged.worst?.name ?? null,
      worstRatio: judged.worst?.ratio ?? null,
    });
  }
  return found;
}

function vectorsOf(groups: Bank['groups']): number {
  return groups.reduce((product, group) => product * (group.fixed ? 1 : group.count + 1), 1);
}
