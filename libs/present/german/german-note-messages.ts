import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `note-messages` in German, under the same codes. */
export const GERMAN_NOTE_MESSAGES: Readonly<Record<string, Translation>> = {
  'file-read-as': said(
    'Die Datei wurde als {format} gelesen: {columns}.',
    'Prüfen, ob jede Spalte ist, was sie heißt.',
  ),
  'encoding-converted': said('Die Zeichen der Datei wurden aus {encoding} umgewandelt.'),
  'rows-before-header': said('{rows:Zeile steht|Zeilen stehen} vor der Kopfzeile und wurden ausgelassen.'),
  'header-repeated': said('Die Kopfzeile ist in {rows:Zeile|Zeilen} wiederholt, die ausgelassen wurden.'),
  'text-rows-left-out': said(
    '{rows:Textzeile wurde|Textzeilen wurden} zwischen den Daten ausgelassen, die erste in Zeile {first}.',
  ),
  'total-rows-left-out': said('{rows:Summenzeile wurde|Summenzeilen wurden} ausgelassen.'),
  'decimal-mark-settled': said('Das Dezimalzeichen ist „{mark}“; jede andere Lesart scheitert.'),
  'thousands-divided': said('{numbers:Zahl hat|Zahlen haben} ein Zeichen zwischen den Tausendern.'),
  'date-order-settled': said('Datumsangaben stehen in der Folge {order}; jede andere Lesart scheitert.'),
  'serial-dates': said(
    'Die Zeitstempel sind fortlaufende Datumszahlen einer Tabellenkalkulation, ab 1900 gezählt und auf die Sekunde gerundet.',
  ),
  'intervals-counted': said('{column} zählt die Intervalle eines Tages: {perDay} von Mitternacht bis Mitternacht.'),
  'rows-newest-first': said('Die neuesten Zeilen stehen zuerst; {rows:Zeile wurde|Zeilen wurden} umgekehrt.'),
  'rows-put-in-order': said(
    '{rows:Zeile stand|Zeilen standen} außer der Reihe und wurden eingeordnet.',
    'Fragen, wie die Datei entstanden ist.',
  ),
  'duplicates-dropped': said(
    '{rows:gleiche Wiederholung wurde|gleiche Wiederholungen wurden} verworfen.',
    'Dadurch geht nichts verloren.',
  ),
  'conflicting-rows-settled': said(
    '{rows:Zeile wiederholt|Zeilen wiederholen} ein Intervall mit einem anderen Wert; der {kept} wurde behalten, wie verlangt.',
    'Fragen, welcher davon abgerechnet wurde.',
  ),
  'intervals-without-value': said(
    '{intervals:Intervall hat|Intervalle haben} keinen Wert und wurden ausgelassen.',
    'Fehlend ist nicht null; die Ursache feststellen.',
  ),
  'values-estimated': said(
    '{rows:Zeile ist|Zeilen sind} als geschätzt oder ersetzt gekennzeichnet; sie wurden behalten.',
    'Sie sind nicht gemessen.',
  ),
  'values-flagged-missing': said(
    '{rows:Zeile ist|Zeilen sind} als fehlend oder ungültig gekennzeichnet und wurden ausgelassen.',
    'Fehlend ist nicht null; die Ursache feststellen.',
  ),
  'fillers-left-out': said(
    '{values:Zahl|Zahlen} wie {value} in {columns} stehen für fehlende Werte und wurden ausgelassen: unter null, wo sonst nichts unter null ist, und über dem Dreifachen von allem anderen.',
    'Fehlend ist nicht null; die Ursache feststellen. Sind es Werte, dies in der Zuordnung angeben (fillers).',
  ),
  'qualities-unknown': said(
    '{rows:Zeile ist|Zeilen sind} mit {codes} gekennzeichnet, was nicht verstanden wird; die Werte wurden behalten.',
    'Fragen, was es bedeutet, und es in der Zuordnung angeben.',
  ),
  'quality-not-read': said(
    'Als Status bezeichnete Spalten enthalten Zahlen, die nicht verstanden und übergangen wurden: {columns}.',
    'Prüfen, ob sie Werte kennzeichnen, die nicht zählen dürfen.',
  ),
  'days-in-columns': said('Die Datei hat eine Zeile je Tag; die Intervalle eines Tages stehen in {columns} Spalten.'),
  'meter-chosen': said(
    'Zähler {meter} wurde gelesen, wie verlangt; {others:anderer Zähler wurde|andere Zähler wurden} ausgelassen.',
  ),
  'zone-assumed-utc': said(
    'Keine Zeitzone wurde angegeben, daher gelten die Zeitstempel als UTC.',
    'Die Zeitzone angeben: Tage und Monate hängen davon ab.',
  ),
  'zone-from-header': said('Die Kopfzeile nennt die Zeitzone {zone}.'),
  'stamps-assumed-beginnings': said(
    'Nichts sagt, ob ein Zeitstempel Beginn oder Ende seines Intervalls bezeichnet; der Beginn wurde angenommen.',
    'Nachfragen; die andere Lesart verschiebt jeden Monat um ein Intervall.',
  ),
  'stamps-mark-ends': said('Die Zeitstempel bezeichnen das Ende ihres Intervalls: {because}.'),
  'midnight-under-ending-day': said('Mitternacht ist in {rows:Zeile|Zeilen} unter dem endenden Tag geschrieben.'),
  'doubled-hour-by-order': said(
    '{rows:Zeile|Zeilen} der doppelten Herbststunde wurden nach ihrer Reihenfolge unterschieden.',
  ),
  'doubled-hour-once': said(
    'Die doppelte Herbststunde steht nur einmal in der Datei, in {rows:Zeile|Zeilen}; ihr erster Durchgang wurde angenommen.',
    'Dort fehlt eine Stunde.',
  ),
  'skipped-hour-left-out': said(
    '{rows:Zeile steht|Zeilen stehen} in der Stunde, die im Frühjahr ausfällt, und wurden ausgelassen.',
    'Fragen, ob die Uhr des Zählers der Sommerzeit folgt.',
  ),
  'unit-read-as-mega': said(
    'Ein kleines m wurde als Mega, nicht Milli, gelesen in: {columns}.',
    'Prüfen, ob die Werte die richtige Größe haben.',
  ),
  'reactive-in-kilowatt': said(
    'Blindspalten sind in kW oder kWh bezeichnet und wurden als kvar oder kvarh gelesen: {columns}.',
    'Prüfen, ob sie Blindwerte sind.',
  ),
  'leading-not-recorded': said(
    'Die Datei hat keine kapazitiven kvar; sie gelten als null.',
    'Eine Überkompensation im Lastgang wäre nicht zu sehen.',
  ),
  'leading-left-out': said(
    'Kapazitive kvar stehen in der Datei in einer Form, die nicht gemeinsam mit dem Rest gelesen werden kann, und wurden ausgelassen: {channels}.',
    'Eine Überkompensation im Lastgang wäre nicht zu sehen. In Intervallen gleicher Länge anfordern.',
  ),
  'reactive-sign-taken': said(
    'Induktive kvar wurden als {lagging} gelesen; {negative:Wert ist|Werte sind} negativ.',
    'Prüfen, ob das Vorzeichen so ist.',
  ),
  'reactive-never-leading': said(
    'Die Blindspalte ist nirgends negativ; alles wurde als induktiv gelesen. Hat sie kein Vorzeichen, ist Überkompensation nicht zu sehen.',
    'Fragen, ob der Zähler das Vorzeichen der kvar schreibt.',
  ),
  'reactive-unsigned': said(
    'Die Datei gibt kvar nur als Betrag ohne Vorzeichen an; alles wurde als induktiv gelesen, und Überkompensation ist nicht zu sehen.',
    'kvar mit Vorzeichen anfordern, oder induktiv und kapazitiv getrennt.',
  ),
  'powers-worked-out': said(
    'Wirk- oder Blindleistung wurde berechnet aus {columns}.',
    'Nahe einem Leistungsfaktor von 1 werden kleine Fehler dieser Spalten zu großen Fehlern der kvar.',
  ),
  'power-factor-in-percent': said('Der Leistungsfaktor ist in Prozent geschrieben und wurde durch 100 geteilt.'),
  'power-factor-sign-taken': said(
    'Das Vorzeichen des Leistungsfaktors wurde gelesen als: {sign}.',
    'Prüfen, ob es so ist.',
  ),
  'power-factor-by-words': said(
    'Ob ein Leistungsfaktor induktiv oder kapazitiv ist, wurde aus den Wörtern daneben gelesen: {columns}.',
  ),
  'extremes-taken': said(
    'Dem Namen nach ist {columns} ein Höchst- oder Kleinstwert; es wurde als Mittel des Intervalls gelesen.',
    'Prüfen, ob es eines ist.',
  ),
  'phases-added': said('Spalten der drei Leiter wurden addiert: {columns}.'),
  'registers-differenced': said(
    'Spalten enthalten Zählerstände; die Energie eines Intervalls ist die Differenz zweier Stände: {columns}.',
  ),
  'voltage-to-line-to-line': said(
    'Die Spannung ({column}) ist Leiter gegen Neutralleiter; sie wurde mit √3 multipliziert.',
  ),
  'export-subtracted': said('Abgegebene Leistung ({column}) wurde von der bezogenen abgezogen.'),
  'voltage-taken-line-to-line': said(
    'Die Spannung ({column}) wurde als Leiter gegen Leiter gelesen.',
    'Prüfen, ob sie diese Größe hat.',
  ),
  'intervals-repaired': said(
    '{intervals:Intervall wurde|Intervalle wurden} ergänzt durch {method}, wie verlangt.',
    'Sie sind nicht gemessen.',
  ),
};
