import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `estimate-messages` in German, under the same codes. */
export const GERMAN_ESTIMATE_MESSAGES: Readonly<Record<string, Translation>> = {
  'estimate.basis': said(
    'Dies ist eine Schätzung, Grundlage: {basis}, kein Zählerlastgang: Der Bedarf innerhalb eines Tages ist nicht bekannt.',
    'Die Last mindestens vier Wochen lang aufzeichnen, bevor die Anlage bestellt wird.',
  ),
  'estimate.noNeed': said(
    'Nach der Schätzung hält der Standort {targetPowerFactor} bereits.',
    'Ein Lastgang kann einen Bedarf zeigen, den die Schätzung nicht zeigt.',
  ),
  'estimate.coversUpper': said(
    'Nach den Rechnungen liegt der Bedarf zwischen {lowerKvar} und {upperKvar}; die {effectiveKvar} der Anlage erreichen die Obergrenze.',
    'Die Obergrenze setzt den Leistungsfaktor des Monats bei seiner größten Leistung voraus.',
  ),
  'estimate.betweenBounds': said(
    'Nach den Rechnungen liegt der Bedarf zwischen {lowerKvar} und {upperKvar}; die {effectiveKvar} der Anlage liegen dazwischen, daher bleibt offen, ob sie {targetPowerFactor} hält.',
    'Die Last aufzeichnen oder eine Anlage nach der Obergrenze zulassen.',
  ),
  'estimate.belowLower': said(
    'Die {effectiveKvar} der Anlage sind weniger als {lowerKvar}, das Mindeste, was {targetPowerFactor} im schlechtesten Monat der Rechnungen halten könnte.',
    'Eine größere Anlage zulassen oder die zu niedrigen Monate annehmen.',
  ),
  'estimate.coversList': said(
    'Die Verbraucherliste ergibt einen Bedarf von {sizedKvar}; die {effectiveKvar} der Anlage decken ihn.',
    'Die Liste gegen eine Rechnung oder Messung prüfen.',
  ),
  'estimate.belowList': said(
    'Die Verbraucherliste ergibt einen Bedarf von {sizedKvar} für {targetPowerFactor}, mehr als die {effectiveKvar} der Anlage.',
    'Eine größere Anlage zulassen oder die Liste gegen eine Rechnung prüfen.',
  ),
  'estimate.needOutOfReach': said(
    'Keine Anlage des Katalogs gibt den geschätzten Bedarf innerhalb der Grenzwerte; die größte, die sie einhält, wird vorgeschlagen.',
    'Mehr Stufen, größere Stufen oder mehr kvar zulassen.',
  ),
  'estimate.kwDisagree': said(
    'Im {month} ist die größte Leistung der Rechnung {billedKw}, und die Verbraucherliste ergibt {listedKw}: Sie weichen um mehr als 25 % voneinander ab.',
    'Nach ausgelassenen oder doppelten Lasten suchen und Lastgrade und Gleichzeitigkeit prüfen.',
  ),
  'estimate.kvarDisagree': said(
    'Im {month} liegt die Blindleistung bei der Spitze nach der Rechnung bei {billedKvar}, und die Verbraucherliste ergibt {listedKvar}: Sie weichen um mehr als 25 % voneinander ab.',
    'Die Leistungsfaktoren der Liste prüfen und nach Kondensatoren suchen, die schon in Betrieb sind.',
  ),
  'estimate.fewMonths': said(
    'Die Rechnungen umfassen {months:Monat|Monate}, weniger als ein Jahr.',
    'Monate ohne Rechnung sind nicht abgedeckt.',
  ),
  'estimate.recordedBankUnknown': said(
    'Ob in den Monaten der Rechnungen eine Anlage in Betrieb war, ist unbekannt, daher sind die kvar der Last selbst nicht bekannt.',
    'Es feststellen und als Anlage der Aufzeichnung angeben.',
  ),
  'estimate.noDuration': said(
    'Wie lange der Bedarf dauert, seine Perzentile und wie oft der Zielwert verfehlt wird, ist nicht angegeben.',
    'Die Last aufzeichnen.',
  ),
  'estimate.noReplay': said(
    'Kein Tag wird nachgespielt und kein Intervall gezeigt: Es gibt keine.',
    'Die Last aufzeichnen.',
  ),
  'estimate.noLeading': said(
    'Kapazitive kvar und Überkompensation bei Schwachlast werden nicht betrachtet.',
    'Die Last aufzeichnen.',
  ),
  'estimate.noSwitchings': said(
    'Schaltungen, Stunden in jedem Schaltzustand und die Abnutzung der Stufen werden nicht gezählt.',
    'Die Last aufzeichnen.',
  ),
  'estimate.noSetPoint': said(
    'Der Sollwert wird nicht gesucht: Der Regler regelt auf den Zielwert oder wie vom Standort angegeben.',
    'Die Last aufzeichnen.',
  ),
  'estimate.noBillsByClause': said(
    'Keine Rechnung wird gebildet: Mehr als die Summen eines Monats verlangen {clauses}.',
    'Die Last aufzeichnen.',
  ),
  'estimate.noBillsByMonths': said(
    'Keine Rechnung wird gebildet: Sie braucht Rechnungen aufeinanderfolgender Monate, jeder lang genug für seine größte Leistung.',
    'Die Last aufzeichnen.',
  ),
  'estimate.noSaving': said(
    'Ersparnis im Jahr, Kosten, Barwert und eine Wahl danach werden nicht angegeben.',
    'Die Last aufzeichnen.',
  ),
  'estimate.recordWins': said(
    'Rechnungen und Verbraucherliste des Standorts werden nicht verwendet: Der Zählerlastgang gilt.',
    'Den Lastgang weglassen, um die Schätzung zu sehen.',
  ),
  'estimate.labelled': said(
    'Jeder Wert der Last ist eine Schätzung, Grundlage: {basis}.',
    'Ein Zählerlastgang klärt es.',
  ),
  'estimate.calendarMonths': said(
    'Jede Rechnung umfasst ihren Kalendermonat nach der Uhr von {timeZone}.',
    'Die Daten auf den Rechnungen lesen; ein längerer Zeitraum verringert die mittlere Last.',
  ),
  'estimate.peakFactor': said(
    'Für die Obergrenze hat die größte Leistung jedes Monats den Leistungsfaktor des ganzen Monats.',
    'kW und kvar zur Zeit der größten Leistung ablesen.',
  ),
  'estimate.atMeter': said(
    'Die Grenzen sind kvar am Zähler, auf der Primärseite des Transformators; dahinter gibt eine Anlage etwas mehr als ihre eigenen.',
    'Das ungünstige Ende; nichts zu klären.',
  ),
  'estimate.partLoad': said(
    'Wirkungsgrad und Leistungsfaktor jedes Eintrags gelten bei seinem Lastgrad; ein Motor in Teillast hat niedrigere als sein Leistungsschild.',
    'Beide dem Datenblatt bei der tatsächlichen Last entnehmen.',
  ),
  'estimate.fullLoad': said(
    'Für {entries:Eintrag|Einträge} der Liste ohne Lastgrad ist Volllast angenommen.',
    'Den Lastgrad angeben, mit Wirkungsgrad und Leistungsfaktor bei dieser Last.',
  ),
  'estimate.together': said(
    'Für {entries:Eintrag|Einträge} ohne Gleichzeitigkeit läuft alles zur Zeit der größten Leistung.',
    'Fragen, was gemeinsam läuft.',
  ),
  'estimate.loadCurrent': said(
    'Ohne Lastgang ist der Laststrom als der der Oberschwingungserzeuger allein angesetzt, {loadA}.',
    'Das ungünstige Ende für die Verzerrung des Stroms.',
  ),
  'estimate.recordedBank': said(
    'In den Monaten der Rechnungen war keine Anlage in Betrieb.',
    'Am Standort nachfragen; mit einer alten Anlage sind die kvar der Last selbst größer.',
  ),
  'estimate.dampingKw': said(
    'Die eine Resonanz dämpfende Last ist mit {value} angesetzt, da es keinen Lastgang gibt.',
    'Das ungünstige Ende; kleinste und größte Last angeben, um es zu mildern.',
  ),
  'estimate.billsAfter': said(
    'Für die Rechnungen mit Anlage sinken die kvarh jedes Monats auf die des Zielwerts, um nicht mehr, als die Anlage geben kann.',
    'Ein Lastgang zeigt, was der Regler übrig lässt.',
  ),
  'estimate.notUsed': said(
    'Angegeben und nicht verwendet: {name}.',
    'Es braucht Schaltungen und Stunden, die nur ein Lastgang ergibt.',
  ),
  'caution.estimate': said(
    'Dieser Plan beruht auf Rechnungen oder einer Verbraucherliste, nicht auf einem Lastgang. Nicht danach bestellen oder bauen, bevor die Last aufgezeichnet und neu geplant ist.',
  ),
};
