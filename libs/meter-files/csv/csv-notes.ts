import type { Remark } from '#libs/engine/index.js';
import { note } from '../note.js';
import type { BuiltColumns } from '../record/build-columns.js';
import { inOrder, type QuantityColumn } from './column-choice.js';
import type { CsvFile, CsvMeaning } from './csv-meaning.js';
import type { CsvQuantity } from './csv-quantity.js';
import type { CsvSources } from './csv-sources.js';

/**
 * What is worth saying about the columns a record was read from.
 * @param file what was read
 * @param meaning what it was taken to mean
 * @param made sources and columns
 */
export function quantityNotes(
  file: CsvFile,
  meaning: CsvMeaning,
  { found, built }: { found: CsvSources; built: BuiltColumns },
): Remark[] {
  const { columns } = meaning.choice;
  const named = namesIn(file);
  const read = inOrder(columns).map(({ quantity, column }) => `${quantity} from ${named([column])}`);
  return [
    note('file-read-as', { format: 'csv', columns: read.join('; ') }),
    ...unitNotes(columns, named),
    ...nameNotes(file, columns, named),
    ...sourceNotes(found, meaning, named),
    ...(found.workedOut === null ? reactiveNotes(file, meaning, built) : workedOutNotes(found, file, meaning, named)),
    ...besideNotes(meaning, named),
  ];
}

type Named = (columns: readonly number[]) => string;

function namesIn({ layout }: CsvFile): Named {
  return (columns) => columns.map((column) => layout.names[column] || `column ${column + 1}`).join(', ');
}

const REACTIVE: readonly CsvQuantity[] = ['reactive', 'lagging', 'leading'];

function unitNotes(columns: readonly QuantityColumn[], named: Named): Remark[] {
  const mega = columns.filter(({ unit }) => unit.smallMega).map(({ column }) => column);
  const watts = columns
    .filter(({ quantity, unit }) => REACTIVE.includes(quantity) && unit.family !== 'reactive')
    .map(({ column }) => column);
  return [
    ...(mega.length > 0 ? [note('unit-read-as-mega', { columns: named(mega) })] : []),
    ...(watts.length > 0 ? [note('reactive-in-kilowatt', { columns: named(watts) })] : []),
  ];
}

function nameNotes({ layout }: CsvFile, columns: readonly QuantityColumn[], named: Named): Remark[] {
  const indexes = columns.map(({ column }) => column);
  const quadrants = indexes.filter((index) => (layout.header[index]?.quadrant ?? 0) > 0);
  const extremes = indexes.filter((index) => layout.header[index]?.extreme === true);
  return [
    ...(quadrants.length > 0 ? [note('quadrants-by-name', { columns: named(quadrants) })] : []),
    ...(extremes.length > 0 ? [note('extremes-taken', { columns: named(extremes) })] : []),
  ];
}

function sourceNotes({ registers, falls, phases }: CsvSources, { multiplier }: CsvMeaning, named: Named): Remark[] {
  return [
    ...(registers.length > 0 ? [note('registers-differenced', { columns: named(registers) })] : []),
    ...(falls > 0 ? [note('register-fell', { readings: falls })] : []),
    ...(phases.length > 0 ? [note('phases-added', { columns: named(phases) })] : []),
    ...(multiplier === 1 ? [] : [note('values-multiplied', { multiplier })]),
  ];
}

function reactiveNotes({ map }: CsvFile, { choice }: CsvMeaning, { negativeReactive }: BuiltColumns): Remark[] {
  const has = (quantity: CsvQuantity) => choice.columns.some((column) => column.quantity === quantity);
  if (has('reactive')) {
    const lagging = map.sign === 'leadingPositive' ? 'negative' : 'positive';
    if (negativeReactive > 0) return [note('reactive-sign-taken', { lagging, negative: negativeReactive })];
    return [note('reactive-never-leading', {})];
  }
  return has('leading') ? [] : [note('leading-not-recorded', {})];
}

function workedOutNotes({ workedOut }: CsvSources, { reader }: CsvFile, meaning: CsvMeaning, named: Named): Remark[] {
  const from = meaning.choice.columns.filter(({ quantity }) => quantity !== 'connected' && quantity !== 'standby');
  const { unsigned, percent } = workedOut!;
  const sided = from.filter(({ column }) => reader.sided.has(column)).map(({ column }) => column);
  return [
    note('powers-worked-out', { columns: named(from.map(({ column }) => column)) }),
    ...(percent ? [note('power-factor-in-percent', {})] : []),
    ...(unsigned
      ? [note('reactive-unsigned', {})]
      : [
          sided.length > 0
            ? note('power-factor-by-words', { columns: named(sided) })
            : note('power-factor-sign-taken', {
                sign: meaning.powerFactorSign,
              }),
        ]),
  ];
}

function besideNotes({ choice }: CsvMeaning, named: Named): Remark[] {
  const exported = choice.columns.filter(({ quantity }) => quantity === 'exported').map(({ column }) => column);
  const voltage = choice.columns.filter(({ quantity }) => quantity === 'voltage').map(({ column }) => column);
  const taken = voltage.length === 1 ? named(voltage) : '';
  return [
    ...(exported.length > 0 ? [note('export-subtracted', { column: named(exported) })] : []),
    ...(taken !== '' && choice.between === null ? [note('voltage-taken-line-to-line', { column: taken })] : []),
    ...(taken !== '' && choice.between === 'lineToNeutral' ? [note('voltage-to-line-to-line', { column: taken })] : []),
  ];
}
