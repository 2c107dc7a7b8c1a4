/** What a size of the catalogue says of a detuned stage: Q_N at U_N, or its output at nominal bus voltage. */
export type KvarBasis = 'rated' | 'effective';

/** What a layout may be built from; absent parts take the shipped list. */
export interface CatalogueInput {
  stageKvar?: number[];
  /** what `stageKvar` says of a detuned stage: its nameplate, or its output at mains voltage; `rated` where absent */
  kvarBasis?: KvarBasis;
  ratedV?: number[];
  reactorPct?: number[];
  maxStages?: number;
  cabinets?: { name: string; maxKvar: number; maxStages: number }[];
  switches?: {
    kind: string;
    maxStageKvar: number;
    stepDelayS: number;
    reconnectDelayS: number;
    limitsInrush?: boolean;
  }[];
  evenSteps?: boolean;
  /** most effective kvar the bank may have [kvar] */
  maxTotalKvar?: number;
  /** controller set points to try */
  setPoints?: number[];
  interStageUh?: number;
  mustMeetTarget?: boolean;
}
