import { naturalReconnectDelayS } from '../duty/charge.js';
import { CAPACITOR_RULES } from '../duty/rules.js';
import type { Bank, StageGroup } from '../layout/bank.js';
import { capacitorV, effectiveKvar, ratedA, stageOhm, tunedOrderH } from '../layout/stage.js';
import { type Figure, figure } from './figure.js';
import type { Judged } from './judge-basis.js';
import type { BankOutcome } from './outcome.js';
import type { BankResult } from './result.js';

/**
 * Figures of the bank and its groups: kvar, capacitor voltage, tuned order, resonance, discharge, inrush, conductor.
 * @param judged settled site and its network
 * @param bank the bank
 * @param result the result so far
 * @returns figures; none for an empty bank
 * @source method-figures
 */
export function bankFigures(judged: Judged, bank: Bank, result: BankResult): Figure[] {
  if (bank.groups.length === 0) return [];
  const { nominalV, rules } = judged.site;
  const each = bank.groups.map((group) => effectiveKvar(group, nominalV));
  const terms = each.map((_, g) => (each.length === 1 ? 'n · Q_s' : `n_${g + 1} · Q_${g + 1}`));
  const total = result.bank.effectiveKvar;
  return [
    ...bank.groups.flatMap((group, g) => groupFigures(judged, group, g, result)),
    figure(
      'bank.effectiveKvar',
      { value: total, unit: 'kvar' },
      { formula: terms.join(' + '), source: 'method, bank' },
      each.flatMap((kvar, g) => [
        [each.length === 1 ? 'n' : `n_${g + 1}`, bank.groups[g]!.count, ''] as const,
        [each.length === 1 ? 'Q_s' : `Q_${g + 1}`, kvar, 'kvar'] as const,
      ]),
    ),
    ...resonanceFigure(bank, total, result.network.shortCircuitMva),
    figure(
      'bank.voltageRisePct',
      { value: (100 * total) / (result.network.shortCircuitMva * 1000), unit: '%' },
      { formula: '100 · Q / (1000 · S_k)', source: 'method, requirement' },
      [
        ['Q', total, 'kvar'],
        ['S_k', result.network.shortCircuitMva, 'MVA'],
      ],
    ),
    figure(
      'conductorMinA',
      { value: result.conductorMinA, unit: 'A' },
      { formula: 'k · 1000 · Q / (√(3) · U)', source: CAPACITOR_RULES[rules].conductorSource },
      [
        ['k', CAPACITOR_RULES[rules].conductorRatio, ''],
        ['Q', total, 'kvar'],
        ['U', nominalV, 'V'],
      ],
    ),
  ];
}

/**
 * Parallel resonance with all stages in, closed form with damping left out: a check on the scan.
 * @param bank the bank
 * @param totalKvar its effective kvar [kvar]
 * @param shortCircuitMva fault level at the bus [MVA]
 * @returns a figure; none where the groups differ in their ratio
 * @source method-figures
 */
export function resonanceFigure(bank: Bank, totalKvar: number, shortCircuitMva: number): Figure[] {
  const ratios = new Set(bank.groups.map((group) => group.reactorPct));
  const [reactorPct] = ratios;
  if (ratios.size !== 1 || reactorPct === undefined) return [];
  const plainKvar = totalKvar * (1 - reactorPct / 100);
  const p = reactorPct / 100;
  const value = 1 / Math.sqrt(p + plainKvar / (shortCircuitMva * 1000));
  return [
    figure(
      'network.parallelOrderClosedFormH',
      { value, unit: '' },
      { formula: '1 / √(p + Q_c / (1000 · S_k))', source: 'method, network, damping left out' },
      [
        ['p', p, ''],
        ['Q_c', plainKvar, 'kvar'],
        ['S_k', shortCircuitMva, 'MVA'],
      ],
    ),
  ];
}

function groupFigures(judged: Judged, group: StageGroup, g: number, result: BankResult): Figure[] {
  const { nominalV } = judged.site;
  const p = group.reactorPct / 100;
  const id = (name: string): string => `bank.group[${g}].${name}`;
  const found = [
    figure(
      id('capacitiveOhm'),
      { value: stageOhm(group).capacitiveOhm, unit: 'Ω' },
      { formula: 'U_N^2 / (1000 · Q_N)', source: 'method, bank' },
      [
        ['U_N', group.ratedV, 'V'],
        ['Q_N', group.ratedKvar, 'kvar'],
      ],
    ),
    figure(
      id('effectiveKvar'),
      { value: effectiveKvar(group, nominalV), unit: 'kvar' },
      { formula: 'Q_N · (U / U_N)^2 / (1 − p)', source: 'method, bank' },
      [
        ['Q_N', group.ratedKvar, 'kvar'],
        ['U_N', group.ratedV, 'V'],
        ['U', nominalV, 'V'],
        ['p', p, ''],
      ],
    ),
    figure(
      id('capacitorV'),
      { value: capacitorV(group.reactorPct, nominalV), unit: 'V' },
      { formula: 'U / (1 − p)', source: 'method, bank' },
      [
        ['U', nominalV, 'V'],
        ['p', p, ''],
      ],
    ),
    figure(
      id('ratedA'),
      { value: ratedA(group), unit: 'A' },
      { formula: '1000 · Q_N / (√(3) · U_N)', source: 'IEC 60831-1' },
      [
        ['Q_N', group.ratedKvar, 'kvar'],
        ['U_N', group.ratedV, 'V'],
      ],
    ),
  ];
  const tuned = tunedOrderH(group.reactorPct);
  if (tuned !== null) {
    const head = { formula: '1 / √(p)', source: 'method, bank' };
    found.push(figure(id('tunedOrderH'), { value: tuned, unit: '' }, head, [['p', p, '']]));
  }
  return [...found, ...chargeFigures(judged, group, g, result), ...inrushFigures(judged, group, g, result)];
}

