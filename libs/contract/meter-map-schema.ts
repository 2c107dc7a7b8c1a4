import * as z from 'zod';
import { METER_COLUMNS, METER_UNITS, type MeterMap, POWER_FACTOR_SIGNS, UNIT_COLUMNS } from './meter-map.js';
import { label, POSITIVE, plain, quantity, whole } from './schema-parts.js';
import { readBySchema } from './schema-problems.js';
import { isTimeZone } from './time-zone.js';

const column = z.union([whole(1, 16_384), label()], { error: 'a column number counted from 1, or a column name' });
const unit = z.enum(METER_UNITS);

/** What a person says about a meter file. */
export const meterMapSchema = z
  .strictObject({
    format: label(40).optional(),
    sheet: z.union([whole(1, 256), label()], { error: 'a sheet number counted from 1, or a sheet name' }).optional(),
    separator: z.enum([',', ';', '\t', '|']).optional(),
    decimal: z.enum(['.', ',']).optional(),
    headerRow: whole(0, 1000).optional(),
    columns: z.partialRecord(z.enum(METER_COLUMNS), z.union([column, z.array(column).length(3)])).optional(),
    units: z.partialRecord(z.enum(UNIT_COLUMNS), unit).optional(),
    quantity: z.enum(['power', 'energy']).optional(),
    sign: z.enum(['laggingPositive', 'leadingPositive']).optional(),
    stamp: z.enum(['begin', 'end']).optional(),
    dateOrder: z.enum(['ymd', 'dmy', 'mdy']).optional(),
    timeZone: z.string().refine(isTimeZone, { error: 'a time zone such as "Europe/Dublin" or "+10:00"' }).optional(),
    meter: label(80).optional(),
    multiplier: plain(POSITIVE).optional(),
    repair: z.enum(['none', 'hold', 'interpolate', 'typicalDay']).optional(),
    upToS: quantity('upToS', { min: 0 }).optional(),
    energy: z.enum(['interval', 'register']).optional(),
    powerFactorSign: z.enum(POWER_FACTOR_SIGNS).optional(),
    voltageBetween: z.enum(['lineToLine', 'lineToNeutral']).optional(),
    quality: z.record(label(40), z.enum(['measured', 'estimated', 'missing'])).optional(),
    dayColumns: z.enum(['clock', 'elapsed']).optional(),
    fillers: z.enum(['missing', 'values']).optional(),
    keepRow: z.enum(['first', 'last']).optional(),
    overlap: z.enum(['earlier', 'later']).optional(),
  })
  .meta({ id: 'MeterMap' });

/**
 * A map file as a map.
 * @param json what JSON.parse gave
 * @returns the map
 * @throws InputProblem with every problem and its path
 */
export function readMeterMap(json: unknown): MeterMap {
  return readBySchema(meterMapSchema, json);
}
