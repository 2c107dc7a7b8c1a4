import { firmVerdict } from '../duty/quick-judge.js';
import { graver, type Verdict } from '../duty/rules.js';
import type { MoneyRobustness, MovedWorth, WayRobustness } from '../money/money-result.js';
import { basisOf, type Judged, overallVerdict } from './judge-basis.js';
import { LOAD_MOVES } from './load-moves.js';
import type { MoneyMover, TriedQuantity, WeighedWays } from './money-mover.js';
import { judgeMoved, withoutStage } from './robustness.js';
import { savingRange, worstStageOut } from './saving-range.js';
import type { Scale, WorthAgain } from './weigh-again.js';
import type { WeighedBank } from './weighed-bank.js';

/** Capacitance of a new bank at the end of its life. */
const AGED_CAPACITANCE = 0.9;
/** Costs and tariffs as offers and years move them; practice. */
const MONEY_MOVES = [0.8, 1.2] as const;

/**
 * Every way with a bank under load growth and loss, aged capacitance, one stage out, both ends of the fault level, and
 * other costs and tariffs; its break-evens; and where another way would be the pick.
 * @param weighed ways and the record they are weighed on
 * @param mover weighs them
 * @returns the table
 * @source method-robustness
 */
export function moneyRobustness(weighed: WeighedWays, mover: MoneyMover): MoneyRobustness {
  const { ways, scale } = weighed;
  const isPriced = scale.money.prices !== null;
  const quantities = isPriced ? (['load', 'capacitance', 'costs', 'tariff'] as const) : [];
  return {
    ways: ways
      .filter(({ bank }) => bank.groups.length > 0)
      .map((way): WayRobustness => {
        const known = { ideal: mover.present(way), stageOut: worstStageOut(scale, way) };
        return {
          name: way.name,
          npv: known.ideal.npv,
          saving: savingRange(scale, way, known),
          moved: movedWorths(scale, way, mover, known),
          breakEvens: quantities.map((quantity) => mover.breakEven(way, quantity)),
        };
      }),
    pickChanges:
      isPriced && ways.length > 1
        ? (['load', 'costs', 'tariff'] as const).map((quantity) => mover.pickChange(quantity))
        : [],
  };
}

function movedWorths(
  scale: Scale,
  way: WeighedBank,
  mover: MoneyMover,
  { ideal, stageOut }: { ideal: WorthAgain; stageOut: WorthAgain },
): MovedWorth[] {
  const judged: Judged = scale.study;
  const { bank, control } = way;
  const verdictAt = (quantity: 'load' | 'capacitance' | 'fault level', factor: number): Verdict =>
    overallVerdict(judged, judgeMoved(judged, bank, control, { quantity, factor }));
  const present = verdictAt('load', 1);
  const row = (quantity: TriedQuantity, value: number, verdict: Verdict): MovedWorth[] => {
    const worth = mover.at(way, quantity, value);
    return worth === null ? [] : [{ quantity, value, unit: null, ...shown(worth), verdict }];
  };
  const { max, min } = judged.site.supply.faultLevelMva;
  return [
    ...LOAD_MOVES.flatMap((factor) => row('load', factor, verdictAt('load', factor))),
    ...row('capacitance', AGED_CAPACITANCE, verdictAt('capacitance', AGED_CAPACITANCE)),
    {
      quantity: 'stages',
      value: 1,
      unit: null,
      ...shown(stageOut),
      verdict: stageOutVerdict(judged, way),
    },
    ...[min, max].map((level): MovedWorth => {
      const verdict = faultVerdict(judged, way, level);
      return { quantity: 'fault level', value: level, unit: 'MVA', ...shown(ideal), verdict };
    }),
    ...MONEY_MOVES.flatMap((factor) => row('costs', factor, present)),
    ...MONEY_MOVES.flatMap((factor) => row('tariff', factor, present)),
  ];
}

function shown({ savingPerYear, npv, targetMet }: WorthAgain): Pick<MovedWorth, 'savingPerYear' | 'npv' | 'targetMet'> {
  return { savingPerYear, npv, targetMet };
}

// Both ends of the fault level at one value: what the bank is on a supply that is always as strong, or as weak.
function faultVerdict(judged: Judged, { bank, control }: WeighedBank, level: number): Verdict {
  const { supply } = judged.site;
  const site = { ...judged.site, supply: { ...supply, faultLevelMva: { max: level, min: level } } };
  const at = { site, model: judged.model };
  return overallVerdict(at, judgeMoved(at, bank, control, { quantity: 'load', factor: 1 }));
}

function stageOutVerdict(judged: Judged, { bank, control }: WeighedBank): Verdict {
  return bank.groups
    .map((_, g) => firmVerdict(judged.model, withoutStage(bank, g), basisOf(judged, control)))
    .reduce<Verdict>((worst, one) => graver(worst, overallVerdict(judged, one)), 'clear');
}
