/** What a meter reads, one entry an interval of the record, length n. */
export interface MeterColumns {
  /** mean active power, imported > 0 [kW] */
  activeKw: Float64Array;
  /** mean lagging reactive power, ≥ 0 [kvar] */
  laggingKvar: Float64Array;
  /** mean leading reactive power, ≥ 0 [kvar] */
  leadingKvar: Float64Array;
}
