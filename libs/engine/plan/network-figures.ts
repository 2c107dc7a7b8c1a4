import type { MarginMap } from '../duty/margin-map.js';
import { type NetworkLevel, strongestOhm } from '../network/network-check.js';
import { neutralA } from '../network/summation.js';
import { supplyPath } from '../supply/supply-path.js';
import { type Figure, figure } from './figure.js';
import type { Judged } from './judge-basis.js';
import type { BankResult } from './result.js';

/**
 * Fault levels at the bus, greatest and least, from the supply's own path.
 * @param judged settled site and its network
 * @param result network of the result
 * @returns figures
 * @source method-figures
 */
export function supplyFigures(judged: Judged, result: BankResult): Figure[] {
  const { supply, nominalV } = judged.site;
  if (judged.model.nodal !== null) return [nodalFigure(judged, result)];
  const ends = [
    {
      id: 'network.shortCircuitMva',
      fault: supply.faultLevelMva.max,
      end: 'least' as const,
      value: result.network.shortCircuitMva,
    },
    {
      id: 'network.shortCircuitMinMva',
      fault: supply.faultLevelMva.min,
      end: 'most' as const,
      value: result.network.shortCircuitMinMva,
    },
  ];
  return ends.flatMap(({ id, fault, end, value }) => {
    const path = supplyPath(supply, nominalV, fault, end);
    const transformer = parallelOhm(path.transformers);
    return [
      figure(
        `${id}.sourceMohm`,
        { value: path.source.xOhm * 1000, unit: 'mΩ' },
        { formula: 'U^2 / S_q / √(1 + ρ^2) / 1000', source: 'IEC 60909-0, no voltage factor' },
        [
          ['U', nominalV, 'V'],
          ['S_q', fault, 'MVA'],
          ['ρ', supply.rOverX, ''],
        ],
      ),
      figure(
        id,
        { value, unit: 'MVA' },
        { formula: 'U^2 / √((R_q + R_t)^2 + (X_q + X_t)^2) / 1000', source: 'method, network' },
        [
          ['U', nominalV, 'V'],
          ['R_q', path.source.rOhm * 1000, 'mΩ'],
          ['R_t', transformer.rOhm * 1000, 'mΩ'],
          ['X_q', path.source.xOhm * 1000, 'mΩ'],
          ['X_t', transformer.xOhm * 1000, 'mΩ'],
        ],
      ),
    ];
  });
}

// In a network of several buses the strongest standing's own impedance; the path alone would give another number.
function nodalFigure(judged: Judged, result: BankResult): Figure {
  const { rOhm, xOhm } = strongestOhm(judged.model);
  return figure(
    'network.shortCircuitMva',
    { value: result.network.shortCircuitMva, unit: 'MVA' },
    { formula: 'U^2 / √(R^2 + X^2) / 1000', source: 'method, network, the strongest standing' },
    [
      ['U', judged.site.nominalV, 'V'],
      ['R', 1000 * rOhm, 'mΩ'],
      ['X', 1000 * xOhm, 'mΩ'],
    ],
  );
}

function parallelOhm(parts: readonly { rOhm: number; xOhm: number }[]): { rOhm: number; xOhm: number } {
  if (parts.length === 0) return { rOhm: 0, xOhm: 0 };
  let g = 0;
  let b = 0;
  for (const { rOhm, xOhm } of parts) {
    const square = rOhm * rOhm + xOhm * xOhm;
    g += rOhm / square;
    b += xOhm / square;
  }
  const square = g * g + b * b;
  return { rOhm: g / square, xOhm: b / square };
}

/**
 * Neutral current of the single-phase loads' third harmonics.
 * @param judged settled site and its network
 * @returns one figure or none
 * @source method-figures
 */
export function neutralFigure(judged: Judged): Figure[] {
  const neutral = neutralA(judged.site.loads);
  if (!(neutral > 0)) return [];
  return [
    figure(
      'loads.neutralA',
      { value: neutral, unit: 'A' },
      { formula: '3 · I_0', source: 'derived: zero-sequence currents add in the neutral' },
      [['I_0', neutral / 3, 'A']],
    ),
  ];
}

/**
 * Share of its limit of every row that has one.
 * @param result rows of the result
 * @returns figures
 * @source method-figures
 */
export function dutyFigures(result: BankResult): Figure[] {
  return result.duties.flatMap((duty, k) => {
    if (duty.limit === null || duty.ratio === null || !(duty.limit > 0)) return [];
    return [
      figure(
        `duties[${k}].sharePct`,
        { value: 100 * duty.ratio, unit: '%' },
        { formula: '100 · x / x_max', source: duty.source },
        [
          ['x_max', duty.limit, duty.unit],
          ['x', duty.value, duty.unit],
        ],
      ),
    ];
  });
}

/**
 * Voltage distortion at the bus, in the worst corner of the worst level and with no stage in.
 * @param result network of the result
 * @returns a figure each where any order is present
 * @source method-figures
 */
export function distortionFigures({ network }: BankResult): Figure[] {
  const worstOf = (levels: readonly NetworkLevel[]) =>
    levels.reduce<NetworkLevel | null>(
      (worst, level) => (worst !== null && worst.voltageDistortionPct >= level.voltageDistortionPct ? worst : level),
      null,
    );
  return [
    ...distortionFigure('network.worstDistortionPct', worstOf(network.levels)),
    ...distortionFigure(
      'network.distortionWithoutBankPct',
      worstOf(network.levels.filter(({ levelKvar }) => levelKvar < 1e-6)),
    ),
  ];
}

function distortionFigure(id: string, level: NetworkLevel | null): Figure[] {
  if (level === null || !(level.voltageDistortionPct > 0)) return [];
  const symbols = level.orders.map(({ orderH }) => `U_${String(orderH).replace('.', '_')}`);
  return [
    figure(
      id,
      { value: level.voltageDistortionPct, unit: '%' },
      { formula: `√(${symbols.map((symbol) => `${symbol}^2`).join(' + ')})`, source: 'IEC 61000-2-4:2002' },
      level.orders.map(({ voltagePct }, at) => [symbols[at]!, voltagePct, '%'] as const),
    ),
  ];
}

/**
 * Harmonic voltage of one level as a share of its limit, order by order.
 * @param margins of the bank
 * @param level index into its levels
 * @returns figures, their names beginning with `margins[` and the level's index
 * @source method-figures
 */
export function marginFigures({ ordersH, limitPct, voltagePct, sharePct }: MarginMap, level: number): Figure[] {
  return ordersH.map((orderH, k) =>
    figure(
      `margins[${level}].order${orderH}`,
      { value: sharePct[level]![k]!, unit: '%' },
      { formula: '100 · U_h / U_max', source: 'method, limits: the worst corner and count of stages' },
      [
        ['U_h', voltagePct[level]![k]!, '%'],
        ['U_max', limitPct[k]!, '%'],
      ],
    ),
  );
}
