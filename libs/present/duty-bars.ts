import { type Corner, type Duty, NEAR_RATIO } from '#libs/engine/index.js';
import type { BarFigure } from './bar-figure.js';
import { dutyName as fullName } from './figure-words.js';
import { formatApart, formatNumber, formatQuantity, GAP } from './format-number.js';
import { standingName } from './standing-name.js';
import { verdictWords } from './verdict-words.js';

/** Bars end here and are drawn broken beyond [%]. */
const BROKEN_PCT = 125;

/**
 * Every duty as a share of its own limit, so that unlike units compare; the harmonic voltages by their worst order.
 * @param duties rows of the result
 * @returns one bar a row, gravest first, rows without a limit in the table alone
 */
export function dutyBars(duties: readonly Duty[]): BarFigure {
  const isOneGroup = duties.every(({ group }) => group === null || group === 0);
  const dutyName = (duty: Duty): string => fullName(isOneGroup ? { ...duty, group: null } : duty);
  const judged = duties.filter((duty) => duty.ratio !== null);
  const worst = judged.reduce<Duty | null>((a, b) => (a === null || b.ratio! > a.ratio! ? b : a), null);
  const over = judged.filter(({ verdict }) => verdict === 'avoid').length;
  return {
    id: 'dutyBars',
    finding:
      worst === null
        ? 'No duty has a limit to be held against'
        : over === 0
          ? `Nearest its limit: ${dutyName(worst)}, ${formatQuantity(100 * worst.ratio!, '%')}`
          : `${over} of ${judged.length} duties over their limits, ${dutyName(worst)} by most`,
    caption: 'Value over limit, worst level and corner.',
    sentence: judged.map((duty) => `${dutyName(duty)}: ${shareWords(duty)}, ${verdictWords(duty.verdict)}.`).join(' '),
    bars: judged.map((duty) => {
      const { value, limit } = formatApart(duty.value, duty.limit!);
      return {
        name: dutyName(duty),
        value: 100 * duty.ratio!,
        text: verdictWords(duty.verdict),
        verdict: duty.verdict,
        nearAt: 100 * nearRatio(duty.name),
        note: `${value} of ${limit}${GAP}${duty.unit}`,
      };
    }),
    to: BROKEN_PCT,
    limit: { at: 100, text: 'limit', dotted: false },
    table: {
      columns: ['duty', 'value', 'limit', 'share', 'level', 'corner', 'source', 'verdict'].map((head, at) => ({
        head,
        right: at > 0 && at < 5,
      })),
      rows: duties.map((duty) => [
        dutyName(duty),
        formatQuantity(duty.value, duty.unit),
        duty.limit === null ? '–' : formatQuantity(duty.limit, duty.unit, 'given'),
        duty.ratio === null ? '–' : formatQuantity(100 * duty.ratio, '%'),
        formatQuantity(duty.levelKvar, 'kvar'),
        cornerWords(duty.corner),
        duty.source,
        verdictWords(duty.verdict),
      ]),
    },
  };
}

/** The share from which a duty of this name is near its limit; a discharge resistor is within it or not. */
function nearRatio(name: string): number {
  if (name === 'discharge') return 1;
  return name.includes('capacitor voltage') ? NEAR_RATIO.voltage : NEAR_RATIO.other;
}

function shareWords(duty: Duty): string {
  return `${formatQuantity(100 * duty.ratio!, '%')} of ${formatQuantity(duty.limit, duty.unit, 'given')}`;
}

/**
 * A corner of the uncertain quantities in words.
 * @param corner where a value was met
 * @returns "180 MVA, C × 1.1, L × 0.97, damping 0 kW", or a dash
 */
export function cornerWords(corner: Corner | null): string {
  if (corner === null) return '–';
  const { faultLevelMva, capacitanceFactor, inductanceFactor, dampingKw } = corner;
  const own = `${formatQuantity(faultLevelMva, 'MVA', 'given')}, ${toleranceWords(capacitanceFactor, inductanceFactor)}, damping ${formatQuantity(dampingKw, 'kW')}`;
  return [own, ...standingWords(corner)].join(', ');
}

/**
 * How the network stands in a corner, and at which end of their tolerance its own capacitors are.
 * @param corner where a value was met
 * @returns parts to be joined; none in the normal standing with capacitors as their nameplates say
 */
export function standingWords({ standing, networkCapacitanceFactor, networkInductanceFactor }: Corner): string[] {
  return [
    ...(standing === undefined ? [] : [standingName(standing)]),
    ...(networkCapacitanceFactor === undefined
      ? []
      : [`network’s capacitors ${toleranceWords(networkCapacitanceFactor, networkInductanceFactor ?? 1)}`]),
  ];
}

function toleranceWords(capacitanceFactor: number, inductanceFactor: number): string {
  const times = (factor: number) => `×${GAP}${formatNumber(factor, 'given')}`;
  return `C ${times(capacitanceFactor)}, L ${times(inductanceFactor)}`;
}
