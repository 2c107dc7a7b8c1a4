import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `unusual-messages` in German, under the same codes. */
export const GERMAN_UNUSUAL_MESSAGES: Readonly<Record<string, Translation>> = {
  'supply.impedanceUnusual': said(
    'Die Kurzschlussspannung des Transformators {number}, {impedancePct}, ist ungewöhnlich: Bei {ratedKva} ist der kleinste Wert nach der Tabelle der Norm {tablePct}, und gebaut wird zwischen {lowPct} und {highPct}.',
    'Das Leistungsschild noch einmal ablesen; Kurzschlussleistung und Resonanz folgen daraus.',
  ),
  'supply.ratingUnusual': said(
    'Transformator {number} mit {ratedKva} würde {ratedA} bei {nominalV} führen; Niederspannungsgeräte werden bis {mostA} gebaut.',
    'Das Leistungsschild und die Einheit der Bemessungsleistung noch einmal ablesen.',
  ),
  'supply.lossesUnusual': said(
    'Transformator {number} hat {noLoadLossKw} Leerlauf- und {loadLossKw} Kurzschlussverluste; in der Regel sind die zweiten größer.',
    'Prüfen, ob die beiden Verluste vertauscht sind.',
  ),
  'supply.busFaultUnusual': said(
    'Eine Kurzschlussleistung von {maxMva} an der Sammelschiene selbst sind {faultKa} bei {nominalV}; Niederspannungsgeräte schalten bis {mostKa} ab.',
    'Den Transformator zwischen Netz und Sammelschiene angeben oder die Kurzschlussleistung an der Sammelschiene.',
  ),
  'supply.faultLevelLow': said(
    'Die Kurzschlussleistung des Netzes, {maxMva}, ist kleiner als das, was die Transformatoren allein durchließen, {ownMva}.',
    'Den Netzbetreiber erneut fragen und prüfen, ob kA für MVA genommen wurden.',
  ),
  'supply.faultLevelHigh': said(
    'Die Kurzschlussleistung des Netzes, {maxMva}, ist größer, als Netze für solche Standorte erreichen, {mostMva}.',
    'Den Netzbetreiber erneut fragen und prüfen, ob kVA für MVA genommen wurden.',
  ),
  'target.unusual': said(
    'Der Zielwert des Leistungsfaktors von {targetPowerFactor} liegt unter dem, was Tarife verlangen, {leastPowerFactor} und mehr.',
    'Den Tarif nachlesen; ein tan φ ist kein Leistungsfaktor.',
  ),
  'target.belowTariff': said(
    'Der Zielwert des Leistungsfaktors ist {targetPowerFactor}, und der Tarif berechnet unter {freePowerFactor} die Position „{name}“.',
    'Den Zielwert nach dem Tarif wählen oder hinnehmen, was dazwischen berechnet wird.',
  ),
  'record.unlikeBills': said(
    'Die Rechnung für {month} nennt {billKwh}, der Lastgang {recordKwh}; {months:Monat weicht|Monate weichen} um mehr als 5 % ab.',
    'Fragen, mit welcher Wandlerübersetzung die Zählerwerte multipliziert wurden, und prüfen, ob Rechnungen und Lastgang zu einem Zähler gehören.',
  ),
  'record.unlikeTotals': said(
    'Nach dem Tarif ergibt der Lastgang {sharePct} der wirklichen Rechnung für {month}; {months:Monat weicht|Monate weichen} um mehr als 20 % ab.',
    'Prüfen, ob der Tarif vollständig ist und der Lastgang die richtige Übersetzung hat, denn jede Ersparnis rechnet mit beiden.',
  ),
  'site.frequencyUnusual': said(
    'Der Standort liegt in der Zeitzone {timeZone}, wo öffentliche Netze mit {usualHz} laufen, und {frequencyHz} wurde angegeben.',
    'Prüfen, ob die Frequenz die des Netzes ist; jede Reaktanz folgt daraus.',
  ),
  'site.rulesUnusual': said(
    'Das Netz läuft mit {frequencyHz} und ist nach {edition} beurteilt, wie es Netze mit 60 Hz in Nordamerika sind.',
    'Fragen, welche Ausgabe der Anschlussvertrag nennt.',
  ),
  'bank.ratedVoltageUnusual': said(
    'Die Kondensatoren der Gruppe {group} sind für {ratedV} bemessen und liegen an {capacitorV}: Von {ratedKvar} geben sie {givesKvar}.',
    'Das Leistungsschild noch einmal ablesen, kvar und Spannung gemeinsam.',
  ),
  'bank.aboveLoad': said(
    'Die Anlage gibt {bankKvar}, mehr, als die Last je aufnimmt, {loadKva}.',
    'Prüfen, ob die kvar die einer Stufe und nicht der Anlage sind und ob der Lastgang zu diesem Standort gehört.',
  ),
  'record.moreKvarhThanKwh': said(
    'Der Lastgang hat mehr induktive kvarh als kWh, {laggingKvarh} gegen {activeKwh}.',
    'Prüfen, ob die Spalten für kW und kvar vertauscht sind; wenige Standorte nehmen insgesamt so viel auf.',
  ),
  'loads.aboveRecord': said(
    'Die aufgeführten Oberschwingungserzeuger nehmen zusammen {listedKva} auf, mehr, als der Lastgang je zeigt, {loadKva}.',
    'Prüfen, ob der Lastgang zu diesem Standort gehört und in der richtigen Einheit steht und ob die aufgeführten Ströme gemeinsam fließen.',
  ),
  'currentTransformer.unusual': said(
    'Der Stromwandler des Reglers ist für {ratioPrimaryA} bemessen; die größte Last, {loadA}, ist {loadPct} davon.',
    'Die Übersetzung noch einmal ablesen; die kvar des Reglers folgen daraus.',
  ),
};
