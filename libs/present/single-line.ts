import type { BankOutcome, EstimateOutcome, EstimateResult, Outcome, Result, StageGroup } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatNumber, formatQuantity, formatRange, GAP } from './format-number.js';
import { say } from './language.js';
import { plainName } from './plain-name.js';

/** A feeder of the board with its trade symbol and what is known of it. */
export interface Feeder {
  symbol: 'motor' | 'converter' | 'load';
  name: string;
  /** stands for a name that is too long to be drawn */
  short: string;
  detail: string;
}

/** Equal stages, drawn one beside the other. */
export interface StageSymbol {
  /** printed under the symbol */
  text: string;
  detuned: boolean;
  switched: boolean;
  /** stands for so many stages, where there are too many to draw each */
  times: number;
}

/** The single-line diagram as data, from the grid down; dashed parts were not entered. */
export interface SingleLine {
  grid: string;
  transformers: { name: string; detail: string }[];
  meteredAt: 'primary' | 'bus';
  bus: string;
  faultLevel: { most: string; least: string };
  feeders: Feeder[];
  stages: StageSymbol[];
  /** one line a group of stages, both ratings with their voltages */
  bank: string[];
  /** why parts are dashed */
  notEntered: string;
  sentence: string;
}

/** More stages than this are drawn by group. */
const MOST_DRAWN = 16;
/** More distorting loads than this share one symbol. */
const MOST_LOADS = 3;

/**
 * The site's single-line diagram drawn from the data.
 * @param outcome the plan or judgement
 * @returns elements from the grid to the stages
 */
export function singleLine(outcome: Outcome | EstimateOutcome): SingleLine {
  const { site, result, bank } = outcome;
  const { faultLevelMva } = site.supply;
  const drawn = {
    grid: say`grid ${formatRange({ low: faultLevelMva.min, high: faultLevelMva.max }, 'MVA')}`,
    transformers: transformers(outcome),
    meteredAt: site.meteredAt,
    bus: say`${formatQuantity(site.nominalV, 'V', 'given')}, at most ${formatQuantity(site.highestV, 'V', 'given')}`,
    faultLevel: {
      most: say`${formatQuantity(result.network.shortCircuitMva, 'MVA')} at the bus`,
      least: say`${formatQuantity(result.network.shortCircuitMinMva, 'MVA')} at the least`,
    },
    feeders: feeders(outcome),
    stages: stageSymbols(bank.groups),
    bank: bank.groups.map((group) => groupWords(outcome, group)),
    notEntered: say`Dashed: needed, not entered.`,
  };
  return { ...drawn, sentence: sentenceOf(drawn) };
}

function transformers({ site }: BankOutcome): SingleLine['transformers'] {
  return site.supply.transformers.map(({ ratedKva, impedancePct }) => ({
    name: formatQuantity(ratedKva, 'kVA', 'given'),
    detail: say`impedance ${formatQuantity(impedancePct, '%', 'given')}`,
  }));
}

function feeders({ site, result }: Outcome | EstimateOutcome): Feeder[] {
  const { motorSharePct, distorting } = site.loads;
  const motors: Feeder[] =
    motorSharePct > 0
      ? [
          {
            symbol: 'motor',
            name: say`motors`,
            short: say`motors`,
            detail: say`${formatQuantity(motorSharePct, '%', 'given')} of damping load`,
          },
        ]
      : [];
  const loads = distorting ?? [];
  const each = loads.slice(0, loads.length > MOST_LOADS ? MOST_LOADS - 1 : MOST_LOADS);
  const rest = loads.slice(each.length);
  const converters: Feeder[] = each.map(({ name, fundamentalA, spectrum, orders }, at) => ({
    symbol: 'converter',
    name: plainName(name),
    short: say`load ${at + 1}`,
    detail: `${formatQuantity(fundamentalA, 'A', 'given')}, ${orders === undefined && spectrum !== undefined ? engineName(spectrum.replaceAll('-', ' ')) : say`orders given`}`,
  }));
  if (rest.length > 0) {
    const sumA = rest.reduce((sum, { fundamentalA }) => sum + fundamentalA, 0);
    converters.push({
      symbol: 'converter',
      name: say`${rest.length} more`,
      short: say`${rest.length} more`,
      detail: formatQuantity(sumA, 'A', 'given'),
    });
  }
  const other: Feeder = {
    symbol: 'load',
    name: say`other load`,
    short: say`other load`,
    detail: greatestLoad(result),
  };
  return [...motors, ...converters, other];
}

function greatestLoad(result: Result | EstimateResult): string {
  if (result.record !== null) return say`site at most ${formatQuantity(result.record.maxKw, 'kW')}`;
  const { months, equipment } = result.estimate;
  const kw = months.length > 0 ? Math.max(...months.map(({ maxKw }) => maxKw)) : (equipment?.activeKw ?? 0);
  return say`site about ${formatQuantity(kw, 'kW')}, estimated`;
}

function stageSymbols(groups: readonly StageGroup[]): StageSymbol[] {
  const total = groups.reduce((sum, { count }) => sum + count, 0);
  return groups.flatMap((group) => {
    const symbol = {
      text: formatNumber(group.ratedKvar, 'given'),
      detuned: group.reactorPct > 0,
      switched: !group.fixed,
    };
    if (total > MOST_DRAWN) return [{ ...symbol, times: group.count }];
    return Array.from({ length: group.count }, () => ({ ...symbol, times: 1 }));
  });
}

function groupWords(outcome: BankOutcome, group: StageGroup): string {
  const reactor =
    group.reactorPct > 0 ? say`reactors ${formatQuantity(group.reactorPct, '%', 'given')}` : say`no reactors`;
  const fixed = group.fixed ? say`, never switched` : '';
  return `${group.count}${GAP}×${GAP}${bothRatings(outcome, group)}, ${reactor}${fixed}`;
}

/**
 * A stage's two ratings with their voltages.
 * @param outcome for the bus voltage and the stage's effective kvar
 * @param group the stage's group
 * @returns "50 kvar at 480 V, 37.3 kvar at 400 V"
 */
export function bothRatings(outcome: BankOutcome, group: StageGroup): string {
  const rated = say`${formatQuantity(group.ratedKvar, 'kvar', 'given')} at\u00a0${formatQuantity(group.ratedV, 'V', 'given')}`;
  const stage = outcome.result.bank.stages.find(
    (one) => one.ratedKvar === group.ratedKvar && one.ratedV === group.ratedV && one.reactorPct === group.reactorPct,
  );
  if (stage === undefined) return rated;
  const at = say`at\u00a0${formatQuantity(outcome.site.nominalV, 'V', 'given')}`;
  return `${rated}, ${formatQuantity(stage.effectiveKvar, 'kvar')} ${at}`;
}

function sentenceOf(drawn: Omit<SingleLine, 'sentence'>): string {
  const supply =
    drawn.transformers.length === 0
      ? say`The ${drawn.grid} feeds the board directly.`
      : say`The ${drawn.grid} feeds the board through ${drawn.transformers.map(({ name, detail }) => `${name}, ${detail}`).join('; ')}.`;
  const loads = drawn.feeders.map(({ name, detail }) => `${name} (${detail})`).join(', ');
  const bank = drawn.bank.length === 0 ? say`No bank.` : say`Bank: ${drawn.bank.join('; ')}.`;
  return say`Single-line diagram. ${supply} Board: ${drawn.bus}. Feeders: ${loads}. ${bank}`;
}
