import type { Messages } from './message.js';

const WHERE = '[, group {group}][, order {orderH}][, {capacitors}][, at {bus}]';
const MET =
  '[, met with {levelKvar} connected][, fault level {faultLevelMva}][, damping load {dampingKw}][, {standing}]' +
  '[, the network’s capacitors at {networkCapacitanceFactor} of their capacitance]';

/** Why a verdict is what it is. */
export const REASON_MESSAGES: Messages = {
  'verdict.avoid': {
    level: 'blocks issue',
    text: 'The bank is over a limit.',
    consequence: 'Change the bank or the network until every limit is kept.',
  },
  'verdict.watch': {
    level: 'to be accepted',
    text: 'The bank is near a limit.',
    consequence: 'Accept the margin, or change the bank.',
  },
  'limit.notJudged': {
    level: 'to be noted',
    text: '{rows:row is|rows are} not judged: {duties}.',
    consequence: 'Give the missing limit or the missing loads, or judge by hand.',
  },
  'limit.exceeded': {
    level: 'blocks issue',
    text: `Over its limit: {duty}${WHERE}, {value} against {limit}${MET}.`,
    subject: `{duty}${WHERE}${MET}`,
    consequence: 'Change the bank or the network until the limit is kept.',
  },
  'limit.near': {
    level: 'to be accepted',
    text: `Near its limit: {duty}${WHERE}, {value} against {limit}${MET}.`,
    subject: `{duty}${WHERE}${MET}`,
    consequence: 'Accept the margin, or change the bank.',
  },
  'limit.exceededAlready': {
    level: 'to be accepted',
    text: `Exceeded without the bank already: {duty}${WHERE}, {value} against {limit}${MET}; the bank adds little to it.`,
    subject: `{duty}${WHERE}${MET}. Exceeded without the bank already.`,
    consequence: 'Settle the distortion at its sources; the bank does not mend it.',
  },
  'inrush.assumedInductance': {
    level: 'to be accepted',
    text: `Over its limit with an assumed inductance between stages: {duty}${WHERE}, {value} against {limit}.`,
    subject: `{duty}${WHERE}${MET}. The inductance between stages is assumed.`,
    consequence: 'Give the inductance between stages, or fit reactors or an inrush-limiting switch.',
  },
  'peak.near': {
    level: 'to be accepted',
    text:
      'With {levelKvar} connected the network’s parallel resonance lies at order {peakOrderH}, within {reachH} of order ' +
      '{presentOrderH}, which is present[, seen at {bus}][, fault level {faultLevelMva}][, damping load {dampingKw}][, {standing}].',
    consequence: 'Measure the distortion at this level before it is used for long, or move the resonance.',
  },
  'plain.distortingShare': {
    level: 'to be accepted',
    text: 'Distorting loads make up {sharePct} of the transformer rating, more than is customary beside stages without reactors.',
    consequence: 'Compare the same bank with reactors.',
  },
  'ripple.absorbed': {
    level: 'to be accepted',
    text: 'The bank leaves {leftPct} of the ripple-control signal at {rippleHz}, met with {levelKvar} connected: less than is customary.',
    consequence: 'Ask the network operator what must be left, or take another reactor ratio.',
  },
  'network.unknownLoads': {
    level: 'to be accepted',
    text: 'The distorting loads are unknown, so the network is not judged.',
    consequence: 'List them, or declare with an empty list that there are none.',
  },
  'network.unknownBackground': {
    level: 'to be accepted',
    text: 'The distortion of the supply is unknown, so the network is not judged.',
    consequence: 'Ask the network operator for it, or declare with an empty list that there is none.',
  },
  'supply.weakerThanLoad': {
    level: 'blocks issue',
    text:
      'The record’s greatest load, {loadKva}, is more than the least fault level at the bank, {shortCircuitMinMva}: such a ' +
      'supply could not carry it, so what is computed from the fault level means little.',
    consequence: 'Ask the network operator for the fault level again, and look at the unit it was given in.',
  },
  'recordedBank.unknown': {
    level: 'to be accepted',
    text: 'Whether a bank was working while the record was taken is unknown, so the load’s own kvar are not known.',
    consequence: 'Find out, and give it as the recorded bank.',
  },
  'recordedBank.turnedBack': {
    level: 'to be noted',
    text:
      'The record was taken with a bank switching. What it gave is certain in {certainPct} of the intervals; by what its ' +
      'controller can have done in the others the greatest need lies between {maxNeedLowKvar} and {maxNeedHighKvar}.',
    consequence:
      'Log the bank’s stages beside the meter for a week, or state the load’s own power factor, to narrow it.',
  },
  'recordedBank.rangeDivides': {
    level: 'to be accepted',
    text:
      'Whether the target of {targetPowerFactor} is met depends on what the old bank gave: it is met at the {metAt} of the ' +
      'range alone.',
    consequence: 'Take a record with the old bank out or logged before the bank is ordered.',
  },
  'recordedBank.unexplained': {
    level: 'to be accepted',
    text:
      'In {unexplained:interval|intervals} of {intervals} the record shows what the old bank, with its nameplate and ' +
      'settings, would not have left.',
    consequence: 'Look at its settings, at the kvar its stages still give, and at the record’s length of interval.',
  },
  'record.short': {
    level: 'to be accepted',
    text: 'The record covers {days:day|days}: a season, a shutdown or a busy month may be missing from it.',
    consequence: 'Plan again on a longer record before the bank is ordered.',
  },
  'record.partYear': {
    level: 'to be noted',
    text: 'The record covers {days:day|days}, less than a year.',
    consequence: 'Months outside the record are not covered.',
  },
  'need.none': {
    level: 'information',
    text: 'No bank is needed: the site holds {targetPowerFactor} already.',
    consequence: 'Nothing is to be built.',
  },
  'target.missed': {
    level: 'to be accepted',
    text: 'The target {targetPowerFactor} is missed in {months:month|months}; {month} stays lowest, at {powerFactor}.',
    consequence: 'Accept it, or allow a larger bank.',
  },
  'target.met': {
    level: 'information',
    text: 'The target {targetPowerFactor} is met in every month of the record.',
    consequence: '',
  },
  'operation.overCorrection': {
    level: 'to be accepted',
    text: 'The bank adds up to {overKvar} of leading kvar in an interval, more than its smallest stage, {smallestKvar}.',
    consequence: 'Take a smaller smallest stage, or accept leading kvar at these times.',
  },
  'switchings.lowerBound': {
    level: 'information',
    text: 'Switchings are counted on means over {intervalS}; faster swings are hidden in them, so the counts are lower bounds.',
    consequence: 'Expect more operations than counted.',
  },
  'reconnection.short': {
    level: 'blocks issue',
    text: 'The reconnection delay of {reconnectDelayS} is shorter than the standard’s own resistor allows for group {group}, {naturalS}.',
    consequence: 'Confirm that a resistor of {requiredOhm} or less is fitted, or lengthen the delay.',
  },
  'bank.ratioDisagrees': {
    level: 'to be accepted',
    text: 'The stated reactor ratio, {statedPct}, disagrees with the nameplate’s capacitance and inductance, {derivedPct}, which was used.',
    consequence: 'Read the nameplates again.',
  },
  'need.metEveryMonth': {
    level: 'information',
    text: 'Single intervals need up to {maxKvar}, and yet the target {targetPowerFactor} is met in every month without a bank.',
    consequence: 'No bank is needed for the target.',
  },
  'device.short': {
    level: 'blocks issue',
    text: '{device}[ of group {group}] falls short[: {value}][ against {limit}].',
    subject: '{device}[ of group {group}] falls short',
    consequence: 'Fit what the table of devices asks for.',
  },
  'device.shortByPractice': {
    level: 'to be accepted',
    text: '{device}[ of group {group}] falls short of common practice[: {value}][ against {limit}].',
    subject: '{device}[ of group {group}] falls short of common practice',
    consequence: 'Fit what the table of devices asks for, or accept it with a reason.',
  },
  'device.riseOverLimit': {
    level: 'to be accepted',
    text: 'If the bank’s own voltage rise is not in the highest bus voltage, the capacitors of group {group} are rated too low: {value} against {limit}.',
    subject: 'Rated voltage of group {group}, if the bank’s own rise is not in the highest bus voltage',
    consequence: 'Say what the highest voltage includes, or take the next rated voltage.',
  },
  'device.noResponse': {
    level: 'to be accepted',
    text: '{device}: the controller answers to {value}, and the smallest stage gives {limit} at its threshold.',
    subject: '{device}: the smallest stage gives less than the controller answers to',
    consequence: 'Take a transformer of a smaller ratio, or a larger smallest stage.',
  },
  'measured.noLevel': {
    level: 'to be noted',
    text: 'A measurement was given with {bankKvar} connected, which is no level of this bank, so it is not compared.',
    consequence: 'Give the bank that was connected, or measure again.',
  },
  'measured.above': {
    level: 'to be accepted',
    text: 'The {quantity} measured at order {orderH} on {bus}, {value}, is above every corner of the model, {limit} at most.',
    subject: 'Measured {quantity} at order {orderH} on {bus}, above every corner of the model',
    consequence: 'Look for a load or a background that was not listed; the model says too little at this order.',
  },
  'measured.below': {
    level: 'to be noted',
    text: 'The {quantity} measured at order {orderH} on {bus}, {value}, is below every corner of the model, {limit} at least.',
    subject: 'Measured {quantity} at order {orderH} on {bus}, below every corner of the model',
    consequence: 'The model errs on the severe side here; ask at what load it was measured.',
  },
  'ageing.overLimit': {
    level: 'to be accepted',
    text: 'With {leftPct} of the capacitance left[ in one stage of group {group}] the bank passes a limit[, tuned to order {tunedOrderH}]: {duty}.',
    consequence: 'Measure the capacitance every year and take a stage out at the value printed.',
  },
  'ageing.takeOut': {
    level: 'to be accepted',
    text: 'A stage of group {group} was measured at {capacitanceUf} a phase; it must come out at {comesOutUf}.',
    consequence: 'Take the stage out, or renew its capacitor.',
  },
  'loads.fast': {
    level: 'to be noted',
    text: '{name} swings[ by {swingKvar}][ within {swingS}], faster than stages can follow that wait {stepDelayS} between steps: they hold the target of energy alone.',
    consequence: 'Use switches without contacts if every swing has to be followed.',
  },
  'supply.photovoltaic': {
    level: 'to be noted',
    text: 'Photovoltaic plant of {photovoltaicKw} takes active power off the meter and leaves the kvar: the power factor falls by day.',
    consequence: 'Ask what kvar its inverters give, and how the target holds while the site exports.',
  },
  'layout.noCandidate': {
    level: 'blocks issue',
    text: 'The catalogue holds no bank that could be built for this site.',
    consequence: 'Widen the list of sizes, voltages or reactor ratios, or the most stages.',
  },
  'layout.onlyWatch': {
    level: 'to be accepted',
    text: 'No bank of the catalogue meets the target with every limit clear of its threshold; the nearest is proposed.',
    consequence: 'Accept what stands near a limit, or widen the catalogue.',
  },
  'layout.targetOutOfReach': {
    level: 'to be accepted',
    text: 'No bank of the catalogue meets the target in every month; the nearest is proposed.',
    consequence: 'Allow more stages, larger ones or more kvar, or accept the months that stay short.',
  },
  'layout.onlyAvoid': {
    level: 'blocks issue',
    text: 'Every bank of the catalogue is over a limit; the nearest is shown.',
    consequence: 'Widen the catalogue, or settle the distortion at its sources.',
  },
};
