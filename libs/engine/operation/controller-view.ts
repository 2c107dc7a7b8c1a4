/** What the controller sees, one entry a valid interval, length n. */
export interface ControllerView {
  intervalS: number;
  /** UTC epoch seconds, ascending [s] */
  beginS: Float64Array;
  /** Q − P⁺·tan φ_set at the bus [kvar] */
  wantedKvar: Float64Array;
  /** (U/U_nom)² where the record has a voltage column, else null */
  voltageScale: Float64Array | null;
  /** 1 where a standby supply runs and the bank is held off, else null */
  standby: Uint8Array | null;
}
