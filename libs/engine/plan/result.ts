import type { Ageing } from '../duty/ageing.js';
import type { ChargeStage } from '../duty/charge.js';
import type { DeviceRow } from '../duty/device-row.js';
import type { Duty } from '../duty/duty-row.js';
import type { InrushStage } from '../duty/inrush.js';
import type { LimitsPoint } from '../duty/limits-point.js';
import type { MeasuredCheck } from '../duty/measured-check.js';
import type { Verdict } from '../duty/rules.js';
import type { BankSummary } from '../layout/levels.js';
import type { Money } from '../money/money-result.js';
import type { NetworkSummary } from '../network/network-check.js';
import type { Control } from '../operation/control.js';
import type { OperationSummary } from '../operation/operation.js';
import type { Remark } from '../problem.js';
import type { RecordSummary } from '../record/record-summary.js';
import type { RequirementSummary } from '../requirement/requirement.js';
import type { Figure } from './figure.js';
import type { ReactorTrial } from './reactor-choice.js';
import type { RecordedBankSummary } from './recorded-bank.js';
import type { Robustness } from './robustness.js';
import type { SpareWays } from './spare-ways.js';

/** What is said of a bank on its network, whatever the load is known from. */
export interface BankResult {
  bank: BankSummary;
  control: Control;
  network: NetworkSummary;
  /** the edition judged by, and the point it was judged at */
  limits: LimitsPoint;
  duties: Duty[];
  /** every device with its duty, the rating that asks for, and what the site has */
  devices: DeviceRow[];
  charge: { stages: ChargeStage[] };
  inrush: { stages: InrushStage[] };
  conductorMinA: number;
  /** judged beside the corners, not among them */
  ageing: Ageing;
  /** null where nothing was measured */
  measured: MeasuredCheck | null;
  /** how firm the verdict is; null for an empty bank, and until it is asked for */
  robustness: Robustness | null;
  /** the bank's stages with the customary reactor ratios; empty where its groups differ in theirs, and until asked for */
  reactorTrials: ReactorTrial[];
  /** what more stages of the largest kind need; empty for an empty bank, and until it is asked for */
  spareWays: SpareWays[];
  verdict: Verdict;
  reasons: Remark[];
  assumptions: Remark[];
  cautions: Remark[];
  figures: Figure[];
}

/** The answer of `plan` and `assess` from a meter's record. */
export interface Result extends BankResult {
  record: RecordSummary;
  /** the old bank that was switching while the record was taken, with its range; null where none was */
  recordedBank: RecordedBankSummary | null;
  requirement: RequirementSummary;
  operation: OperationSummary;
  /** null without a tariff */
  money: Money | null;
}
