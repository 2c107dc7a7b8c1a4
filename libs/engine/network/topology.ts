import type { StageGroup, StageGroupInput } from '../layout/bank.js';
import type { ToleranceFactors } from './tolerance-factors.js';

/** A coupler between two buses: no impedance. `either` is judged both ways, open being the normal one. */
export interface CouplerInput {
  name?: string;
  between: [string, string];
  state: 'open' | 'closed' | 'either';
}

/** A cable or feeder between two buses. */
export interface CableInput {
  name?: string;
  between: [string, string];
  lengthM: number;
  /** [Ω/km] */
  resistanceOhmPerKm: number;
  /** [Ω/km] */
  reactanceOhmPerKm: number;
  /** equal cables side by side */
  parallel?: number;
}

/** A generator at a bus; counts only while it runs. `either` is judged both ways, off being the normal one. */
export interface GeneratorInput {
  name?: string;
  bus: string;
  ratedKva: number;
  /** subtransient reactance x″ [%] of the rating */
  subtransientPct: number;
  rOverX?: number;
  state: 'off' | 'running' | 'either';
}

/** Motors or resistive loads at a bus; they damp, and are left out where the corner's damping is 0. */
export interface BusLoadInput {
  name?: string;
  bus: string;
  kw: number;
}

/** Capacitors that stand in the network already, fixed or switched apart from the bank. */
export interface CapacitorInput extends StageGroupInput {
  name?: string;
  bus: string;
  /** every count from 0 to all is judged; otherwise all are in */
  switched?: boolean;
}

/** A further bank with a controller of its own; what it stands at is none of this site's bank's doing. */
export interface FurtherBankInput {
  name?: string;
  bus: string;
  stages: StageGroupInput[];
}

/** The network of a site with several buses, all at the bus voltage. */
export interface NetworkInput {
  buses: { name: string }[];
  couplers?: CouplerInput[];
  cables?: CableInput[];
  generators?: GeneratorInput[];
  motors?: BusLoadInput[];
  resistive?: BusLoadInput[];
  capacitors?: CapacitorInput[];
  banks?: FurtherBankInput[];
  /** bus the bank stands at; the first where absent */
  bankBus?: string;
  /** bus whose voltage the limits are held against, or "primary"; where absent the primary if the meter stands there, else the bank's bus */
  couplingPoint?: string;
  /** also judged with each transformer out in turn */
  transformerOut?: boolean;
}

/** A branch without impedance. */
export interface Coupler {
  name: string;
  from: number;
  to: number;
  state: CouplerInput['state'];
}

/** A series branch between two buses [Ω at the fundamental]. */
export interface Cable {
  name: string;
  from: number;
  to: number;
  rOhm: number;
  xOhm: number;
}

/** A generator behind its subtransient impedance [Ω at the fundamental]. */
export interface Generator {
  name: string;
  bus: number;
  rOhm: number;
  xOhm: number;
  state: GeneratorInput['state'];
}

/** A further bank: entries of the network's capacitors that are switched together. */
export interface FurtherBank {
  name: string;
  bus: number;
  /** its first entry among the capacitors; one a group follows another */
  firstEntry: number;
  /** connected stages per group, one vector an electrical state: everything in first, then upwards from nothing */
  vectors: Int32Array[];
}

/** The network with names resolved to indices and defaults filled in. */
export interface Topology {
  buses: string[];
  couplers: Coupler[];
  cables: Cable[];
  generators: Generator[];
  /** damping motors per bus [kW] */
  motorKw: Float64Array;
  /** resistive load per bus [kW] */
  resistiveKw: Float64Array;
  /** those of further banks last, one entry a group */
  capacitors: { name: string; bus: number; group: StageGroup; switched: boolean }[];
  banks: FurtherBank[];
  /** bus of each transformer, in the order of the supply; empty where the source stands at the first bus */
  transformerBus: number[];
  bankBus: number;
  couplingPoint: number | 'primary';
  transformerOut: boolean;
}

/** One way the network can stand. */
export interface NetworkState {
  /** "" for the normal one */
  name: string;
  closedCouplers: boolean[];
  runningGenerators: boolean[];
  /** capacitors that are in, stages per entry */
  capacitorsIn: number[];
  /** transformer that is out, or null */
  transformerOut: number | null;
  /** of all capacitors that are in; absent where they are as their nameplates say */
  tolerance?: ToleranceFactors;
}

/** Most states that are judged. */
export const MOST_STATES = 256;

/**
 * The topology of a site with one bus.
 * @param transformers how many feed it; 0 where the source stands at it
 * @returns a single bus with the bank
 */
export function oneBus(transformers: number): Topology {
  return {
    buses: ['main'],
    couplers: [],
    cables: [],
    generators: [],
    motorKw: new Float64Array(1),
    resistiveKw: new Float64Array(1),
    capacitors: [],
    banks: [],
    transformerBus: Array.from({ length: transformers }, () => 0),
    bankBus: 0,
    couplingPoint: 0,
    transformerOut: false,
  };
}
