/** Metals of conductors. */
export type ConductorMetal = 'copper' | 'aluminium';

/** Resistivity at 20 °C [Ω·mm²/km]: annealed copper of 100 % conductivity, hard-drawn aluminium of 61 %. */
const RESISTIVITY: Record<ConductorMetal, number> = { copper: 17.241, aluminium: 28.264 };

/** Greatest resistance of stranded copper at 20 °C by size [mm²: Ω/km]; from memory of IEC 60228, class 2. */
const COPPER_OHM_PER_KM: Readonly<Record<number, number>> = {
  1.5: 12.1,
  2.5: 7.41,
  4: 4.61,
  6: 3.08,
  10: 1.83,
  16: 1.15,
  25: 0.727,
  35: 0.524,
  50: 0.387,
  70: 0.268,
  95: 0.193,
  120: 0.153,
  150: 0.124,
  185: 0.0991,
  240: 0.0754,
  300: 0.0601,
  400: 0.047,
  500: 0.0366,
  630: 0.0283,
};

/** Reactance of a low-voltage cable where none is stated; common practice, no source. */
export const CABLE_REACTANCE_OHM_PER_KM = 0.08;

/** Gauge numbers that are read, thinnest first. */
export const AWG_SIZES = [
  ...Array.from({ length: 14 }, (_, k) => String(14 - k)),
  '1/0',
  '2/0',
  '3/0',
  '4/0',
] as const satisfies readonly string[];

/**
 * Cross-section of a wire gauge: A = π/4·d², d = 0.127·92^((36−n)/39) mm, n = 0 for 1/0, −1 for 2/0 and so on.
 * @param size "14" … "1", "1/0" … "4/0"
 * @returns A [mm²]
 * @source derived: definition of the gauge, two sizes fixed and a geometric row between
 */
export function awgAreaMm2(size: string): number {
  const noughts = /^([1-4])\/0$/.exec(size);
  const n = noughts === null ? Number(size) : 1 - Number(noughts[1]);
  const diameterMm = 0.127 * 92 ** ((36 - n) / 39);
  return (Math.PI / 4) * diameterMm * diameterMm;
}

/**
 * Resistance of a conductor at 20 °C, where it damps a resonance least: the table's for a preferred copper size, else
 * resistivity over cross-section; aluminium in proportion to its resistivity.
 * @param areaMm2 cross-section [mm²] > 0
 * @param metal of the conductor
 * @returns resistance [Ω/km]
 * @source iec-60228, practice
 */
export function conductorOhmPerKm(areaMm2: number, metal: ConductorMetal): number {
  const copper = COPPER_OHM_PER_KM[areaMm2] ?? RESISTIVITY.copper / areaMm2;
  return metal === 'copper' ? copper : (copper * RESISTIVITY.aluminium) / RESISTIVITY.copper;
}
