import type { Control } from '../operation/control.js';
import type { Remark } from '../problem.js';

/** The engineering answer, mildest first. */
export type Verdict = 'clear' | 'watch' | 'avoid';

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
  notes: Remark[];
}

export interface RequirementMonth {
  month: string;
  activeKwh: number;
  laggingKvarh: number;
  leadingKvarh: number;
  powerFactorLagging: number | null;
  maxKw: number;
  neededKvar: number;
  energyNeedKvar: number;
}

export interface RequirementSummary {
  targetPowerFactor: number;
  maxKvar: number;
  p99Kvar: number;
  p95Kvar: number;
  p50Kvar: number;
  meanKvar: number;
  intervalsInNeed: number;
  months: RequirementMonth[];
}

export interface BankStage {
  ratedKvar: number;
  ratedV: number;
  reactorPct: number;
  effectiveKvar: number;
  capacitorV: number;
  tunedOrderH: number | null;
}

export interface BankSummary {
  effectiveKvar: number;
  /** one entry a physical stage, groups expanded in order */
  stages: BankStage[];
  levelsKvar: number[];
}

export interface OperationMonth {
  month: string;
  powerFactorLagging: number | null;
  activeKwh: number;
  laggingKvarh: number;
  leadingKvarh: number;
}

/** An interval in which the target was missed by most. */
export interface WorstInterval {
  beginS: number;
  /** at the bus [kW] */
  activeKw: number;
  /** the load's own, at the bus [kvar] */
  reactiveKvar: number;
  connectedKvar: number;
  residualKvar: number;
  /** kvar at the meter beyond the target's [kvar] */
  shortfallKvar: number;
}

export interface OperationSummary {
  /** one entry a physical stage */
  switchings: number[];
  totalSwitchings: number;
  laggingKvarh: number;
  leadingKvarh: number;
  maxResidualKvar: number;
  minResidualKvar: number;
  shareInTargetPct: number;
  worstIntervals: WorstInterval[];
  months: OperationMonth[];
  hoursAtLevel: { levelKvar: number; hours: number }[];
}

/** One combination of the uncertain quantities. */
export interface Corner {
  faultLevelMva: number;
  capacitanceFactor: number;
  inductanceFactor: number;
  dampingKw: number;
}

export interface OrderResult {
  orderH: number;
  voltagePct: number;
  sourceA: number;
  bankA: number;
}

export interface NetworkLevel {
  bus: 'main';
  levelKvar: number;
  case: 'nominal' | 'worst';
  corner: Corner;
  parallelOrderH: number | null;
  peakOhm: number | null;
  voltageDistortionPct: number;
  currentDistortionPct: number;
  orders: OrderResult[];
}

export interface NetworkSummary {
  shortCircuitMva: number;
  shortCircuitMinMva: number;
  levels: NetworkLevel[];
}

export interface Duty {
  name: string;
  /** entry of `bank.stages`, null for the bank as a whole */
  group: number | null;
  value: number;
  limit: number | null;
  unit: string;
  ratio: number | null;
  levelKvar: number | null;
  corner: Corner | null;
  orderH: number | null;
  source: string;
  /** null: not judged */
  verdict: Verdict | null;
}

export interface ChargeStage {
  group: number;
  capacitanceUf: number;
  dischargeToV: number;
  dischargeWithinS: number;
  dischargeMaxOhm: number;
  dischargeLossW: number | null;
  reconnectMaxOhm: number | null;
  requiredOhm: number;
}

export interface InrushStage {
  group: number;
  singlePeakA: number;
  singleHz: number;
  ontoBankPeakA: number | null;
  ontoBankHz: number | null;
  worstPeakA: number | null;
  limitPeakA: number | null;
}

/** A number with the formula and the values it came from. */
export interface Figure {
  id: string;
  label: string;
  value: number | null;
  unit: string;
  /** right-hand side in symbols, in the arithmetic of + − · / ^ √() max() min() Σ */
  formula: string;
  /** the same with the values put in; empty in the engine */
  working: string;
  source: string;
  inputs: { symbol: string; value: number; unit: string }[];
}

/** The answer of `plan` and `assess`. */
export interface Result {
  record: RecordSummary;
  requirement: RequirementSummary;
  bank: BankSummary;
  control: Control;
  operation: OperationSummary;
  network: NetworkSummary;
  duties: Duty[];
  charge: { stages: ChargeStage[] };
  inrush: { stages: InrushStage[] };
  conductorMinA: number;
  robustness: null;
  money: null;
  verdict: Verdict;
  reasons: Remark[];
  assumptions: Remark[];
  cautions: Remark[];
  figures: Figure[];
}
