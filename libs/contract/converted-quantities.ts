import type { Understood } from '#libs/engine/index.js';
import { unitOfName } from './quantity.js';

/**
 * Quantities that a person wrote in another unit than their name's: "0.25 GVA", "50 hp", "200 ft".
 * @param json what was read, for the texts a person wrote
 * @param given the same as the schema reads it, quantities as numbers
 * @returns one entry a quantity whose number changed, in the order of the file
 */
export function convertedQuantities(json: unknown, given: unknown): Understood[] {
  const found: Understood[] = [];
  collect(json, given, { path: '', unit: null, found });
  return found;
}

interface Place {
  path: string;
  /** of the nearest name that ends in one: lists and ends of a range have none of their own */
  unit: string | null;
  found: Understood[];
}

function collect(json: unknown, given: unknown, place: Place): void {
  if (typeof json === 'string' && typeof given === 'number') collectNumber(json.trim(), given, place);
  if (typeof json !== 'object' || json === null || typeof given !== 'object' || given === null) return;
  for (const [key, part] of Object.entries(json)) {
    if (!Object.hasOwn(given, key)) continue;
    const path = Array.isArray(json)
      ? `${place.path}[${key}]`
      : [place.path, key].filter((step) => step !== '').join('.');
    const unit = Array.isArray(json) ? place.unit : (unitOfName(key) ?? place.unit);
    collect(part, given[key as keyof typeof given], { ...place, path, unit });
  }
}

// "75 kW" of a name in kW is no conversion.
function collectNumber(text: string, value: number, { path, unit, found }: Place): void {
  if (unit === null || Number.parseFloat(text.replace('−', '-')) === value) return;
  found.push({ path, given: text, value, unit });
}
