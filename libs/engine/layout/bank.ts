/** Three like values, of lines 1, 2, 3 or between terminals 1–2, 2–3, 3–1. */
export type Three = [number, number, number];

/** One stage measured on the site: its three line currents in service, or three capacitances with the stage isolated. */
export interface StageMeasurementInput {
  /** number of the stage within its group, from 1 */
  stage: number;
  /** local date "2026-01-31" */
  date: string;
  /** bus voltage, line to line, while the currents were read [V] */
  busV?: number;
  /** mains frequency while the currents were read; the site's where absent [Hz] */
  frequencyHz?: number;
  /** currents of the three lines, rms [A] */
  lineA?: Three;
  /** between terminals 1–2, 2–3, 3–1 of the capacitor, the third one open [µF] */
  terminalUf?: Three;
  /** how the capacitor's elements are connected; the bank's where absent */
  connection?: 'delta' | 'star' | 'earthedStar';
  instrument?: string;
}

/** A group of equal stages as the site file gives it. */
export interface StageGroupInput {
  count: number;
  /** nameplate kvar of one stage at `ratedV` [kvar] */
  ratedKvar: number;
  /** nameplate voltage, line to line [V] */
  ratedV: number;
  /** reactor ratio p = X_L / X_C at the fundamental [%], 0 = plain */
  reactorPct?: number;
  /** X_L / R_L at the fundamental */
  reactorQuality?: number;
  /** resistor fitted across a delta phase [Ω] */
  dischargeOhm?: number;
  /** reactor's rated rms current [A] */
  reactorMaxA?: number;
  /** peak current the switch is stated to make [A] */
  switchPeakA?: number;
  /** never switched */
  fixed?: boolean;
  /** nameplate capacitance of one delta phase [µF] */
  capacitanceUf?: number;
  /** nameplate inductance of one reactor phase [mH] */
  reactorMh?: number;
  /** current up to which the reactor keeps its inductance, as stated [A] */
  reactorLinearA?: number;
  /** rating of the switch for capacitor duty at the bus voltage [kvar] */
  switchKvar?: number;
  /** rating of the stage's fuse or breaker [A] */
  fuseA?: number;
  /** capacitance of one delta phase as measured on the installed stage, the least of the group [µF] */
  measuredUf?: number;
  /** when the group was put into service, local date "2026-01-31" */
  commissioned?: string;
  /** its stages as measured over the years */
  measurements?: StageMeasurementInput[];
}

/** The device that feeds the bank, as fitted. */
export interface MainDevice {
  ratedA?: number;
  /** overload setting [A] */
  settingA?: number;
  /** instantaneous setting [A] */
  instantaneousA?: number;
  breakingKa?: number;
  /** peak withstand of the bank's busbars [kA] */
  withstandKa?: number;
  /** what the bank's busbars carry for 1 s [kA] */
  shortTimeKa?: number;
}

/** What disconnects the bank when something is wrong; true where fitted, false where not. */
export interface BankProtection {
  earthFault?: boolean;
  overTemperature?: boolean;
  overPressure?: boolean;
  undervoltage?: boolean;
}

/** A bank as the site file gives it. */
export interface BankInput {
  stages: StageGroupInput[];
  /** how the capacitors are connected */
  connection?: 'delta' | 'star' | 'earthedStar';
  /** true where the bank stands on the site already, so that its capacitors have aged */
  installed?: boolean;
  /** current-carrying capacity of the bank's conductors [A] */
  conductorA?: number;
  mainDevice?: MainDevice;
  protection?: BankProtection;
  /** inductance between stages, per phase [µH] */
  interStageUh?: number;
  ambientCategory?: 'A' | 'B' | 'C' | 'D';
  /** a price book's switch kind */
  switchKind?: string;
}

/** A group of equal stages with defaults filled in; reactances per phase, star equivalent. */
export interface StageGroup {
  count: number;
  ratedKvar: number;
  ratedV: number;
  /** reactor ratio p, 0 … below 100 [%] */
  reactorPct: number;
  reactorQuality: number;
  dischargeOhm: number | null;
  reactorMaxA: number | null;
  switchPeakA: number | null;
  fixed: boolean;
}

/** A bank ready to be simulated and judged. */
export interface Bank {
  groups: StageGroup[];
  interStageUh: number;
  /** false where `interStageUh` is the customary value */
  interStageGiven: boolean;
  ambientCategory: 'A' | 'B' | 'C' | 'D' | null;
  /** its switches limit inrush, which is then not judged */
  limitsInrush?: boolean;
}
