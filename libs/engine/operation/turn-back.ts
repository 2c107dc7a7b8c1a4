import type { Control } from './control.js';
import { type OldBankStates, oldBankStates } from './old-bank-states.js';
import type { SwitchedBank } from './switched-bank.js';

/** What the meter saw at the bus while the old bank was working; columns of length n. */
export interface MeteredWithBank {
  intervalS: number;
  /** beginnings [s], ascending */
  beginS: Float64Array;
  /** active power the target counts, P⁺ [kW] */
  targetKw: Float64Array;
  /** net reactive power at the bus, old bank in it [kvar] */
  netKvar: Float64Array;
  /** tan φ of the old controller's set point */
  tanSet: number;
  /** least and greatest tan φ of the load alone, as stated; null where nothing is */
  loadTan: { least: number; most: number } | null;
  /** (U/U_nom)² per interval, or null */
  voltageScale: Float64Array | null;
  standby: Uint8Array | null;
}

/** What the old bank gave while the record was taken; columns of length n, as delivered at the interval's voltage. */
export interface TurnedBack {
  /** [kvar] */
  kvar: Float64Array;
  /** least and greatest the old bank can have given [kvar] */
  lowKvar: Float64Array;
  highKvar: Float64Array;
  /** intervals in which only one level was possible */
  certain: number;
  /** intervals that no level explains: settings, nameplate or record are not what was stated */
  unexplained: number;
}

/** Fewer certain intervals than this fit no line. */
const LEAST_FITTED = 24;
/** A spread of active power below this share of its greatest fits no slope. */
const LEAST_SPREAD = 0.05;

/**
 * Turns a record taken with a bank switching back: which levels the bank can have stood at, interval by interval, by its
 * controller's own rules, and which of them is likeliest.
 *
 * With e = Q_net − P⁺·tan φ_set, the deviation the controller was left with: a level is possible where the controller,
 * coming from a level possible before, would have held it (|e| ≤ a·q_min) or gone to it (`OldBankStates`). Least and
 * greatest possible level are the range. Taken is the level between them that comes nearest to a straight line of the
 * load's own kvar over its kW, fitted by least squares to the intervals with one possible level; to the middle of the
 * range where there are too few.
 * @param bank the old bank as its controller saw it
 * @param control its settings
 * @param metered what the meter saw at the bus
 * @returns kvar of the old bank with its range
 * @source method-recorded-bank
 */
export function turnBack(bank: SwitchedBank, control: Control, metered: MeteredWithBank): TurnedBack {
  const n = metered.beginS.length;
  const found: TurnedBack = {
    kvar: new Float64Array(n),
    lowKvar: new Float64Array(n),
    highKvar: new Float64Array(n),
    certain: 0,
    unexplained: 0,
  };
  const states = oldBankStates(bank, control, metered.intervalS);
  states.begin(metered.beginS[0] ?? 0);
  for (let i = 0; i < n; i++) {
    if (!rangeInto(found, states, metered, i)) found.unexplained++;
    if (found.highKvar[i]! - found.lowKvar[i]! <= 1e-9 * (1 + found.highKvar[i]!)) found.certain++;
  }
  chooseInto(found, states.levelsKvar, metered);
  return found;
}

function rangeInto(found: TurnedBack, states: OldBankStates, metered: MeteredWithBank, i: number): boolean {
  const scale = metered.voltageScale === null ? 1 : metered.voltageScale[i]!;
  const beginS = metered.beginS[i]!;
  const net = metered.netKvar[i]!;
  let explained = true;
  if (metered.standby !== null && metered.standby[i] === 1) states.holdOff(beginS);
  else {
    const kw = metered.targetKw[i]!;
    explained = states.next({ beginS, residualKvar: net - kw * metered.tanSet, scale, ...ownBounds(metered, kw, net) });
  }
  found.lowKvar[i] = states.leastKvar * scale;
  found.highKvar[i] = states.mostKvar * scale;
  return explained;
}

// The load's own kvar, net plus old bank, lie between the stated tan φ times its kW.
function ownBounds(
  { loadTan }: MeteredWithBank,
  kw: number,
  net: number,
): { leastGivenKvar: number; mostGivenKvar: number } {
  if (loadTan === null || kw <= 0) {
    return { leastGivenKvar: Number.NEGATIVE_INFINITY, mostGivenKvar: Number.POSITIVE_INFINITY };
  }
  return { leastGivenKvar: kw * loadTan.least - net, mostGivenKvar: kw * loadTan.most - net };
}

function chooseInto(found: TurnedBack, levelsKvar: Float64Array, metered: MeteredWithBank): void {
  const line = loadLine(found, metered);
  for (let i = 0; i < found.kvar.length; i++) {
    const scale = metered.voltageScale === null ? 1 : metered.voltageScale[i]!;
    const low = scale === 0 ? 0 : found.lowKvar[i]! / scale;
    const high = scale === 0 ? 0 : found.highKvar[i]! / scale;
    const own = line === null ? null : line.atNothingKvar + line.slope * metered.targetKw[i]!;
    const wanted = own === null || scale === 0 ? (low + high) / 2 : (own - metered.netKvar[i]!) / scale;
    found.kvar[i] = nearestLevelKvar(levelsKvar, Math.min(Math.max(wanted, low), high)) * scale;
  }
}

/** Q = Q₀ + slope · P⁺ of the load alone. */
interface LoadLine {
  atNothingKvar: number;
  slope: number;
}

function loadLine(found: TurnedBack, { targetKw, netKvar }: MeteredWithBank): LoadLine | null {
  let [count, sumX, sumY, sumXx, sumXy, most] = [0, 0, 0, 0, 0, 0];
  for (let i = 0; i < targetKw.length; i++) {
    const x = targetKw[i]!;
    most = Math.max(most, x);
    if (found.highKvar[i]! - found.lowKvar[i]! > 1e-9 * (1 + found.highKvar[i]!)) continue;
    const y = netKvar[i]! + found.lowKvar[i]!;
    count++;
    sumX += x;
    sumY += y;
    sumXx += x * x;
    sumXy += x * y;
  }
  if (count < LEAST_FITTED) return null;
  const spread = sumXx / count - (sumX / count) ** 2;
  if (!(spread > (LEAST_SPREAD * most) ** 2)) return { atNothingKvar: 0, slope: sumX === 0 ? 0 : sumY / sumX };
  const slope = (sumXy / count - (sumX / count) * (sumY / count)) / spread;
  return { atNothingKvar: sumY / count - (slope * sumX) / count, slope };
}

function nearestLevelKvar(levelsKvar: Float64Array, wanted: number): number {
  let low = 0;
  let high = levelsKvar.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (levelsKvar[middle]! <= wanted) low = middle;
    else high = middle;
  }
  return wanted - levelsKvar[low]! <= levelsKvar[high]! - wanted ? levelsKvar[low]! : levelsKvar[high]!;
}
