import type { ChargeStage } from '../duty/charge.js';
import type { Duty } from '../duty/duty-row.js';
import type { InrushStage } from '../duty/inrush.js';
import type { Verdict } from '../duty/rules.js';
import type { BankSummary } from '../layout/levels.js';
import type { NetworkSummary } from '../network/network-check.js';
import type { Money } from '../money/money-result.js';
import type { Control } from '../operation/control.js';
import type { OperationSummary } from '../operation/operation.js';
import type { Remark } from '../problem.js';
import type { RecordSummary } from '../record/record-summary.js';
import type { RequirementSummary } from '../requirement/requirement.js';
import type { Figure } from './figure.js';

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
  /** null without a tariff */
  money: Money | null;
  verdict: Verdict;
  reasons: Remark[];
  assumptions: Remark[];
  cautions: Remark[];
  figures: Figure[];
}
