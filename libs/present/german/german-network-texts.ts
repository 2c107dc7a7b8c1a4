/** Method, stages, network, settings and work on site. */
export const GERMAN_NETWORK_TEXTS: Readonly<Record<string, string>> = {
  'Load before and after: in target {0} of the time': 'Last vorher und nachher: {0} der Zeit im Zielwert',
  'The target is {0}. With the bank {1} lagging and {2} leading are left at the meter. At the bus the residual lies between {3} and {4}.':
    'Der Zielwert ist {0}. Mit der Anlage bleiben am Zähler {1} induktiv und {2} kapazitiv. An der Sammelschiene liegt der Rest zwischen {3} und {4}.',
  'Switchings: {0} in the record': 'Schaltungen: {0} im Lastgang',
  hours: 'Stunden',
  '{0} {1} never used.': '{0} {1} nie benutzt.',
  'level is': 'Schaltzustand wird',
  'levels are': 'Schaltzustände werden',
  'The first {0} are listed; the result as JSON holds all.':
    'Die ersten {0} sind aufgeführt; das Ergebnis als JSON enthält alle.',
  'Maintenance: there is no bank': 'Instandhaltung: es gibt keine Anlage',
  'Nothing is connected, so nothing has to be looked after.':
    'Nichts ist angeschlossen, daher ist nichts instand zu halten.',
  'Maintenance: {0} checks with their reject values': 'Instandhaltung: {0} Prüfungen mit ihren Ausscheidewerten',
  check: 'Prüfung',
  every: 'alle',
  rejected: 'auszuscheiden bei',
  'All of them once more a week after the first switching on. Intervals are common practice; dust, heat and many switchings call for shorter ones. A stage that is rejected comes out, and section 10 says what is left without it. Section 15 first.':
    'Alle Prüfungen noch einmal eine Woche nach der Inbetriebnahme. Die Fristen sind übliche Praxis; Staub, Wärme und viele Schaltungen verlangen kürzere. Eine ausgeschiedene Stufe wird außer Betrieb genommen, und Abschnitt 10 sagt, was ohne sie bleibt. Zuerst Abschnitt 15.',
  'Schedule of materials: nothing is built': 'Materialliste: nichts wird gebaut',
  'Nothing is to be bought.': 'Nichts ist zu beschaffen.',
  'Schedule of materials: {0} items, by their ratings': 'Materialliste: {0} Positionen, nach Bemessung',
  item: 'Position',
  'Least ratings by this plan; section 7.2 names their sources. What is offered otherwise is entered and judged again.':
    'Mindestbemessungen nach diesem Plan; Abschnitt 7.2 nennt ihre Quellen. Was anders angeboten wird, ist einzugeben und neu zu beurteilen.',
  'Measured at {0}: {1}': 'Gemessen an {0}: {1}',
  'Estimate. From a month’s bill the need has two bounds: the constant kvar that lifts the month’s power factor to the target, and the kvar at the greatest demand if that had the month’s power factor. From a list the load is the sum of rated power over efficiency, by load factor and coincidence, with its own power factors. The bank is sized by the upper bound; nothing is simulated.':
    'Schätzung. Aus der Rechnung eines Monats hat der Bedarf zwei Grenzen: die konstanten kvar, die den Leistungsfaktor des Monats auf den Zielwert heben, und die kvar bei größter Leistung, wenn diese den Leistungsfaktor des Monats hätte. Aus einer Liste ist die Last die Summe von Bemessungsleistung durch Wirkungsgrad, mit Lastgrad und Gleichzeitigkeit, mit den eigenen Leistungsfaktoren. Die Anlage wird nach der Obergrenze bemessen; nichts wird simuliert.',
  'Need. In every interval the kvar at the bus beyond P · tan φ of the target. Metered at the primary, the bus power is what the meter reads less the transformer’s own part, and the need is the kvar at the bus that brings the meter to its target.':
    'Bedarf. In jedem Intervall die kvar an der Sammelschiene über P · tan φ des Zielwerts. Bei Messung auf der Primärseite ist die Leistung an der Sammelschiene der Zählerwert abzüglich des Eigenanteils des Transformators, und der Bedarf sind die kvar an der Sammelschiene, die den Zähler auf den Zielwert bringen.',
  'Simulation. In time order, on interval means: the controller holds while the deviation is within its response, else takes the level its mode asks for from the stages that are free. Switchings happen at the beginning of an interval.':
    'Simulation. In zeitlicher Folge, mit Intervallmitteln: Der Regler hält, solange die Abweichung innerhalb der Ansprechschwelle liegt, sonst nimmt er aus den freien Stufen den Schaltzustand, den seine Betriebsart verlangt. Geschaltet wird am Beginn eines Intervalls.',
  'Bank. A stage gives Q_N · (U / U_N)^2 / (1 − p) at the bus voltage U, with reactor ratio p; its levels are the distinct sums.':
    'Anlage. Eine Stufe gibt Q_N · (U / U_N)^2 / (1 − p) bei der Sammelschienenspannung U, mit Verdrosselungsgrad p; die Schaltzustände sind die verschiedenen Summen.',
  'Network. Supply, transformer and damping load as impedances over the order, the bank as an admittance on them. Every level is judged in every corner of fault level, capacitance, inductance and damping, all stages moving together.':
    'Netz. Versorgung, Transformator und dämpfende Last als Impedanzen über der Ordnung, die Anlage als Admittanz daran. Jeder Schaltzustand wird in jedem Eckfall von Kurzschlussleistung, Kapazität, Induktivität und Dämpfung beurteilt, alle Stufen gemeinsam verändert.',
  'Harmonics. Each source alone, then summed by the exponents of IEC TR 61000-3-6: 1 below order 5, 1.4 to order 10, 2 above, unless the arithmetic sum was asked for.':
    'Oberschwingungen. Jede Quelle für sich, dann summiert mit den Exponenten nach IEC TR 61000-3-6: 1 unter Ordnung 5, 1,4 bis Ordnung 10, 2 darüber, sofern nicht die arithmetische Summe verlangt war.',
  'Verdict. A value over its limit in any corner is over a limit; near it from 80 % for currents, kvar, inrush and distortion, and from 95 % for voltages. A network limit passed without the bank already is laid to the bank only beyond 1 % of the limit.':
    'Beurteilung. Ein Wert über seinem Grenzwert in einem Eckfall liegt über einem Grenzwert; nahe daran liegt er ab 80 % bei Strömen, kvar, Einschaltstrom und Verzerrung und ab 95 % bei Spannungen. Ein Netzgrenzwert, der schon ohne Anlage überschritten ist, wird der Anlage erst über 1 % des Grenzwerts zugerechnet.',
  'Method and working: {0} figures, each with its values put in':
    'Verfahren und Rechengang: {0} Werte, jeder mit seinen Zahlen',
  'Every figure, with its source and the units of what was put in':
    'Jeder Wert, mit seiner Quelle und den Einheiten der eingesetzten Größen',
  'figure and source': 'Wert und Quelle',
  'The worst interval': 'Das schlechteste Intervall',
  'No interval misses the target; the one of greatest need':
    'Kein Intervall verfehlt den Zielwert; das mit dem größten Bedarf',
  '{0} begins {1}': '{0} beginnt {1}',
  step: 'Schritt',
  'Behind the transformer, at the meter, {0} are short of the target in this interval.':
    'Hinter dem Transformator, am Zähler, fehlen in diesem Intervall {0} zum Zielwert.',
  'formula, and with the values put in': 'Formel, und mit eingesetzten Werten',
  '{0}\u00a0in\u00a0{1}': '{0}\u00a0in\u00a0{1}',
  'Network and duties: nothing is connected': 'Netz und Beanspruchungen: nichts ist zugeschaltet',
  'Without a bank there is no level to judge; the network stays as it is.':
    'Ohne Anlage gibt es keinen Schaltzustand zu beurteilen; das Netz bleibt, wie es ist.',
  'Network and duties: {0}': 'Netz und Beanspruchungen: {0}',
  '{0} over a limit': '{0} über einem Grenzwert',
  '{0} near a limit': '{0} nahe einem Grenzwert',
  'every row judged is within its limit': 'jede Prüfung liegt innerhalb ihres Grenzwerts',
  'The fault level at the bus lies between {0} and {1}.':
    'Die Kurzschlussleistung an der Sammelschiene liegt zwischen {0} und {1}.',
  '{0} {1} No level makes a peak.': '{0} {1} Kein Schaltzustand erzeugt eine Überhöhung.',
  '{0} {1} Over all levels, nominal and worst case, the parallel resonance lies between order {2}.':
    '{0} {1} Über alle Schaltzustände, Nennfall und ungünstigster Fall, liegt die Parallelresonanz zwischen Ordnung {2}.',
  'No bank': 'Keine Anlage',
  'Dashed: without a bank.': 'Gestrichelt: ohne Anlage.',
  'Grey: all levels. Heavy line: all stages in. Dashed: no bank. Heavy strokes below: orders present, with windows of ±0.3. Strokes above: each level’s peak, heavy inside a window.':
    'Grau: alle Schaltzustände. Kräftige Linie: alle Stufen ein. Gestrichelt: keine Anlage. Kräftige Striche unten: vorhandene Ordnungen, mit Fenstern von ±0,3. Striche oben: Überhöhung jedes Schaltzustands, kräftig innerhalb eines Fensters.',
  'No order with a limit is present, so there is no map of margins.':
    'Keine Ordnung mit Grenzwert ist vorhanden, daher gibt es keine Karte der Abstände.',
  '{0}, for comparison: {1}; harmonic voltage over a limit at {2} of {3} levels.':
    '{0}, zum Vergleich: {1}; Oberschwingungsspannung über einem Grenzwert in {2} von {3} Schaltzuständen.',
  share: 'Anteil',
  'met at': 'tritt auf bei',
  'Duties, worst level and corner': 'Beanspruchungen, ungünstigster Schaltzustand und Eckfall',
  'level, kvar': 'Zustand, kvar',
  case: 'Fall',
  'peak, Ω': 'Überhöhung, Ω',
  'THD of voltage, %': 'THD der Spannung, %',
  'TDD of current, %': 'TDD des Stroms, %',
  'fault level, C, L, damping': 'Kurzschlussleistung, C, L, Dämpfung',
  'Levels, nominal and worst case': 'Schaltzustände, Nennfall und ungünstigster Fall',
  '{0} of {1} levels are listed, evenly; the result as JSON holds all.':
    '{0} von {1} Schaltzuständen sind aufgeführt, gleichmäßig verteilt; das Ergebnis als JSON enthält alle.',
  'For the network operator: {0} questions before the bank is connected':
    'Für den Netzbetreiber: {0} Fragen vor dem Anschluss der Anlage',
  'connection and bank': 'Anschluss und Anlage',
  'effect on the network, worst level and corner': 'Wirkung auf das Netz, ungünstigster Schaltzustand und Eckfall',
  asked: 'gefragt',
  'taken for this plan': 'für diesen Plan angenommen',
  answer: 'Antwort',
  'An answer that differs from what was taken calls for another revision.':
    'Eine Antwort, die vom Angenommenen abweicht, verlangt eine weitere Revision.',
  'Sensitivity: not computed': 'Empfindlichkeit: nicht berechnet',
  'How far the verdict stands when an input moves was not asked for.':
    'Wie weit die Beurteilung bei veränderten Eingaben gilt, war nicht verlangt.',
  'Sensitivity: {0}': 'Empfindlichkeit: {0}',
  'Each moved by itself, times its own value, until the verdict is another one.':
    'Jede Größe für sich verändert, als Vielfaches ihres Werts, bis die Beurteilung eine andere ist.',
  'one stage out of': 'eine Stufe aus von',
  'nearest to its limit': 'dem Grenzwert am nächsten',
  'share of it': 'Anteil daran',
  'Reactor ratios tried with the same stages': 'Mit denselben Stufen geprüfte Verdrosselungsgrade',
  'A filter is tuned a little below the order of the greatest current, to take it up; its stage carries that current.':
    'Ein Filter ist etwas unter die Ordnung des größten Stroms abgestimmt, um ihn aufzunehmen; seine Stufe führt diesen Strom.',
  'group {0}': 'Gruppe {0}',
  'Controller settings: there is no controller': 'Reglereinstellungen: es gibt keinen Regler',
  'Nothing is switched, so nothing is to be set.': 'Nichts wird geschaltet, daher ist nichts einzustellen.',
  'Controller settings: {0} to be entered and written down as left':
    'Reglereinstellungen: {0} einzugeben und wie eingestellt zu vermerken',
  setting: 'Einstellung',
  enter: 'eingeben',
  'how derived': 'wie ermittelt',
  'as left': 'eingestellt',
  'The controller’s own names differ. What is left otherwise than here is written down, and the plan is computed again.':
    'Die Bezeichnungen des Reglers weichen ab. Was anders eingestellt bleibt als hier, wird vermerkt, und der Plan wird neu berechnet.',
  'Site actions: none, since nothing is built': 'Arbeiten vor Ort: keine, da nichts gebaut wird',
  'Plan again when load, tariff or supply change.': 'Bei geänderter Last, geändertem Tarif oder Netz neu planen.',
  'Site actions: {0} before the bank goes into service': 'Arbeiten vor Ort: {0}, bevor die Anlage in Betrieb geht',
  action: 'Arbeit',
  found: 'vorgefunden',
  'group\u00a0{0}: {1}': 'Gruppe\u00a0{0}: {1}',
  'group\u00a0{0}: {1} or less': 'Gruppe\u00a0{0}: höchstens {1}',
  'Compare the nameplates of transformer, capacitors and reactors with section 7 and the single-line diagram.':
    'Leistungsschilder von Transformator, Kondensatoren und Drosseln mit Abschnitt 7 und dem Übersichtsschaltplan vergleichen.',
  'as printed': 'wie gedruckt',
  'Ask the network operator for the greatest and least fault level, in writing.':
    'Beim Netzbetreiber größte und kleinste Kurzschlussleistung schriftlich erfragen.',
  'Check breaking capacity and withstand of what is fitted against the equipment fault current of section 7.2.':
    'Ausschaltvermögen und Kurzschlussfestigkeit des Vorhandenen gegen den Kurzschlussstrom für Betriebsmittel in Abschnitt 7.2 prüfen.',
  '{0}, peak {1}': '{0}, Scheitelwert {1}',
  'Measure the capacitance of one delta phase of every stage, discharged and isolated.':
    'Kapazität eines Dreieckstrangs jeder Stufe messen, entladen und freigeschaltet.',
  'Measure or read the discharge resistors.': 'Entladewiderstände messen oder ablesen.',
  'Check the place and direction of the controller’s current transformer: it sees the load and the bank.':
    'Einbauort und Richtung des Stromwandlers für den Regler prüfen: Er erfasst Last und Anlage.',
  'sign of kvar agrees with the meter': 'Vorzeichen der kvar stimmt mit dem Zähler überein',
  'Set the controller by the sheet of section 16.': 'Regler nach dem Blatt in Abschnitt 16 einstellen.',
  '{0}; step {1}; reconnection {2}': '{0}; Schritt {1}; Sperrzeit {2}',
  'Test insulation, torque of the connections, and phase rotation.':
    'Isolation, Anzugsmomente der Anschlüsse und Drehfeld prüfen.',
  'by the maker’s values': 'nach Herstellerangaben',
  'Switch stage by stage and note the current of each at the voltage then measured.':
    'Stufe für Stufe schalten und den Strom jeder Stufe bei der dann gemessenen Spannung notieren.',
  'at {0}, {1}': 'bei {0}, {1}',
  'Measure voltage distortion at every level, before and after.':
    'Spannungsverzerrung in jedem Schaltzustand messen, vorher und nachher.',
  'section 9.6': 'Abschnitt 9.6',
  'Put a label on each stage with its waiting time.': 'An jeder Stufe ein Schild mit ihrer Wartezeit anbringen.',
  'section 7.3': 'Abschnitt 7.3',
  'Stages, protection, discharge: there is no bank': 'Stufen, Schutz, Entladung: es gibt keine Anlage',
  'Nothing is connected, so nothing has to be protected or discharged.':
    'Nichts ist angeschlossen, daher ist nichts zu schützen oder zu entladen.',
  'Stages, protection, discharge: {0} {1}, {2}': 'Stufen, Schutz, Entladung: {0} {1}, {2}',
  'Stages, both ratings with their voltages': 'Stufen, beide Leistungen mit ihren Spannungen',
  'ratings of one stage': 'Bemessung einer Stufe',
  reactor: 'Drossel',
  'on the capacitor': 'am Kondensator',
  switched: 'geschaltet',
  never: 'nie',
  yes: 'ja',
  '{0} levels, kvar: {1}.': '{0} Schaltzustände, kvar: {1}.',
  'Controller: set point {0}, {1}, response {2} of the smallest stage, step delay {3}, reconnection delay {4}, equal stages {5}.':
    'Regler: Sollwert {0}, {1}, Ansprechschwelle {2} der kleinsten Stufe, Schaltverzögerung {3}, Wiedereinschaltsperrzeit {4}, gleiche Stufen {5}.',
  'Discharge: wait {0} after switching off, then prove dead':
    'Entladung: nach dem Abschalten {0} warten, dann Spannungsfreiheit feststellen',
  'capacitance, one phase': 'Kapazität, ein Strang',
  'to be reached': 'zu erreichen',
  'resistor at most': 'Widerstand höchstens',
  'for the delay': 'für die Sperrzeit',
  'its loss': 'sein Verlust',
  'waiting time': 'Wartezeit',
  '{0} in {1}': '{0} in {1}',
  'not stated': 'nicht angegeben',
  'Required, the smaller of the two, across each delta phase: {0}. A stage is switched in again only below 10 % of its rated voltage, so the reconnection delay of {1} runs by hand as well. The loss is that of the required resistor in one phase. Section 15 says how to make safe before touching.':
    'Erforderlich, der kleinere der beiden Werte, über jedem Dreieckstrang: {0}. Eine Stufe wird erst unter 10 % ihrer Bemessungsspannung wieder eingeschaltet, daher gilt die Wiedereinschaltsperrzeit von {1} auch von Hand. Der Verlust ist der des erforderlichen Widerstands in einem Strang. Abschnitt 15 sagt, wie vor dem Berühren zu sichern ist.',
};
