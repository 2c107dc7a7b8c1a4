import type { Messages } from './message.js';

/** An input unlike what is built or agreed, for somebody to look at again. */
function unusual(text: string, consequence: string): Messages[string] {
  return { level: 'to be accepted', text, consequence };
}

/** What of the inputs looks like a slip: each may be right, and then is accepted with a reason. */
export const UNUSUAL_MESSAGES: Messages = {
  'supply.impedanceUnusual': unusual(
    'The short-circuit impedance of transformer {number}, {impedancePct}, is unusual: at {ratedKva} the least by the ' +
      'standard’s table is {tablePct}, and what is built lies between {lowPct} and {highPct}.',
    'Read the nameplate again; fault level and resonance follow from it.',
  ),
  'supply.ratingUnusual': unusual(
    'Transformer {number} of {ratedKva} would carry {ratedA} at {nominalV}; low-voltage gear is built to {mostA}.',
    'Read the nameplate again, and the unit of the rating.',
  ),
  'supply.lossesUnusual': unusual(
    'Transformer {number} loses {noLoadLossKw} at no load and {loadLossKw} at full load; the second is the larger as a rule.',
    'See whether the two losses were exchanged.',
  ),
  'supply.busFaultUnusual': unusual(
    'A fault level of {maxMva} at the bus itself is {faultKa} at {nominalV}; low-voltage gear breaks up to {mostKa}.',
    'Give the transformer between the network and the bus, or the fault level at the bus.',
  ),
  'supply.faultLevelLow': unusual(
    'The fault level of the supply, {maxMva}, is less than the transformers alone would let through, {ownMva}.',
    'Ask the network operator again, and see whether kA were taken for MVA.',
  ),
  'supply.faultLevelHigh': unusual(
    'The fault level of the supply, {maxMva}, is more than networks that feed such sites reach, {mostMva}.',
    'Ask the network operator again, and see whether kVA were taken for MVA.',
  ),
  'target.unusual': unusual(
    'The target power factor of {targetPowerFactor} is below what tariffs ask for, {leastPowerFactor} and more.',
    'Read the tariff; a tan φ is not a power factor.',
  ),
  'target.belowTariff': unusual(
    'The target power factor is {targetPowerFactor}, and the tariff charges below {freePowerFactor} by its line “{name}”.',
    'Set the target by the tariff, or accept what is charged in between.',
  ),
  'record.unlikeBills': unusual(
    'The bill of {month} says {billKwh} and the record {recordKwh}; {months:month differs|months differ} by more than 5 %.',
    'Ask which transformer ratio the meter’s readings were multiplied by, and see that bills and record are of one meter.',
  ),
  'record.unlikeTotals': unusual(
    'By the tariff the record makes {sharePct} of the real bill of {month}; {months:month differs|months differ} by more than 20 %.',
    'See that the tariff is whole and the record in the right ratio, since every saving is reckoned with both.',
  ),
  'site.frequencyUnusual': unusual(
    'The site is in the zone {timeZone}, where public networks run at {usualHz}, and {frequencyHz} was given.',
    'See that the frequency is the network’s; every reactance follows from it.',
  ),
  'site.rulesUnusual': unusual(
    'The network runs at {frequencyHz} and is judged by {edition}, as networks of 60 Hz in North America are.',
    'Ask which edition the connection agreement names.',
  ),
  'bank.ratedVoltageUnusual': unusual(
    'The capacitors of group {group} are rated {ratedV} and see {capacitorV}: of {ratedKvar} they give {givesKvar}.',
    'Read the nameplate again, kvar and voltage together.',
  ),
  'bank.aboveLoad': unusual(
    'The bank gives {bankKvar}, more than the load ever draws, {loadKva}.',
    'See that the kvar are those of a stage and not of the bank, and that the record is this site’s.',
  ),
  'record.moreKvarhThanKwh': unusual(
    'The record has more lagging kvarh than kWh, {laggingKvarh} against {activeKwh}.',
    'See whether the columns of kW and kvar were exchanged; few sites as a whole draw so much.',
  ),
  'loads.aboveRecord': unusual(
    'The distorting loads listed draw {listedKva} together, more than the record ever shows, {loadKva}.',
    'See that the record is this site’s and in the right unit, and that the listed currents run together.',
  ),
  'currentTransformer.unusual': unusual(
    'The controller’s current transformer is rated {ratioPrimaryA}; the greatest load, {loadA}, is {loadPct} of it.',
    'Read the ratio again; the controller’s kvar follow from it.',
  ),
};
