import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `note-messages` in German, under the same codes. */
export const GERMAN_CHANNEL_NOTE_MESSAGES: Readonly<Record<string, Translation>> = {
  'quadrants-added': said(
    'Blindarbeit der Quadranten I und II wurde als induktiv addiert, die von III und IV als kapazitiv; abgegebene Energie wurde abgezogen.',
  ),
  'channels-added': said('Die Kanäle {channels} wurden addiert als {quantity}.'),
  'channels-left-out': said(
    'Die Kanäle {channels} sagen dasselbe auf andere Weise oder nichts, was ein Lastgang braucht, und wurden ausgelassen.',
  ),
  'meters-left-out': said(
    'Andere Zähler der Datei ergeben für sich keinen Lastgang und wurden ausgelassen: {meters}.',
    'Prüfen, ob der richtige gelesen wurde.',
  ),
  'values-substituted': said(
    '{values:Wert ist|Werte sind} geschätzt, ersetzt oder vorläufig, wie die Datei selbst sagt.',
    'Sie sind nicht gemessen.',
  ),
  'values-unusable': said(
    '{values:Wert ist|Werte sind} als unbrauchbar gekennzeichnet und wurden ausgelassen.',
    'Fehlend ist nicht null; die Ursache feststellen.',
  ),
  'values-multiplied': said('Alle Energien und Leistungen wurden mit {multiplier} multipliziert, wie verlangt.'),
  'status-words': said(
    'Der Zähler hat für {intervals:Intervall|Intervalle} ein Statuswort gesetzt.',
    'Fragen, was es bedeutet: Netzausfall, gestellte Uhr oder Fehler.',
  ),
  'partial-intervals-left-out': said(
    '{intervals:Intervall wurde|Intervalle wurden} durch ein Ereignis des Zählers verkürzt und ausgelassen.',
    'Ein Netzausfall oder eine gestellte Uhr erklärt es.',
  ),
  'interval-ends-by-format': said('Das Format stempelt das Ende jedes Intervalls.'),
  'register-fell': said(
    'Ein Zählwerk fiel bei {readings:Ablesung|Ablesungen}; die Energie dieser Intervalle ist nicht bekannt.',
    'Fragen, ob der Zähler zurückgesetzt, getauscht wurde oder übergelaufen ist.',
  ),
  'register-readings-missing': said(
    'Zählerstände fehlen vor {readings:Ablesung|Ablesungen}; die Energie dazwischen wurde ausgelassen.',
    'Sie gehört zu keinem einzelnen Intervall.',
  ),
  'sheet-read': said('Der Lastgang steht im Tabellenblatt {sheet}, einem von {sheets}.'),
  'sheets-hidden': said('Die Arbeitsmappe verbirgt: {sheets}.', 'Prüfen, ob das gelesene Blatt das gemeinte ist.'),
  'parquet-columns-left-out': said('Spalten mit Listen oder mit Typen ohne Messwert wurden ausgelassen: {columns}.'),
  'readings-questionable': said(
    '{readings:Messwert ist|Messwerte sind} als fraglich gekennzeichnet oder haben eine Prüfung nicht bestanden.',
    'Sie wurden übernommen, wie sie sind.',
  ),
  'samples-taken-as-means': said(
    'Augenblickswerte wurden als Mittel ihres Intervalls genommen: {channels}.',
    'Kurze Spitzen und Senken können fehlen oder übertrieben sein.',
  ),
  'total-flow-taken': said(
    'Die Datei summiert beide Energierichtungen: {channels}. Alles wurde als bezogen genommen.',
    'Wo der Standort einspeist, ist das zu viel.',
  ),
  'secondary-metered': said(
    'Die Datei kennzeichnet {channels} als zählereigene, sekundäre Werte.',
    'Fragen, ob die Wandlerübersetzungen darin enthalten sind.',
  ),
  'xml-encoding-misdeclared': said('Die Datei sagt, sie sei in {declared}, und ist in {taken}.'),
  'espi-joined-by-order': said(
    '{entries:Eintrag hat|Einträge haben} keine Verknüpfung und wurden nach ihrer Reihenfolge verbunden.',
    'Prüfen, ob jeder Kanal ist, was er heißt.',
  ),
  'record-extended': said(
    'Der Lastgang wurde um {added:Intervall|Intervalle} einer weiteren Datei verlängert; {agreed:Intervall stand|Intervalle standen} gleich in beiden.',
  ),
  'overlap-settled': said(
    'Der Lastgang und die weitere Datei widersprechen sich in {intervals:Intervall|Intervallen}; der {kept} der beiden wurde behalten, wie verlangt.',
    'Fragen, welcher davon abgerechnet wurde.',
  ),
  'column-left-out': said(
    'Die Spalte {column} wurde ausgelassen: Nur ein Teil des verlängerten Lastgangs hat sie.',
    'Mit einer Datei verlängern, die sie hat.',
  ),
  'kept-answers-used': said(
    'Die Datei wurde mit den unter „{name}“, Version {version}, aufbewahrten Antworten gelesen.',
  ),
  'nem12-time': said('NEM12 führt das ganze Jahr eine eigene Zeit, UTC{zone}.'),
  'nem12-header-missing': said('Der Kopfsatz von NEM12 fehlt.', 'Die Datei kann abgeschnitten sein.'),
  'nem12-end-missing': said('Der Endsatz von NEM12 fehlt.', 'Die Datei kann abgeschnitten sein.'),
  'nem12-streams-added': said('Die Reihen {streams} wurden addiert als {quantity}.'),
  'nem12-streams-left-out': said('Die Reihen {streams} sind keine Energie und wurden ausgelassen.'),
  'nem12-substituted': said(
    '{values:Wert ist|Werte sind} vom Betreiber des Zählers ersetzt oder geschätzt.',
    'Sie sind nicht gemessen.',
  ),
  'nem12-null': said(
    '{values:Wert ist|Werte sind} als leer gekennzeichnet und wurden ausgelassen.',
    'Fehlend ist nicht null.',
  ),
  'nem12-quality-unstated': said(
    '{values:Wert trägt|Werte tragen} keine Angabe zur Qualität.',
    'Sie gelten als gemessen.',
  ),
};
