import { smallestKvar } from '../duty/controller-devices.js';
import { AMBIENT_CATEGORIES, CAPACITOR_RULES } from '../duty/rules.js';
import { effectiveKvar } from '../layout/stage.js';
import type { BankOutcome } from './outcome.js';

/** What is set at the controller, or beside it. */
export const SETTING_NAMES = [
  'setPoint',
  'mode',
  'wear',
  'threshold',
  'thresholdCurrent',
  'stepDelay',
  'reconnectDelay',
  'ways',
  'stage',
  'fixed',
  'currentTransformer',
  'nominalVoltage',
  'frequency',
  'overvoltage',
  'undervoltage',
  'distortion',
  'temperature',
  'generator',
] as const;

export type SettingName = (typeof SETTING_NAMES)[number];

/** How a setting was come by. */
export type SettingOrigin = 'site' | 'searched' | 'default' | 'derived' | 'limit' | 'standard' | 'practice' | 'open';

/** One setting with its value and how that was come by. */
export interface ControllerSetting {
  setting: SettingName;
  /** entry of `bank.stages`, null for the bank as a whole */
  group: number | null;
  /** null where it is left to be found on site */
  value: number | string | null;
  unit: string;
  from: SettingOrigin;
  /** standard or edition behind it, empty where there is none */
  source: string;
}

type Row = Pick<ControllerSetting, 'setting' | 'value' | 'from'> & Partial<ControllerSetting>;

/**
 * Every setting of the controller and of what stands beside it, in the order a commissioner enters them.
 * @param outcome plan or judgement
 * @returns settings; none for an empty bank
 * @source method-controller, practice
 */
export function controllerSettings(outcome: BankOutcome): ControllerSetting[] {
  if (outcome.bank.groups.length === 0) return [];
  return [...steering(outcome), ...stages(outcome), ...supplySide(outcome), ...protection(outcome)].map((row) => ({
    group: null,
    unit: '',
    source: '',
    ...row,
  }));
}

function steering(outcome: BankOutcome): Row[] {
  const { site, bank, result } = outcome;
  const { control, devices } = result;
  if (bank.groups.every(({ fixed }) => fixed)) return [];
  const response = devices.find(({ device }) => device === 'currentTransformer.response');
  const responseA = typeof response?.value === 'number' ? response.value : null;
  return [
    { setting: 'setPoint', value: control.setPointPowerFactor, from: originOf(outcome, 'setPointPowerFactor') },
    { setting: 'mode', value: control.mode, from: originOf(outcome, 'mode') },
    { setting: 'wear', value: control.wear, from: originOf(outcome, 'wear') },
    {
      setting: 'threshold',
      value: control.responseRatio * smallestKvar(bank, site.nominalV),
      unit: 'kvar',
      from: 'derived',
    },
    { setting: 'thresholdCurrent', value: responseA, unit: 'A', from: responseA === null ? 'open' : 'derived' },
    { setting: 'stepDelay', value: control.stepDelayS, unit: 's', from: originOf(outcome, 'stepDelayS') },
    {
      setting: 'reconnectDelay',
      value: control.reconnectDelayS,
      unit: 's',
      from: originOf(outcome, 'reconnectDelayS'),
    },
  ];
}

// What a plan was not given it looked for; a judgement took the customary value.
function originOf({ kind, result }: BankOutcome, field: string): SettingOrigin {
  if (!result.assumptions.some(({ code }) => code === `default.control.${field}`)) return 'site';
  if (field === 'setPointPowerFactor' && kind === 'plan') return 'searched';
  return field === 'reconnectDelayS' ? 'derived' : 'default';
}

function stages({ site, bank }: BankOutcome): Row[] {
  const switched = bank.groups.filter(({ fixed }) => !fixed);
  const ways = switched.reduce((sum, { count }) => sum + count, 0);
  return [
    { setting: 'ways', value: ways, from: 'derived' },
    ...bank.groups.map(
      (group, g): Row => ({
        setting: group.fixed ? 'fixed' : 'stage',
        group: g,
        value: effectiveKvar(group, site.nominalV),
        unit: 'kvar',
        from: 'derived',
      }),
    ),
  ];
}

function supplySide({ site }: BankOutcome): Row[] {
  const given = site.facts.currentTransformer;
  const ratio = given === null ? null : `${given.ratioPrimaryA}/${given.ratioSecondaryA}`;
  return [
    { setting: 'currentTransformer', value: ratio, unit: 'A', from: ratio === null ? 'open' : 'site' },
    { setting: 'nominalVoltage', value: site.nominalV, unit: 'V', from: 'site' },
    { setting: 'frequency', value: site.frequencyHz, unit: 'Hz', from: 'site' },
  ];
}

function protection(outcome: BankOutcome): Row[] {
  const { site, bank, result } = outcome;
  const limit = result.duties.find(({ name }) => name === 'voltage distortion');
  const ambient = bank.ambientCategory;
  const held = site.facts.generator.holdOff === true;
  return [
    {
      setting: 'overvoltage',
      value: overvoltageV(outcome),
      unit: 'V',
      from: 'standard',
      source: CAPACITOR_RULES[site.rules].source,
    },
    { setting: 'undervoltage', value: 'all', from: 'practice' },
    {
      setting: 'distortion',
      value: limit?.limit ?? null,
      unit: '%',
      from: limit?.limit == null ? 'open' : 'limit',
      source: limit?.source ?? '',
    },
    {
      setting: 'temperature',
      value: ambient === null ? null : AMBIENT_CATEGORIES[ambient][0],
      unit: '°C',
      from: ambient === null ? 'open' : 'standard',
      source: ambient === null ? '' : 'IEC 60831-1:2014',
    },
    ...(held ? [{ setting: 'generator', value: 'heldOff', from: 'site' } satisfies Row] : []),
  ];
}

/**
 * Bus voltage above which a capacitor of the bank passes what it may carry for hours: the least of r·U_N·(1 − p) over
 * the groups.
 * @param outcome for bank and rules
 * @returns U at the bus, line to line [V]
 * @source iec-60831-1 (1.10 U_N), ieee-18 (110 % rms)
 */
export function overvoltageV({ bank, site }: Pick<BankOutcome, 'bank' | 'site'>): number {
  const { highestVoltageRatio } = CAPACITOR_RULES[site.rules];
  return Math.min(
    ...bank.groups.map(({ ratedV, reactorPct }) => highestVoltageRatio * ratedV * (1 - reactorPct / 100)),
  );
}
