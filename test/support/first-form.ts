import { deflateRawSync } from 'node:zlib';
import type { PackedColumn } from '#libs/store/packed-column.js';

/** The first form, as records of earlier versions hold it: 32-bit differences or floats, shuffled and deflated. */
export function firstForm(values: Float64Array, scale: number | null): PackedColumn {
  const scaled = Array.from(values, (value) => Math.round(value * (scale ?? 1)));
  const raw = scale === null ? values.slice() : Int32Array.from(scaled.slice(1), (next, i) => next - scaled[i]!);
  const width = scale === null ? 8 : 4;
  const bytes = new Uint8Array(raw.buffer);
  const shuffled = bytes.map((_, at) => bytes[(at % raw.length) * width + Math.floor(at / raw.length)]!);
  const facts = { intervals: values.length, scale, firstScaled: scale === null ? 0 : scaled[0]! };
  return { ...facts, bytes: deflateRawSync(shuffled, { level: 1 }) };
}
