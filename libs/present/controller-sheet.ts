import { type BankOutcome, type ControllerSetting, controllerSettings, type SettingName } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatNumber, formatQuantity, GAP } from './format-number.js';
import { groupName } from './group-name.js';
import { words } from './language.js';

/** A line of the settings sheet: the setting, what to enter, and where that comes from. */
export interface SettingLine {
  setting: string;
  value: string;
  derived: string;
}

/** What a setting is called, and how its value was derived where its origin alone does not say. */
const WORDS: Record<SettingName, { name: string; derived?: string }> = words({
  setPoint: { name: 'set point, power factor' },
  mode: { name: 'switching order' },
  wear: { name: 'choice among equal stages' },
  threshold: { name: 'answers to a deviation of', derived: 'response ratio times the smallest stage' },
  thresholdCurrent: {
    name: 'the same at the transformer’s secondary',
    derived: 'that deviation at nominal voltage, by the transformer’s ratio',
  },
  stepDelay: { name: 'delay between two switchings' },
  reconnectDelay: { name: 'reconnection delay, by hand as well' },
  ways: { name: 'ways in use', derived: 'count of switched stages' },
  stage: { name: 'kvar of a stage', derived: 'nameplate at the bus voltage, reactor included' },
  fixed: { name: 'kvar connected and never switched', derived: 'nameplate at the bus voltage, reactor included' },
  currentTransformer: { name: 'current transformer, ratio' },
  nominalVoltage: { name: 'nominal voltage' },
  frequency: { name: 'frequency' },
  overvoltage: {
    name: 'all stages off at, or lower, at the bus',
    derived: 'least of the groups: permitted voltage for hours, less the reactor’s rise',
  },
  undervoltage: { name: 'on failure of the supply', derived: 'common practice' },
  distortion: { name: 'alarm at a voltage distortion of', derived: 'limit of the bus' },
  temperature: {
    name: 'all stages off at, or lower, air around the capacitors',
    derived: 'ambient category of the capacitors',
  },
  generator: { name: 'while a generator feeds the board' },
});

const ORIGINS: Record<ControllerSetting['from'], string> = words({
  site: 'as entered for the site',
  searched: 'searched for: the least that holds the target within limits',
  default: 'customary value',
  derived: 'time of the discharge resistor to 10 % of rated voltage',
  limit: 'limit',
  standard: 'standard',
  practice: 'common practice',
  open: 'not entered: to be found on site',
});

const CHOICES: Readonly<Record<string, string>> = words({
  nearestLevel: 'to the nearest level',
  oneByOne: 'one by one',
  even: 'by turns',
  inOrder: 'in order',
  all: 'all stages drop at once',
  heldOff: 'bank held off',
});

/**
 * The controller's settings as a commissioner enters them.
 * @param outcome plan or judgement
 * @returns one line a setting; equal stages on one line
 */
export function controllerSheet(outcome: BankOutcome): SettingLine[] {
  return controllerSettings(outcome).map((setting) => ({
    setting: nameOf(outcome, setting),
    value: enteredOf(setting),
    derived: derivedOf(setting),
  }));
}

function nameOf({ bank }: BankOutcome, { setting, group }: ControllerSetting): string {
  const { name } = WORDS[setting];
  if (group === null) return name;
  const { count } = bank.groups[group]!;
  return `${name}, ${groupName(group)}, ${formatNumber(count, 'whole')}${GAP}×`;
}

function enteredOf({ setting, value, unit }: ControllerSetting): string {
  if (value === null) return '–';
  if (typeof value === 'string') return unit === '' ? (CHOICES[value] ?? value) : `${value}${GAP}${unit}`;
  return formatQuantity(value, unit, setting === 'threshold' || setting === 'overvoltage' ? 'computed' : 'given');
}

function derivedOf({ setting, from, source }: ControllerSetting): string {
  const { derived } = WORDS[setting];
  const words = from === 'open' || from === 'site' ? ORIGINS[from] : (derived ?? ORIGINS[from]);
  return source === '' ? words : `${words} (${engineName(source)})`;
}
