import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `reason-messages` in German, under the same codes. */
export const GERMAN_REASON_MESSAGES: Readonly<Record<string, Translation>> = {
  'verdict.avoid': said(
    'Die Anlage liegt über einem Grenzwert.',
    'Anlage oder Netz ändern, bis jeder Grenzwert eingehalten ist.',
  ),
  'verdict.watch': said('Die Anlage liegt nahe einem Grenzwert.', 'Den Abstand annehmen oder die Anlage ändern.'),
  'limit.notJudged': said(
    '{rows:Prüfung ist|Prüfungen sind} nicht beurteilt: {duties}.',
    'Den fehlenden Grenzwert oder die fehlenden Lasten angeben oder von Hand beurteilen.',
  ),
  'limit.exceeded': said(
    'Über dem Grenzwert: {duty}[, Gruppe {group}][, Ordnung {orderH}][, {capacitors}][, an {bus}], {value} gegen {limit}[, bei {levelKvar} zugeschaltet][, Kurzschlussleistung {faultLevelMva}][, dämpfende Last {dampingKw}][, {standing}][, Netzkondensatoren bei {networkCapacitanceFactor} ihrer Kapazität].',
    'Anlage oder Netz ändern, bis der Grenzwert eingehalten ist.',
    '{duty}[, Gruppe {group}][, Ordnung {orderH}][, {capacitors}][, an {bus}][, bei {levelKvar} zugeschaltet][, Kurzschlussleistung {faultLevelMva}][, dämpfende Last {dampingKw}][, {standing}][, Netzkondensatoren bei {networkCapacitanceFactor} ihrer Kapazität]',
  ),
  'limit.near': said(
    'Nahe am Grenzwert: {duty}[, Gruppe {group}][, Ordnung {orderH}][, {capacitors}][, an {bus}], {value} gegen {limit}[, bei {levelKvar} zugeschaltet][, Kurzschlussleistung {faultLevelMva}][, dämpfende Last {dampingKw}][, {standing}][, Netzkondensatoren bei {networkCapacitanceFactor} ihrer Kapazität].',
    'Den Abstand annehmen oder die Anlage ändern.',
    '{duty}[, Gruppe {group}][, Ordnung {orderH}][, {capacitors}][, an {bus}][, bei {levelKvar} zugeschaltet][, Kurzschlussleistung {faultLevelMva}][, dämpfende Last {dampingKw}][, {standing}][, Netzkondensatoren bei {networkCapacitanceFactor} ihrer Kapazität]',
  ),
  'limit.exceededAlready': said(
    'Schon ohne Anlage überschritten: {duty}[, Gruppe {group}][, Ordnung {orderH}][, {capacitors}][, an {bus}], {value} gegen {limit}[, bei {levelKvar} zugeschaltet][, Kurzschlussleistung {faultLevelMva}][, dämpfende Last {dampingKw}][, {standing}][, Netzkondensatoren bei {networkCapacitanceFactor} ihrer Kapazität]; die Anlage trägt wenig dazu bei.',
    'Die Verzerrung an ihren Quellen beheben; die Anlage behebt sie nicht.',
    '{duty}[, Gruppe {group}][, Ordnung {orderH}][, {capacitors}][, an {bus}][, bei {levelKvar} zugeschaltet][, Kurzschlussleistung {faultLevelMva}][, dämpfende Last {dampingKw}][, {standing}][, Netzkondensatoren bei {networkCapacitanceFactor} ihrer Kapazität]. Schon ohne Anlage überschritten.',
  ),
  'inrush.assumedInductance': said(
    'Über dem Grenzwert bei angenommener Induktivität zwischen den Stufen: {duty}[, Gruppe {group}][, Ordnung {orderH}][, {capacitors}][, an {bus}], {value} gegen {limit}.',
    'Die Induktivität zwischen den Stufen angeben oder Drosseln oder ein einschaltstrombegrenzendes Schaltgerät vorsehen.',
    '{duty}[, Gruppe {group}][, Ordnung {orderH}][, {capacitors}][, an {bus}][, bei {levelKvar} zugeschaltet][, Kurzschlussleistung {faultLevelMva}][, dämpfende Last {dampingKw}][, {standing}][, Netzkondensatoren bei {networkCapacitanceFactor} ihrer Kapazität]. Die Induktivität zwischen den Stufen ist angenommen.',
  ),
  'peak.near': said(
    'Mit {levelKvar} zugeschaltet liegt die Parallelresonanz des Netzes bei Ordnung {peakOrderH}, innerhalb von {reachH} der vorhandenen Ordnung {presentOrderH}[, gesehen an {bus}][, Kurzschlussleistung {faultLevelMva}][, dämpfende Last {dampingKw}][, {standing}].',
    'Die Verzerrung in diesem Schaltzustand messen, bevor er lange benutzt wird, oder die Resonanz verschieben.',
  ),
  'plain.distortingShare': said(
    'Oberschwingungserzeuger machen {sharePct} der Transformatorleistung aus, mehr als neben unverdrosselten Stufen üblich.',
    'Dieselbe Anlage verdrosselt vergleichen.',
  ),
  'ripple.absorbed': said(
    'Die Anlage lässt {leftPct} des Rundsteuersignals bei {rippleHz} übrig, bei {levelKvar} zugeschaltet: weniger als üblich.',
    'Den Netzbetreiber fragen, was übrig bleiben muss, oder einen anderen Verdrosselungsgrad wählen.',
  ),
  'network.unknownLoads': said(
    'Die Oberschwingungserzeuger sind unbekannt, daher ist das Netz nicht beurteilt.',
    'Sie aufführen oder mit einer leeren Liste erklären, dass es keine gibt.',
  ),
  'network.unknownBackground': said(
    'Die Verzerrung des Netzes ist unbekannt, daher ist das Netz nicht beurteilt.',
    'Beim Netzbetreiber erfragen oder mit einer leeren Liste erklären, dass es keine gibt.',
  ),
  'supply.weakerThanLoad': said(
    'Die größte Last des Lastgangs, {loadKva}, ist größer als die kleinste Kurzschlussleistung an der Anlage, {shortCircuitMinMva}: Ein solches Netz könnte sie nicht tragen, daher besagt das aus der Kurzschlussleistung Berechnete wenig.',
    'Beim Netzbetreiber die Kurzschlussleistung erneut erfragen und auf die Einheit der Angabe achten.',
  ),
  'recordedBank.unknown': said(
    'Ob während der Aufzeichnung eine Anlage in Betrieb war, ist unbekannt, daher sind die kvar der Last selbst nicht bekannt.',
    'Es feststellen und als Anlage der Aufzeichnung angeben.',
  ),
  'recordedBank.turnedBack': said(
    'Der Lastgang wurde mit einer schaltenden Anlage aufgezeichnet. Ihre Abgabe ist in {certainPct} der Intervalle sicher; nach dem, was ihr Regler in den übrigen getan haben kann, liegt der größte Bedarf zwischen {maxNeedLowKvar} und {maxNeedHighKvar}.',
    'Zum Eingrenzen die Stufen der Anlage eine Woche lang neben dem Zähler aufzeichnen oder den Leistungsfaktor der Last selbst angeben.',
  ),
  'recordedBank.rangeDivides': said(
    'Ob der Zielwert {targetPowerFactor} erreicht wird, hängt davon ab, was die alte Anlage abgab: Er wird nur am {metAt} Ende des Bereichs erreicht.',
    'Vor der Bestellung einen Lastgang bei abgeschalteter oder mitgeschriebener alter Anlage aufnehmen.',
  ),
  'recordedBank.unexplained': said(
    'In {unexplained:Intervall|Intervallen} von {intervals} zeigt der Lastgang, was die alte Anlage mit ihrem Leistungsschild und ihren Einstellungen nicht übrig gelassen hätte.',
    'Ihre Einstellungen, die noch abgegebenen kvar ihrer Stufen und die Intervalllänge des Lastgangs prüfen.',
  ),
  'record.short': said(
    'Der Lastgang umfasst {days:Tag|Tage}: Eine Jahreszeit, ein Stillstand oder ein Monat hoher Last kann fehlen.',
    'Vor der Bestellung mit einem längeren Lastgang neu planen.',
  ),
  'record.partYear': said(
    'Der Lastgang umfasst {days:Tag|Tage}, weniger als ein Jahr.',
    'Monate außerhalb des Lastgangs sind nicht abgedeckt.',
  ),
  'need.none': said(
    'Keine Anlage wird benötigt: Der Standort hält {targetPowerFactor} bereits.',
    'Nichts ist zu bauen.',
  ),
  'target.missed': said(
    'Der Zielwert {targetPowerFactor} wird in {months:Monat|Monaten} verfehlt; {month} bleibt am niedrigsten, bei {powerFactor}.',
    'Es annehmen oder eine größere Anlage zulassen.',
  ),
  'target.met': said('Der Zielwert {targetPowerFactor} wird in jedem Monat des Lastgangs erreicht.'),
  'operation.overCorrection': said(
    'Die Anlage fügt in einem Intervall bis zu {overKvar} kapazitiv hinzu, mehr als ihre kleinste Stufe, {smallestKvar}.',
    'Eine kleinere kleinste Stufe wählen oder zu diesen Zeiten kapazitive kvar annehmen.',
  ),
  'switchings.lowerBound': said(
    'Die Schaltungen sind an Mittelwerten über {intervalS} gezählt; schnellere Schwankungen bleiben darin verborgen, daher sind die Zahlen Untergrenzen.',
    'Mit mehr Schaltungen rechnen, als gezählt sind.',
  ),
  'reconnection.short': said(
    'Die Wiedereinschaltsperrzeit von {reconnectDelayS} ist kürzer, als der Widerstand nach Norm für Gruppe {group} zulässt, {naturalS}.',
    'Bestätigen, dass ein Widerstand von höchstens {requiredOhm} eingebaut ist, oder die Sperrzeit verlängern.',
  ),
  'bank.ratioDisagrees': said(
    'Der angegebene Verdrosselungsgrad, {statedPct}, widerspricht Kapazität und Induktivität des Leistungsschilds, {derivedPct}, die verwendet wurden.',
    'Die Leistungsschilder noch einmal ablesen.',
  ),
  'need.metEveryMonth': said(
    'Einzelne Intervalle benötigen bis zu {maxKvar}, und doch wird der Zielwert {targetPowerFactor} in jedem Monat ohne Anlage erreicht.',
    'Für den Zielwert wird keine Anlage benötigt.',
  ),
  'device.short': said(
    '{device}[ der Gruppe {group}] reicht nicht[: {value}][ gegen {limit}].',
    'Einbauen, was die Gerätetabelle verlangt.',
    '{device}[ der Gruppe {group}] reicht nicht',
  ),
  'device.shortByPractice': said(
    '{device}[ der Gruppe {group}] bleibt hinter der üblichen Praxis zurück[: {value}][ gegen {limit}].',
    'Einbauen, was die Gerätetabelle verlangt, oder mit Begründung annehmen.',
    '{device}[ der Gruppe {group}] bleibt hinter der üblichen Praxis zurück',
  ),
  'device.riseOverLimit': said(
    'Ist die Spannungsanhebung durch die Anlage nicht in der höchsten Sammelschienenspannung enthalten, sind die Kondensatoren der Gruppe {group} zu niedrig bemessen: {value} gegen {limit}.',
    'Angeben, was die höchste Spannung enthält, oder die nächsthöhere Bemessungsspannung wählen.',
    'Bemessungsspannung der Gruppe {group}, falls die Anhebung durch die Anlage nicht in der höchsten Sammelschienenspannung enthalten ist',
  ),
  'device.noResponse': said(
    '{device}: Der Regler spricht auf {value} an, und die kleinste Stufe gibt {limit} an ihrer Schwelle.',
    'Einen Wandler kleinerer Übersetzung oder eine größere kleinste Stufe wählen.',
    '{device}: Die kleinste Stufe gibt weniger, als der Regler zum Ansprechen braucht',
  ),
  'measured.noLevel': said(
    'Eine Messung mit {bankKvar} zugeschaltet wurde angegeben; das ist kein Schaltzustand dieser Anlage, daher wird sie nicht verglichen.',
    'Die zugeschaltete Leistung angeben oder neu messen.',
  ),
  'measured.above': said(
    '{quantity}, bei Ordnung {orderH} an {bus} gemessen, {value}, liegt über jedem Eckfall des Modells, höchstens {limit}.',
    'Nach einer nicht aufgeführten Last oder Vorverzerrung suchen; das Modell sagt bei dieser Ordnung zu wenig.',
    '{quantity}, bei Ordnung {orderH} an {bus} gemessen, über jedem Eckfall des Modells',
  ),
  'measured.below': said(
    '{quantity}, bei Ordnung {orderH} an {bus} gemessen, {value}, liegt unter jedem Eckfall des Modells, mindestens {limit}.',
    'Das Modell irrt hier zur ungünstigen Seite; fragen, bei welcher Last gemessen wurde.',
    '{quantity}, bei Ordnung {orderH} an {bus} gemessen, unter jedem Eckfall des Modells',
  ),
  'ageing.overLimit': said(
    'Mit {leftPct} Restkapazität[ in einer Stufe der Gruppe {group}] überschreitet die Anlage einen Grenzwert[, abgestimmt auf Ordnung {tunedOrderH}]: {duty}.',
    'Die Kapazität jedes Jahr messen und eine Stufe beim gedruckten Wert außer Betrieb nehmen.',
  ),
  'ageing.takeOut': said(
    'Eine Stufe der Gruppe {group} wurde mit {capacitanceUf} je Strang gemessen; bei {comesOutUf} muss sie außer Betrieb genommen werden.',
    'Die Stufe außer Betrieb nehmen oder ihren Kondensator ersetzen.',
  ),
  'loads.fast': said(
    '{name} schwankt[ um {swingKvar}][ innerhalb von {swingS}], schneller, als Stufen folgen, die {stepDelayS} zwischen zwei Schritten warten: Sie halten nur den Zielwert der Arbeit.',
    'Kontaktlose Schaltgeräte verwenden, wenn jeder Schwankung gefolgt werden muss.',
  ),
  'supply.photovoltaic': said(
    'Eine Photovoltaikanlage mit {photovoltaicKw} nimmt dem Zähler Wirkleistung ab und lässt die kvar: Der Leistungsfaktor sinkt am Tag.',
    'Fragen, welche kvar ihre Wechselrichter abgeben und wie der Zielwert bei Einspeisung gilt.',
  ),
  'layout.noCandidate': said(
    'Der Katalog enthält keine Anlage, die für diesen Standort gebaut werden könnte.',
    'Die Liste der Größen, Spannungen oder Verdrosselungsgrade oder die größte Stufenzahl erweitern.',
  ),
  'layout.onlyWatch': said(
    'Keine Anlage des Katalogs erreicht den Zielwert mit Abstand zu jedem Grenzwert; die nächstliegende wird vorgeschlagen.',
    'Annehmen, was nahe einem Grenzwert liegt, oder den Katalog erweitern.',
  ),
  'layout.targetOutOfReach': said(
    'Keine Anlage des Katalogs erreicht den Zielwert in jedem Monat; die nächstliegende wird vorgeschlagen.',
    'Mehr Stufen, größere Stufen oder mehr kvar zulassen, oder die zu niedrigen Monate annehmen.',
  ),
  'layout.onlyAvoid': said(
    'Jede Anlage des Katalogs liegt über einem Grenzwert; die nächstliegende wird gezeigt.',
    'Den Katalog erweitern oder die Verzerrung an ihren Quellen beheben.',
  ),
};