function chargeFigures(judged: Judged, group: StageGroup, g: number, result: BankResult): Figure[] {
  const charge = result.charge.stages[g]!;
  const source = CAPACITOR_RULES[judged.site.rules].dischargeSource;
  const id = (name: string): string => `charge.stages[${g}].${name}`;
  const fittedOhm = group.dischargeOhm;
  const found = [
    figure(
      id('capacitanceUf'),
      { value: charge.capacitanceUf, unit: 'µF' },
      { formula: 'Q_N · 10^9 / (3 · 2 · π · f · U_N^2)', source: 'IEC 60831-1' },
      [
        ['Q_N', group.ratedKvar, 'kvar'],
        ['U_N', group.ratedV, 'V'],
        ['f', judged.site.frequencyHz, 'Hz'],
      ],
    ),
    figure(
      id('dischargeMaxOhm'),
      { value: charge.dischargeMaxOhm, unit: 'Ω' },
      { formula: 't · 10^6 / (C · ln(√(2) · U_N / U_r))', source },
      [
        ['t', charge.dischargeWithinS, 's'],
        ['C', charge.capacitanceUf, 'µF'],
        ['U_N', group.ratedV, 'V'],
        ['U_r', charge.dischargeToV, 'V'],
      ],
    ),
  ];
  if (charge.reconnectMaxOhm !== null) {
    found.push(
      figure(
        id('reconnectMaxOhm'),
        { value: charge.reconnectMaxOhm, unit: 'Ω' },
        { formula: 't · 10^6 / (C · ln(√(2) / 0.1))', source: 'IEC 60831-1' },
        [
          ['t', result.control.reconnectDelayS, 's'],
          ['C', charge.capacitanceUf, 'µF'],
        ],
      ),
    );
  }
  if (fittedOhm !== null) {
    const natural = naturalReconnectDelayS([group], judged.site.rules, judged.site.frequencyHz);
    found.push(
      figure(
        id('timeToTenPctS'),
        { value: natural, unit: 's' },
        { formula: 'R · C · ln(√(2) / 0.1) / 10^6', source: 'IEC 60831-1' },
        [
          ['R', fittedOhm, 'Ω'],
          ['C', charge.capacitanceUf, 'µF'],
        ],
      ),
    );
  }
  return found;
}

function inrushFigures(judged: Judged, group: StageGroup, g: number, result: BankResult): Figure[] {
  const { nominalV } = judged.site;
  const own = stageOhm(group);
  const supplyOhm = (nominalV * nominalV) / (result.network.shortCircuitMva * 1e6);
  const formula = '√(2) · U / √(3) / √(X_c · X_l)';
  const source = 'closed form after IEEE C37.99, an estimate';
  const stage = result.inrush.stages[g]!;
  const found = [
    figure(`inrush.stages[${g}].singlePeakA`, { value: stage.singlePeakA, unit: 'A' }, { formula, source }, [
      ['U', nominalV, 'V'],
      ['X_c', own.capacitiveOhm, 'Ω'],
      ['X_l', supplyOhm + own.inductiveOhm, 'Ω'],
    ]),
  ];
  if (stage.ontoBankPeakA === null || stage.ontoBankHz === null) return found;
  // Peak and frequency give back both reactances: X_c·X_l from the one, X_c/X_l from the other.
  const product = ((Math.SQRT2 * nominalV) / Math.sqrt(3) / stage.ontoBankPeakA) ** 2;
  const quotient = (stage.ontoBankHz / judged.site.frequencyHz) ** 2;
  found.push(
    figure(`inrush.stages[${g}].ontoBankPeakA`, { value: stage.ontoBankPeakA, unit: 'A' }, { formula, source }, [
      ['U', nominalV, 'V'],
      ['X_c', Math.sqrt(product * quotient), 'Ω'],
      ['X_l', Math.sqrt(product / quotient), 'Ω'],
    ]),
  );
  return found;
}

/**
 * Parallel resonance of another bank at the same bus, all its stages in.
 * @param outcome the plan or judgement beside it
 * @param bank the other bank
 * @returns a figure, none where its groups differ in their ratio
 * @source method-figures
 */
export function rivalFigures({ site, result }: Pick<BankOutcome, 'site' | 'result'>, bank: Bank): Figure[] {
  const total = bank.groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, site.nominalV), 0);
  return resonanceFigure(bank, total, result.network.shortCircuitMva).map((found) => ({
    ...found,
    id: 'rival.parallelOrderClosedFormH',
  }));
}
