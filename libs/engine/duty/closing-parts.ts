/** A series branch at the fundamental's resistance: R + sL + 1/(sC); inductance 0 for a plain stage. */
export interface SeriesBranch {
  rOhm: number;
  /** [H] */
  inductanceH: number;
  /** [F], > 0 */
  capacitanceF: number;
}

/** A series branch of a network at the fundamental's resistance; capacitance 0 where there is no capacitor. */
export interface NetworkBranch extends SeriesBranch {
  from: number;
  /** −1 is earth */
  to: number;
  /** the far end is the source's voltage instead of earth */
  driven: boolean;
}

/** The network round a closing, where capacitors stand apart from the bank. */
export interface ClosingNetwork {
  nodes: number;
  bankNode: number;
  branches: NetworkBranch[];
}

/** The circuit into which one uncharged branch is closed, per phase. */
export interface ClosingCircuit {
  /** source and transformer [Ω] and [H], inductance > 0 */
  sourceOhm: number;
  sourceH: number;
  /** what is connected already, in its steady state */
  connected: SeriesBranch[];
  closing: SeriesBranch;
  /** takes the source's place where other capacitors stand behind an impedance */
  network?: ClosingNetwork;
  /** crest of the source's phase voltage [V] */
  crestV: number;
  frequencyHz: number;
}
