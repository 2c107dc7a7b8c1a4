import type { Messages } from './message.js';

/** A question that a record's values ask of a person. */
function asked(text: string, consequence: string): Messages[string] {
  return { level: 'to be accepted', text, consequence };
}

/** The rule behind a grade. */
function ruled(text: string): Messages[string] {
  return { level: 'information', text, consequence: '' };
}

/** What a record's values ask, how it is graded, and whether it can be. */
export const RECORD_MESSAGES: Messages = {
  'sign.stepKw': asked(
    'The record’s {of} steps from {beforeKw} to {afterKw} on {date} and stays there.',
    'Ask whether plant was added or taken out on that day, or the meter’s multiplier changed; if it was the multiplier, correct one side before planning.',
  ),
  'sign.stepKvar': asked(
    'The mean kvar step from {beforeKvar} to {afterKvar} on {date} without a like step of kW.',
    'Ask whether a capacitor bank was put in, taken out or failed on that day, and give it as the recorded bank.',
  ),
  'sign.phaseLost': asked(
    'From {date} on, kW fall to {kwPct} and kvar to {kvarPct} of what they were, base and peak alike: two of three phases look so.',
    'Ask whether the meter lost a phase’s voltage or current on that day; the record from there on would be too low by a third.',
  ),
  'sign.phaseLostUntil': asked(
    'Until {date}, kW are {kwPct} and kvar {kvarPct} of what they are later, base and peak alike: two of three phases look so.',
    'Ask whether the meter lacked a phase’s voltage or current until that day; the record before it would be too low by a third.',
  ),
  'sign.phaseTurned': asked(
    'From {date} on, kW fall to {kwPct} and kvar to {kvarPct} of what they were, base and peak alike: one current transformer turned round looks so.',
    'Ask whether a current transformer was put back the wrong way; the record from there on would show a third of the load.',
  ),
  'sign.phaseTurnedUntil': asked(
    'Until {date}, kW are {kwPct} and kvar {kvarPct} of what they are later, base and peak alike: one current transformer turned round looks so.',
    'Ask whether a current transformer was the wrong way round until that day; the record before it would show a third of the load.',
  ),
  'sign.voltageLost': asked(
    'The voltage falls from {usualV} to {foundV} on {date}, for {hours:hour|hours}: the mean of three with one missing looks so.',
    'Ask whether a voltage fuse of the meter was open; kW and kvar of that time would be too low.',
  ),
  'sign.leadsAtNight': asked(
    'The kvar lead in {nightsPct} of the nights, {nightKvar} as a rule, and lag by day, {dayKvar} as a rule.',
    'Ask whether a fixed bank, long cables or filters stay in at night; if there are none, the sign of the night’s kvar is wrong.',
  ),
  'sign.leadsByDay': asked(
    'The kvar lead on {daysPct} of the working days, {dayKvar} as a rule at {dayKw}, and more so than at night.',
    'Ask whether the meter counts lagging as negative, or a bank over-corrects; read the file with the other sign if so.',
  ),
  'sign.dayLater': asked(
    'When the clock changes on {date}, the working day moves an hour later against it ({shifted} of {changes:change|changes} of the record).',
    'Ask whether the stamps follow summer time and are in the zone that was given; months, windows and tariff hours depend on it.',
  ),
  'sign.dayEarlier': asked(
    'When the clock changes on {date}, the working day moves an hour earlier against it ({shifted} of {changes:change|changes} of the record).',
    'Ask whether the stamps follow summer time and are in the zone that was given; months, windows and tariff hours depend on it.',
  ),
  'sign.still': asked(
    'The {register} give one and the same value for {hours:hour|hours} from {date}[, the longest of {runs:such run|such runs}].',
    'Ask whether the register stood still or its owner filled a gap; such values are not measured.',
  ),
  'sign.zeros': asked(
    'The {register} read exactly 0 for {hours:hour|hours} from {date}, longer than this record’s habit[; the longest of {runs:such run|such runs}].',
    'Ask whether the site stood still or the meter was off; missing is not zero.',
  ),
  'grade.full': ruled(
    '{days:day is|days are} measured, {missingPct} of the record is missing or repaired; full asks for {leastDays} and allows {mostMissingPct}.',
  ),
  'grade.days': ruled('{days:day is|days are} measured; {grade} asks for {leastDays}.'),
  'grade.missing': ruled('{missingPct} of the record is missing or repaired; {grade} allows {mostMissingPct}.'),
  'grade.daysAndMissing': ruled(
    '{days:day is|days are} measured and {missingPct} of the record is missing or repaired; {grade} asks for {leastDays} and allows {mostMissingPct}.',
  ),
  'record.insufficient': {
    level: 'blocks issue',
    text: 'The record is insufficient to recommend a bank on: {days:day is|days are} measured[, {leastDays} are the least][; {missingPct} is missing or repaired, {mostMissingPct} the most].',
    consequence: 'Take this as a sketch and plan again on a longer or fuller record.',
  },
  'record.aboveRating': {
    level: 'to be accepted',
    text: 'The record’s peak, {maxKva}, is {ratedPct} of the transformers’ rating, {ratedKva}[; a factor of {factor} too much would explain it].',
    consequence:
      'Ask whether energies of an interval were taken for power, or a multiplier counted twice, and check the rating.',
  },
  'record.farBelowRating': {
    level: 'to be accepted',
    text: 'The record’s peak, {maxKva}, is {ratedPct} of the transformers’ rating, {ratedKva}[; a factor of {factor} too little would explain it].',
    consequence: 'Ask for the multiplier of the meter’s transformers and whether this meter carries the whole site.',
  },
};
