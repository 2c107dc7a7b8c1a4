import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `record-messages` in German, under the same codes. */
export const GERMAN_RECORD_MESSAGES: Readonly<Record<string, Translation>> = {
  'sign.stepKw': said(
    'Der Lastgang springt ({of}) am {date} von {beforeKw} auf {afterKw} und bleibt dort.',
    'Fragen, ob an diesem Tag Betriebsmittel hinzukamen oder wegfielen oder der Faktor des Zählers geändert wurde; war es der Faktor, eine Seite vor dem Planen berichtigen.',
  ),
  'sign.stepKvar': said(
    'Die mittleren kvar springen am {date} von {beforeKvar} auf {afterKvar}, ohne gleichen Sprung der kW.',
    'Fragen, ob an diesem Tag eine Kondensatoranlage ein- oder ausgebaut wurde oder ausfiel, und sie als Anlage der Aufzeichnung angeben.',
  ),
  'sign.phaseLost': said(
    'Ab {date} fallen kW auf {kwPct} und kvar auf {kvarPct} des Vorherigen, Grundlast und Spitze gleichermaßen: So sehen zwei von drei Leitern aus.',
    'Fragen, ob dem Zähler an diesem Tag Spannung oder Strom eines Leiters verloren ging; der Lastgang wäre ab da um ein Drittel zu niedrig.',
  ),
  'sign.phaseLostUntil': said(
    'Bis {date} sind kW {kwPct} und kvar {kvarPct} der späteren, Grundlast und Spitze gleichermaßen: So sehen zwei von drei Leitern aus.',
    'Fragen, ob dem Zähler bis zu diesem Tag Spannung oder Strom eines Leiters fehlte; der Lastgang davor wäre um ein Drittel zu niedrig.',
  ),
  'sign.phaseTurned': said(
    'Ab {date} fallen kW auf {kwPct} und kvar auf {kvarPct} des Vorherigen, Grundlast und Spitze gleichermaßen: So sieht ein verdrehter Stromwandler aus.',
    'Fragen, ob ein Stromwandler verkehrt wieder eingebaut wurde; der Lastgang zeigte ab da ein Drittel der Last.',
  ),
  'sign.phaseTurnedUntil': said(
    'Bis {date} sind kW {kwPct} und kvar {kvarPct} der späteren, Grundlast und Spitze gleichermaßen: So sieht ein verdrehter Stromwandler aus.',
    'Fragen, ob ein Stromwandler bis zu diesem Tag verkehrt eingebaut war; der Lastgang davor zeigte ein Drittel der Last.',
  ),
  'sign.voltageLost': said(
    'Die Spannung fällt am {date} von {usualV} auf {foundV}, für {hours:Stunde|Stunden}: So sieht das Mittel aus dreien aus, von denen eine fehlt.',
    'Fragen, ob eine Spannungssicherung des Zählers offen war; kW und kvar dieser Zeit wären zu niedrig.',
  ),
  'sign.leadsAtNight': said(
    'Die kvar sind in {nightsPct} der Nächte kapazitiv, in der Regel {nightKvar}, und am Tag induktiv, in der Regel {dayKvar}.',
    'Fragen, ob eine feste Anlage, lange Kabel oder Filter nachts zugeschaltet bleiben; gibt es keine, ist das Vorzeichen der nächtlichen kvar falsch.',
  ),
  'sign.leadsByDay': said(
    'Die kvar sind an {daysPct} der Arbeitstage kapazitiv, in der Regel {dayKvar} bei {dayKw}, und mehr als nachts.',
    'Fragen, ob der Zähler induktiv negativ zählt oder eine Anlage überkompensiert; wenn ja, die Datei mit dem anderen Vorzeichen lesen.',
  ),
  'sign.dayLater': said(
    'Bei der Zeitumstellung am {date} rückt der Arbeitstag gegen die Uhr eine Stunde später ({shifted} von {changes:Umstellung|Umstellungen} des Lastgangs).',
    'Fragen, ob die Zeitstempel der Sommerzeit folgen und in der angegebenen Zeitzone stehen; Monate, Zeitfenster und Tarifstunden hängen davon ab.',
  ),
  'sign.dayEarlier': said(
    'Bei der Zeitumstellung am {date} rückt der Arbeitstag gegen die Uhr eine Stunde früher ({shifted} von {changes:Umstellung|Umstellungen} des Lastgangs).',
    'Fragen, ob die Zeitstempel der Sommerzeit folgen und in der angegebenen Zeitzone stehen; Monate, Zeitfenster und Tarifstunden hängen davon ab.',
  ),
  'sign.still': said(
    '{register}: ein und derselbe Wert für {hours:Stunde|Stunden} ab {date}[, der längste von {runs:solchen Abschnitt|solchen Abschnitten}].',
    'Fragen, ob das Zählwerk stand oder eine Lücke gefüllt wurde; solche Werte sind nicht gemessen.',
  ),
  'sign.zeros': said(
    '{register}: genau 0 für {hours:Stunde|Stunden} ab {date}, länger als in diesem Lastgang üblich[; der längste von {runs:solchen Abschnitt|solchen Abschnitten}].',
    'Fragen, ob der Standort stillstand oder der Zähler aus war; fehlend ist nicht null.',
  ),
  'grade.full': said(
    '{days:Tag ist|Tage sind} gemessen, {missingPct} des Lastgangs fehlen oder sind ergänzt; „vollständig“ verlangt {leastDays} und erlaubt {mostMissingPct}.',
  ),
  'grade.days': said('{days:Tag ist|Tage sind} gemessen; „{grade}“ verlangt {leastDays}.'),
  'grade.missing': said('{missingPct} des Lastgangs fehlen oder sind ergänzt; „{grade}“ erlaubt {mostMissingPct}.'),
  'grade.daysAndMissing': said(
    '{days:Tag ist|Tage sind} gemessen und {missingPct} des Lastgangs fehlen oder sind ergänzt; „{grade}“ verlangt {leastDays} und erlaubt {mostMissingPct}.',
  ),
  'record.insufficient': said(
    'Der Lastgang reicht nicht aus, um eine Anlage darauf zu empfehlen: {days:Tag ist|Tage sind} gemessen[, mindestens {leastDays} sind nötig][; {missingPct} fehlen oder sind ergänzt, höchstens {mostMissingPct} sind zulässig].',
    'Als Skizze nehmen und mit einem längeren oder volleren Lastgang neu planen.',
  ),
  'record.aboveRating': said(
    'Die Spitze des Lastgangs, {maxKva}, ist {ratedPct} der Transformatorleistung, {ratedKva}[; ein Faktor {factor} zu viel würde es erklären].',
    'Fragen, ob Energien eines Intervalls als Leistung genommen oder ein Faktor doppelt gezählt wurde, und die Bemessung prüfen.',
  ),
  'record.farBelowRating': said(
    'Die Spitze des Lastgangs, {maxKva}, ist {ratedPct} der Transformatorleistung, {ratedKva}[; ein Faktor {factor} zu wenig würde es erklären].',
    'Nach dem Faktor der Messwandler fragen und ob dieser Zähler den ganzen Standort erfasst.',
  ),
};
