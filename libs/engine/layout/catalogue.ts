/** What a layout may be built from; absent parts take the shipped list. */
export interface CatalogueInput {
  stageKvar?: number[];
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
