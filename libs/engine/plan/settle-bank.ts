import { naturalReconnectDelayS } from '../duty/charge.js';
import type { RuleSet } from '../duty/rules.js';
import type { Bank, BankInput, StageGroup, StageGroupInput } from '../layout/bank.js';
import type { Control } from '../operation/control.js';
import { InputProblem, type Remark, remark } from '../problem.js';
import type { Site } from './site.js';

const INTER_STAGE_UH = 2;
const REACTOR_QUALITY = 30;
/** A stated reactor ratio may differ from the nameplate's own by this share before it is a finding. */
const RATIO_TOLERANCE = 0.03;
/** p·1.10·1.03 stays below 1 in every corner. */
const MOST_REACTOR_PCT = 88;

/**
 * A bank as the site file gives it, defaults filled in; where nameplate µF and mH stand, p is derived from them.
 * @param input the bank of the site file
 * @param frequencyHz f [Hz]
 * @param path where it stands in the site file
 * @returns the bank, its assumptions, and findings where a stated p disagrees with the nameplate
 * @throws InputProblem where a reactor leaves no capacitor, or the inductance between stages is not above 0
 * @source method-bank
 */
export function settleBank(
  input: BankInput,
  frequencyHz: number,
  path = 'bank',
): { bank: Bank; assumptions: Remark[]; findings: Remark[] } {
  const assumptions: Remark[] = [];
  const findings: Remark[] = [];
  const groups = input.stages.map((stage, g) =>
    settleGroup(stage, `${path}.stages[${g}]`, { frequencyHz, assumptions, findings }),
  );
  if (input.interStageUh === undefined && groups.length > 0) {
    const place = { path: `${path}.interStageUh`, unit: 'µH' };
    assumptions.push(remark('default.bank.interStageUh', { value: INTER_STAGE_UH }, place));
  }
  const bank: Bank = {
    groups,
    interStageUh: input.interStageUh ?? INTER_STAGE_UH,
    interStageGiven: input.interStageUh !== undefined,
    ambientCategory: input.ambientCategory ?? null,
  };
  if (!(bank.interStageUh > 0)) {
    throw new InputProblem([
      {
        code: 'out-of-range',
        path: `${path}.interStageUh`,
        expected: 'more than 0: with none the closed form has no end',
        found: `${bank.interStageUh}`,
        unit: 'µH',
      },
    ]);
  }
  return { bank, assumptions, findings };
}

/** What a group is settled with; its lines and findings are added to. */
export interface GroupContext {
  frequencyHz: number;
  assumptions: Remark[];
  findings: Remark[];
}

/**
 * A group of equal stages, defaults filled in.
 * @param stage as the site file gives it
 * @param path where it stands there
 * @param context frequency, and lists that receive what was taken and what disagrees
 * @returns the group
 * @throws InputProblem where a reactor leaves no capacitor
 * @source method-bank
 */
export function settleGroup(stage: StageGroupInput, path: string, context: GroupContext): StageGroup {
  const reactorPct = reactorRatioPct(stage, path, context);
  if (!(reactorPct >= 0 && reactorPct < MOST_REACTOR_PCT)) {
    throw new InputProblem([
      {
        code: 'out-of-range',
        path: `${path}.reactorPct`,
        expected: `0 to below ${MOST_REACTOR_PCT}: at +10 % capacitance and +3 % inductance it must stay below 100`,
        found: `${reactorPct}`,
        unit: '%',
      },
    ]);
  }
  if (stage.reactorQuality === undefined && reactorPct > 0) {
    const place = { path: `${path}.reactorQuality` };
    context.assumptions.push(remark('default.bank.stages.reactorQuality', { value: REACTOR_QUALITY }, place));
  }
  return {
    count: stage.count,
    ratedKvar: stage.ratedKvar,
    ratedV: stage.ratedV,
    reactorPct,
    reactorQuality: stage.reactorQuality ?? REACTOR_QUALITY,
    dischargeOhm: stage.dischargeOhm ?? null,
    reactorMaxA: stage.reactorMaxA ?? null,
    switchPeakA: stage.switchPeakA ?? null,
    fixed: stage.fixed ?? false,
  };
}

// p = ω²·L·C with C the star capacitance, three times the delta phase's.
function reactorRatioPct(stage: StageGroupInput, path: string, context: GroupContext): number {
  const stated = stage.reactorPct ?? 0;
  if (stage.reactorMh === undefined) return stated;
  const omega = 2 * Math.PI * context.frequencyHz;
  const deltaUf = stage.capacitanceUf ?? (stage.ratedKvar * 1e9) / (3 * omega * stage.ratedV * stage.ratedV);
  const derived = 100 * omega * omega * stage.reactorMh * 1e-3 * 3 * deltaUf * 1e-6;
  if (stage.reactorPct === undefined) {
    const values = { given: `${stage.reactorMh} mH`, value: derived };
    context.assumptions.push(remark('understood.value', values, { path: `${path}.reactorMh`, unit: '%' }));
  } else if (Math.abs(derived - stated) > RATIO_TOLERANCE * derived) {
    const values = { statedPct: stated, derivedPct: derived };
    context.findings.push(remark('bank.ratioDisagrees', values, { path: `${path}.reactorPct`, unit: '%' }));
  }
  return derived;
}

/**
 * The controller's settings with defaults filled in.
 * @param given settings of the site file
 * @param bank what they control
 * @param basis target, rule set and frequency
 * @returns settings and a line for each default
 * @source method-controller
 */
export function settleControl(
  given: Site['control'],
  bank: Bank,
  basis: { targetPowerFactor: number; rules: RuleSet; frequencyHz: number },
): { control: Control; assumptions: Remark[] } {
  const control: Control = {
    setPointPowerFactor: basis.targetPowerFactor,
    mode: 'nearestLevel',
    responseRatio: 0.65,
    stepDelayS: 10,
    reconnectDelayS: naturalReconnectDelayS(bank.groups, basis.rules, basis.frequencyHz),
    wear: 'even',
    ...withoutAbsent(given),
  };
  const units: Partial<Record<keyof Control, string>> = { stepDelayS: 's', reconnectDelayS: 's' };
  const assumptions = (Object.keys(control) as (keyof Control)[])
    .filter((key) => given?.[key] === undefined)
    .map((key) => {
      const unit = units[key];
      const path = `control.${key}`;
      return remark(`default.${path}`, { value: control[key] }, unit === undefined ? { path } : { path, unit });
    });
  return { control, assumptions };
}

// The settings alone: what is wired to the controller is no setting.
function withoutAbsent(given: Site['control']): Partial<Control> {
  const { currentTransformer: _, generator: __, ...settings } = given ?? {};
  return Object.fromEntries(Object.entries(settings).filter(([, value]) => value !== undefined));
}
