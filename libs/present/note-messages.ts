import type { FindingLevel, Messages } from './message.js';

/** A decision that every valid reading shares, or that the file itself states. */
function told(text: string, consequence = ''): Messages[string] {
  return { level: 'information', text, consequence };
}

/** A decision or a loss that a planner should look at. */
function noted(text: string, consequence: string, level: FindingLevel = 'to be noted'): Messages[string] {
  return { level, text, consequence };
}

/** What the reader of a meter file decided, repaired or left out. */
export const NOTE_MESSAGES: Messages = {
  'file-read-as': told('The file was read as {format}: {columns}.', 'See that each column is what it says.'),
  'encoding-converted': told('The file’s letters were converted from {encoding}.'),
  'rows-before-header': told('{rows:row stands|rows stand} before the header and were left out.'),
  'header-repeated': told('The header is repeated in {rows:row|rows}, which were left out.'),
  'text-rows-left-out': told(
    '{rows:line of text was|lines of text were} left out among the data, the first in row {first}.',
  ),
  'total-rows-left-out': told('{rows:row of totals was|rows of totals were} left out.'),
  'decimal-mark-settled': told('The decimal mark is “{mark}”; every other reading fails.'),
  'thousands-divided': told('{numbers:number has|numbers have} a mark between thousands.'),
  'date-order-settled': told('Dates are in the order {order}; every other reading fails.'),
  'serial-dates': told('Stamps are a spreadsheet’s serial dates, counted from 1900 and rounded to the second.'),
  'intervals-counted': told('{column} counts the intervals of a day: {perDay} from midnight to midnight.'),
  'rows-newest-first': told('The rows stand newest first; {rows:row was|rows were} turned round.'),
  'rows-put-in-order': noted(
    '{rows:row stood|rows stood} out of order and were put in place.',
    'Ask how the file was made.',
  ),
  'duplicates-dropped': noted(
    '{rows:identical repeat was|identical repeats were} dropped.',
    'Nothing is lost by it.',
    'information',
  ),
  'conflicting-rows-settled': noted(
    '{rows:row repeats|rows repeat} an interval with another value; the {kept} was kept, as asked.',
    'Ask which of them the bill used.',
  ),
  'intervals-without-value': noted(
    '{intervals:interval has|intervals have} no value and were left out.',
    'Missing is not zero; find out why.',
  ),
  'values-estimated': noted(
    '{rows:row is|rows are} marked as estimated or substituted; they were kept.',
    'They are not measured.',
  ),
  'values-flagged-missing': noted(
    '{rows:row is|rows are} marked as missing or invalid and were left out.',
    'Missing is not zero; find out why.',
  ),
  'fillers-left-out': noted(
    '{values:number|numbers} such as {value} in {columns} stand for missing values and were left out: below zero where nothing else is, and beyond three times anything else.',
    'Missing is not zero; find out why. If they are values, say so in the map (fillers).',
  ),
  'qualities-unknown': noted(
    '{rows:row is|rows are} marked {codes}, which is not understood; the values were kept.',
    'Ask what it means, and say it in the map.',
  ),
  'quality-not-read': noted(
    'Columns called a status hold numbers that are not understood and were passed over: {columns}.',
    'See whether they mark values that should not count.',
  ),
  'days-in-columns': told('The file has a row a day; the intervals of a day stand in {columns} columns.'),
  'meter-chosen': told('Meter {meter} was read, as asked; {others:other meter was|other meters were} left out.'),
  'zone-assumed-utc': noted(
    'No zone was given, so stamps were taken as UTC.',
    'Give the zone: days and months depend on it.',
  ),
  'zone-from-header': told('The header states the zone {zone}.'),
  'stamps-assumed-beginnings': noted(
    'Nothing says whether a stamp marks the beginning or the end of its interval; beginnings were assumed.',
    'Ask; the other reading moves every month by one interval.',
  ),
  'stamps-mark-ends': told('Stamps mark the end of their interval: {because}.'),
  'midnight-under-ending-day': told('Midnight is written under the day that ends in {rows:row|rows}.'),
  'doubled-hour-by-order': told('{rows:row|rows} of the doubled autumn hour were told apart by their order.'),
  'doubled-hour-once': noted(
    'The doubled autumn hour stands once in the file, in {rows:row|rows}; its first pass was taken.',
    'One hour is missing there.',
  ),
  'skipped-hour-left-out': noted(
    '{rows:row stands|rows stand} in the hour that spring skips and were left out.',
    'Ask whether the meter’s clock follows summer time.',
  ),
  'unit-read-as-mega': noted(
    'A small m was read as mega, not milli, in: {columns}.',
    'See that the figures are of the right size.',
  ),
  'reactive-in-kilowatt': noted(
    'Reactive columns are named in kW or kWh and were taken as kvar or kvarh: {columns}.',
    'See that they are reactive.',
  ),
  'leading-not-recorded': noted(
    'The file has no leading kvar; they were taken as none.',
    'Over-correction in the record would not show.',
  ),
  'leading-left-out': noted(
    'Leading kvar stand in the file in a form that cannot be read together with the rest, and were left out: {channels}.',
    'Over-correction in the record would not show. Ask for them in intervals of the same length.',
  ),
  'reactive-sign-taken': told(
    'Lagging kvar were taken as {lagging}; {negative:value is|values are} negative.',
    'See that the sign is so.',
  ),
  'reactive-never-leading': noted(
    'The reactive column is nowhere negative; all of it was taken as lagging. If it has no sign, over-correction cannot show.',
    'Ask whether the meter writes the sign of kvar.',
    'information',
  ),
  'reactive-unsigned': noted(
    'The file gives kvar only as a size without a sign; all of it was taken as lagging, and over-correction cannot show.',
    'Ask for kvar with their sign, or lagging and leading apart.',
  ),
  'powers-worked-out': noted(
    'Active or reactive power was worked out from {columns}.',
    'Near a power factor of 1 small errors of these columns are large errors of the kvar.',
  ),
  'power-factor-in-percent': told('The power factor is written in percent and was divided by 100.'),
  'power-factor-sign-taken': told('The sign of the power factor was read as: {sign}.', 'See that it is so.'),
  'power-factor-by-words': told('Whether a power factor lags or leads was read from the words beside it: {columns}.'),
  'extremes-taken': noted(
    'By its name {columns} is a greatest or least value; it was read as the mean of the interval.',
    'See that it is one.',
  ),
  'phases-added': told('Columns of the three phases were added: {columns}.'),
  'registers-differenced': told(
    'Columns hold the readings of registers; the energy of an interval is the difference of two: {columns}.',
  ),
  'voltage-to-line-to-line': told('Voltage ({column}) is line to neutral; it was multiplied by √3.'),
  'export-subtracted': told('Exported power ({column}) was subtracted from imported.'),
  'voltage-taken-line-to-line': noted('Voltage ({column}) was taken as line to line.', 'See that it is of that size.'),
  'intervals-repaired': noted(
    '{intervals:interval was|intervals were} filled by {method}, as asked.',
    'They are not measured.',
  ),
  'quadrants-added': told(
    'Reactive energy of quadrants I and II was added as lagging, of III and IV as leading; exported energy was subtracted.',
  ),
  'quadrants-by-name': told(
    'Reactive energy of quadrants I and II was read as lagging, of III and IV as leading: {columns}.',
  ),
  'channels-added': told('Channels {channels} were added up as {quantity}.'),
  'channels-left-out': told(
    'Channels {channels} say the same in another way, or nothing a record needs, and were left out.',
  ),
  'meters-left-out': noted(
    'Other meters of the file give no record by themselves and were left out: {meters}.',
    'See that the right one was read.',
  ),
  'values-substituted': noted(
    '{values:value is|values are} estimated, substituted or provisional, as the file itself says.',
    'They are not measured.',
  ),
  'values-unusable': noted(
    '{values:value is|values are} marked as unusable and were left out.',
    'Missing is not zero; find out why.',
  ),
  'values-multiplied': told('All energies and powers were multiplied by {multiplier}, as asked.'),
  'status-words': noted(
    'The meter set a status word for {intervals:interval|intervals}.',
    'Ask what it means: a power failure, a changed clock or a fault.',
  ),
  'partial-intervals-left-out': noted(
    '{intervals:interval was|intervals were} cut short by an event of the meter and left out.',
    'A supply failure or a changed clock explains it.',
  ),
  'interval-ends-by-format': told('The format stamps the end of each interval.'),
  'register-fell': noted(
    'A register fell at {readings:reading|readings}; the energy of those intervals is not known.',
    'Ask whether the meter was reset, exchanged or ran over.',
  ),
  'register-readings-missing': noted(
    'Readings of a register are missing before {readings:reading|readings}; the energy between was left out.',
    'It belongs to no one interval.',
  ),
  'sheet-read': told('The record stands in the sheet {sheet}, one of {sheets}.'),
  'sheets-hidden': noted('The workbook hides: {sheets}.', 'See that the sheet that was read is the one that is meant.'),
  'parquet-columns-left-out': told('Columns of lists or of types that hold no reading were left out: {columns}.'),
  'readings-questionable': noted(
    '{readings:reading is|readings are} marked as questionable or failed a check.',
    'They were taken as they stand.',
  ),
  'samples-taken-as-means': noted(
    'Values of a moment were taken as means of their interval: {channels}.',
    'Short peaks and lulls may be missed or overstated.',
  ),
  'total-flow-taken': noted(
    'The file sums both directions of energy: {channels}. All of it was taken as imported.',
    'Where the site exports, this is too much.',
  ),
  'secondary-metered': noted(
    'The file marks {channels} as the meter’s own, secondary, values.',
    'Ask whether ratios of instrument transformers are in them.',
  ),
  'xml-encoding-misdeclared': told('The file says that it is in {declared} and is in {taken}.'),
  'espi-joined-by-order': noted(
    '{entries:entry has|entries have} no links and were joined by their order.',
    'See that each channel is what it says.',
  ),
  'record-extended': told(
    'The record was extended by {added:interval|intervals} of a further file; {agreed:interval was|intervals were} in both, alike.',
  ),
  'overlap-settled': noted(
    'The record and the further file disagree in {intervals:interval|intervals}; the {kept} of the two was kept, as asked.',
    'Ask which of them the bill used.',
  ),
  'column-left-out': noted(
    'The column {column} was left out: only a part of the extended record has it.',
    'Extend with a file that has it.',
  ),
  'kept-answers-used': told('The file was read with the answers kept as “{name}”, version {version}.'),
  'nem12-time': told('NEM12 keeps its own time, UTC{zone}, all year.'),
  'nem12-header-missing': noted('The NEM12 header record is missing.', 'The file may have been cut.'),
  'nem12-end-missing': noted('The NEM12 end record is missing.', 'The file may have been cut.'),
  'nem12-streams-added': told('Streams {streams} were added up as {quantity}.'),
  'nem12-streams-left-out': told('Streams {streams} are not energy and were left out.'),
  'nem12-substituted': noted(
    '{values:value is|values are} substituted or estimated by the meter’s owner.',
    'They are not measured.',
  ),
  'nem12-null': noted('{values:value is|values are} flagged as null and were left out.', 'Missing is not zero.'),
  'nem12-quality-unstated': noted(
    '{values:value carries|values carry} no statement of quality.',
    'They were taken as actual.',
  ),
};
