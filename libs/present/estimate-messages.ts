import type { Messages } from './message.js';

/** What a plan without a record says of itself. */
export const ESTIMATE_MESSAGES: Messages = {
  'estimate.basis': {
    level: 'blocks issue',
    text: 'This is an estimate from {basis}, not from a meter’s record: the need within a day is not known.',
    consequence: 'Record the load for at least four weeks before the bank is ordered.',
  },
  'estimate.noNeed': {
    level: 'to be noted',
    text: 'By the estimate the site holds {targetPowerFactor} already.',
    consequence: 'A record may show a need that the estimate does not.',
  },
  'estimate.coversUpper': {
    level: 'information',
    text: 'By the bills the need lies between {lowerKvar} and {upperKvar}; the bank’s {effectiveKvar} reach the upper bound.',
    consequence: 'The upper bound supposes the month’s power factor at its greatest demand.',
  },
  'estimate.betweenBounds': {
    level: 'to be accepted',
    text: 'By the bills the need lies between {lowerKvar} and {upperKvar}; the bank’s {effectiveKvar} lie between, so whether it holds {targetPowerFactor} stays open.',
    consequence: 'Record the load, or allow a bank of the upper bound.',
  },
  'estimate.belowLower': {
    level: 'to be accepted',
    text: 'The bank’s {effectiveKvar} are less than {lowerKvar}, the least that could hold {targetPowerFactor} in the worst month of the bills.',
    consequence: 'Allow a larger bank, or accept the months that stay short.',
  },
  'estimate.coversList': {
    level: 'information',
    text: 'The equipment list comes to a need of {sizedKvar}; the bank’s {effectiveKvar} cover it.',
    consequence: 'Check the list against a bill or a reading.',
  },
  'estimate.belowList': {
    level: 'to be accepted',
    text: 'The equipment list comes to a need of {sizedKvar} for {targetPowerFactor}, more than the bank’s {effectiveKvar}.',
    consequence: 'Allow a larger bank, or check the list against a bill.',
  },
  'estimate.needOutOfReach': {
    level: 'to be accepted',
    text: 'No bank of the catalogue gives the estimated need within limits; the largest that keeps them is proposed.',
    consequence: 'Allow more stages, larger ones or more kvar.',
  },
  'estimate.kwDisagree': {
    level: 'to be accepted',
    text: 'In {month} the bill’s greatest demand is {billedKw} and the equipment list comes to {listedKw}: they differ by more than 25 %.',
    consequence: 'Look for loads left out or listed twice, and at load factors and coincidence.',
  },
  'estimate.kvarDisagree': {
    level: 'to be accepted',
    text: 'In {month} the bill puts the reactive power at the peak at {billedKvar} and the equipment list comes to {listedKvar}: they differ by more than 25 %.',
    consequence: 'Look at the power factors of the list, and for capacitors that work already.',
  },
  'estimate.fewMonths': {
    level: 'to be noted',
    text: 'The bills cover {months:month|months}, less than a year.',
    consequence: 'Months without a bill are not covered.',
  },
  'estimate.recordedBankUnknown': {
    level: 'to be accepted',
    text: 'Whether a bank was working in the months of the bills is unknown, so the load’s own kvar are not known.',
    consequence: 'Find out, and give it as the recorded bank.',
  },
  'estimate.noDuration': refused(
    'How long the need lasts, its percentiles and how often the target is missed are not given.',
  ),
  'estimate.noReplay': refused('No day is replayed and no interval is shown: there are none.'),
  'estimate.noLeading': refused('Leading kvar and over-correction at light load are not looked at.'),
  'estimate.noSwitchings': refused('Switchings, hours at each level and the wear of the stages are not counted.'),
  'estimate.noSetPoint': refused(
    'The set point is not searched for: the controller steers to the target, or as the site says.',
  ),
  'estimate.noBillsByClause': refused('No bill is formed: more than the totals of a month is asked for by {clauses}.'),
  'estimate.noBillsByMonths': refused(
    'No bill is formed: it needs bills of months on end, each of them long enough for its greatest demand.',
  ),
  'estimate.noSaving': refused('Saving a year, costs, present value and a choice by them are not given.'),
  'estimate.recordWins': {
    level: 'to be noted',
    text: 'Bills and equipment list of the site are not used: the meter’s record is.',
    consequence: 'Leave the record out to see the estimate.',
  },
  'estimate.labelled': {
    level: 'to be noted',
    text: 'Every figure of the load is an estimate from {basis}.',
    consequence: 'A meter’s record settles it.',
  },
  'estimate.calendarMonths': {
    level: 'to be noted',
    text: 'Each bill covers its calendar month by the clock of {timeZone}.',
    consequence: 'Read the dates on the bills; a longer period makes the mean load less.',
  },
  'estimate.peakFactor': {
    level: 'to be noted',
    text: 'For the upper bound each month’s greatest demand has the power factor of the whole month.',
    consequence: 'Read kW and kvar at the time of greatest demand.',
  },
  'estimate.atMeter': {
    level: 'to be noted',
    text: 'The bounds are kvar at the meter, at the transformer’s primary; behind it a bank gives a little more than its own.',
    consequence: 'The severe end; nothing to settle.',
  },
  'estimate.partLoad': {
    level: 'to be noted',
    text: 'Efficiency and power factor of each entry are those at its load factor; a motor at part load has lower ones than its nameplate.',
    consequence: 'Take both from the data sheet at the load it runs at.',
  },
  'estimate.fullLoad': {
    level: 'to be noted',
    text: 'Full load is taken for {entries:entry|entries} of the list without a load factor.',
    consequence: 'Give the load factor, with efficiency and power factor at that load.',
  },
  'estimate.together': {
    level: 'to be noted',
    text: 'For {entries:entry|entries} without a coincidence everything runs at the time of greatest demand.',
    consequence: 'Ask what runs together.',
  },
  'estimate.loadCurrent': {
    level: 'to be noted',
    text: 'Without a record the load current is taken as that of the distorting loads alone, {loadA}.',
    consequence: 'The severe end for the distortion of the current.',
  },
  'estimate.recordedBank': {
    level: 'to be noted',
    text: 'No bank was working in the months of the bills.',
    consequence: 'Ask the site; with an old bank in, the load’s own kvar are larger.',
  },
  'estimate.dampingKw': {
    level: 'to be noted',
    text: 'The load that damps a resonance is taken as {value}, since there is no record.',
    consequence: 'The severe end; give the least and greatest load to soften it.',
  },
  'estimate.billsAfter': {
    level: 'to be noted',
    text: 'For the bills after the bank each month’s kvarh fall to the target’s, by no more than the bank can give.',
    consequence: 'A record shows what the controller leaves.',
  },
  'estimate.notUsed': {
    level: 'to be noted',
    text: 'Given and not used: {name}.',
    consequence: 'It needs switchings and hours, which only a record gives.',
  },
  'caution.estimate': {
    level: 'information',
    consequence: '',
    text:
      'This plan rests on bills or a list of equipment, not on a record of the load. Do not order or build from it before the ' +
      'load has been recorded and planned again.',
  },
};

/** What an estimate does not say. */
function refused(text: string): Messages[string] {
  return { level: 'information', text, consequence: 'Record the load.' };
}
