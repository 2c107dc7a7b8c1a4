import { type ReadUnit, readUnit } from '../csv/unit-text.js';

/** Units of UN/ECE Recommendation 20 as messages code them; K5 was seen in a copy, the others are from memory. */
const CODES: Record<string, string> = {
  WTT: 'W',
  KWT: 'kW',
  MAW: 'MW',
  WHR: 'Wh',
  KWH: 'kWh',
  MWH: 'MWh',
  D44: 'var',
  K5: 'kvar',
  KVR: 'kvar',
  MAR: 'Mvar',
  K3: 'kvarh',
  MAH: 'Mvarh',
};

/**
 * The unit of a quantity.
 * @param code of Recommendation 20
 * @returns null where it is none of energy or power
 */
export function unitOfCode(code: string): ReadUnit | null {
  const unit = CODES[code.toUpperCase()];
  return unit === undefined ? null : readUnit(unit);
}
