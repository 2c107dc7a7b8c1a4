import { energyPowerFactor } from '../quantity/power-factor.js';
import type { DemandReading } from './demand-reading.js';
import type { EnergyReading } from './energy-reading.js';
import type { FactorRule, ReactiveBasis } from './papers.js';
import { roundAmount } from './round-amount.js';

/** How the power factor of a period is formed, defaults filled in. */
export interface SettledFactorRule {
  basis: 'energy' | 'atMaxKw' | 'maxima';
  reactive: ReactiveBasis;
  decimals: number | null;
}

/**
 * The factor rule of a tariff with its defaults: energies, lagging, unrounded.
 * @param rule as given
 * @returns the rule in full
 */
export function settleFactorRule(rule: FactorRule | undefined): SettledFactorRule {
  return {
    basis: rule?.basis ?? 'energy',
    reactive: rule?.reactive ?? 'lagging',
    decimals: rule?.decimals ?? null,
  };
}

/** What a power factor is formed from: energies, and demand where the rule looks at it. */
export interface FactorReadings {
  energy: EnergyReading;
  demand: DemandReading | null;
}

/**
 * Power factor of a period by a tariff's rule: E_p/√(E_p² + E_q²); P/√(P² + Q²) in the first block of greatest kW;
 * or maxKw/maxKva.
 * @param rule the tariff's rule
 * @param readings energies and demand of the same intervals
 * @param period index of the period
 * @returns λ rounded to the rule's decimals, or null where there is no energy
 * @source method-money
 */
export function powerFactorBy(rule: SettledFactorRule, readings: FactorReadings, period: number): number | null {
  const factor = unrounded(rule, readings, period);
  return factor === null ? null : roundAmount(factor, rule.decimals);
}

function unrounded(rule: SettledFactorRule, { energy, demand }: FactorReadings, period: number): number | null {
  if (rule.basis === 'energy') {
    return energyPowerFactor(energy.activeKwh(period), energy.reactiveKvarh(rule.reactive, period));
  }
  if (demand === null) throw new Error('the rule looks at demand');
  const maxKw = demand.maxKw(period);
  if (rule.basis === 'atMaxKw') return energyPowerFactor(maxKw, demand.kvarAtMaxKw(rule.reactive, period));
  return maxKw <= 0 ? null : maxKw / demand.maxKva(period);
}
