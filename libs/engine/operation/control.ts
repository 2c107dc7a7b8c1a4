/** Settings of the controller, with defaults filled in. */
export interface Control {
  /** power factor the controller steers towards, at the bus */
  setPointPowerFactor: number;
  mode: 'nearestLevel' | 'oneByOne';
  /** share of the smallest stage a deviation must pass before anything is switched */
  responseRatio: number;
  /** least time between two switchings [s]; 0 means no bound */
  stepDelayS: number;
  /** least time a stage stays off after it was disconnected [s] */
  reconnectDelayS: number;
  /** which of several equal stages is taken */
  wear: 'even' | 'inOrder';
}
