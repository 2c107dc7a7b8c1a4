import type { Remark } from '../problem.js';
import { Total } from '../quantity/compensated-sum.js';
import { energyPowerFactor } from '../quantity/power-factor.js';
import type { LoadRecord } from './load-record.js';
import { gradeRecord, type RecordGrade } from './record-grade.js';

/** Statistics of the meter's own record. */
export interface RecordSummary {
  intervals: number;
  intervalS: number;
  beginS: number;
  endS: number;
  missing: number;
  repaired: number;
  duplicates: number;
  activeKwh: number;
  laggingKvarh: number;
  leadingKvarh: number;
  powerFactorLagging: number | null;
  powerFactorNet: number | null;
  maxKw: number;
  maxKva: number;
  grade: RecordGrade;
  gradeRule: Remark;
  notes: Remark[];
}

/**
 * Totals and maxima of the record as metered. Imported energy only: E_p = Σ max(P, 0)·h;
 * net reactive energy for `powerFactorNet` is lagging − leading.
 * @param record the meter's record
 * @returns energies [kWh, kvarh], factors, greatest mean power [kW, kVA], grade
 * @source method-energy
 */
export function summarizeRecord(record: LoadRecord): RecordSummary {
  const { activeKw, laggingKvar, leadingKvar } = record;
  const active = new Total();
  const lagging = new Total();
  const leading = new Total();
  let maxKw = activeKw[0]!;
  let maxKvaSquared = 0;
  for (let i = 0; i < activeKw.length; i++) {
    const p = activeKw[i]!;
    const q = laggingKvar[i]! - leadingKvar[i]!;
    active.add(Math.max(p, 0));
    lagging.add(laggingKvar[i]!);
    leading.add(leadingKvar[i]!);
    maxKw = Math.max(maxKw, p);
    maxKvaSquared = Math.max(maxKvaSquared, p * p + q * q);
  }
  const hours = record.intervalS / 3600;
  const activeKwh = active.value * hours;
  const laggingKvarh = lagging.value * hours;
  const leadingKvarh = leading.value * hours;
  return {
    intervals: activeKw.length,
    intervalS: record.intervalS,
    beginS: record.firstS,
    endS: record.endS,
    missing: record.missing,
    repaired: record.repaired,
    duplicates: record.duplicates,
    activeKwh,
    laggingKvarh,
    leadingKvarh,
    powerFactorLagging: energyPowerFactor(activeKwh, laggingKvarh),
    powerFactorNet: energyPowerFactor(activeKwh, laggingKvarh - leadingKvarh),
    maxKw,
    maxKva: Math.sqrt(maxKvaSquared),
    ...gradeRecord(record),
    notes: [...record.notes],
  };
}
