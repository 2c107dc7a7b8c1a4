import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `assumption-messages` in German, under the same codes. */
export const GERMAN_ASSUMPTION_MESSAGES: Readonly<Record<string, Translation>> = {
  'default.bus.highestV': said(
    'Die Sammelschiene erreicht höchstens {value}.',
    'Die Spannung bei Schwachlast ablesen.',
  ),
  'default.target.powerFactor': said('Der Zielwert des Leistungsfaktors ist {value}.', 'Den Tarif nachlesen.'),
  'default.target.onExport': said(
    'Solange der Standort einspeist, verlangt der Zielwert keine kvar ({value}).',
    'Die Klausel des Tarifs zur Einspeisung nachlesen.',
  ),
  'default.limits.emcClass': said(
    'Die Sammelschiene ist nach Klasse {value} beurteilt.',
    'Fragen, wem der Verknüpfungspunkt gehört.',
  ),
  'default.recordedBank': said(
    'Während der Aufzeichnung war keine Anlage in Betrieb.',
    'Am Standort nachfragen; mit einer alten Anlage sind die kvar der Last selbst größer.',
  ),
  'default.supply.faultLevelMva.min': said(
    'Die kleinste Kurzschlussleistung ist {value}, gleich der größten.',
    'Den Netzbetreiber fragen; ein schwächeres Netz senkt die Resonanz.',
  ),
  'default.supply.rOverX': said('R/X des Netzes ist {value}.', 'Den Netzbetreiber fragen.'),
  'default.supply.resistanceExponent': said(
    'Widerstände wachsen mit der Ordnung hoch {value}.',
    'Das ändert die Höhe einer Resonanz, nicht ihre Lage.',
  ),
  'default.supply.transformers.impedanceTolerancePct': said(
    'Die Impedanz des Transformators darf um {value} vom Leistungsschild abweichen.',
    'Das Prüfprotokoll verwenden.',
  ),
  'default.supply.transformers.loadLossKw': said(
    'Die Kurzschlussverluste des Transformators sind mit {value} angenommen.',
    'Das Prüfprotokoll nachlesen.',
  ),
  'default.supply.transformers.noLoadLossKw': said(
    'Die Leerlaufverluste des Transformators sind mit {value} angenommen.',
    'Das Prüfprotokoll nachlesen.',
  ),
  'default.supply.transformers.noLoadCurrentPct': said(
    'Der Leerlaufstrom des Transformators ist mit {value} angenommen.',
    'Das Prüfprotokoll nachlesen; bei Messung auf der Primärseite erhöht er den Bedarf.',
  ),
  'supply.noTransformer': said(
    'Kein Transformator wurde angegeben: Die Kurzschlussleistung gilt als die der Sammelschiene selbst.',
    'Den Transformator angeben, wenn die Kurzschlussleistung die des Netzes ist.',
  ),
  'default.loads.dampingKw.max': said(
    'Die eine Resonanz dämpfende Last ist höchstens {value}, die mittlere Last des Lastgangs.',
    'Sie senkt die Überhöhungen des Nennfalls; die Eckfälle rechnen auch mit 0.',
  ),
  'loads.dampingListed': said(
    'Eine Resonanz dämpfen die im Netz aufgeführten Motoren und ohmschen Lasten, und nichts daneben.',
    'Die Last an der Sammelschiene der Anlage angeben, die nicht darunter ist; die Eckfälle lassen auch alles weg.',
  ),
  'default.loads.dampingKw.min': said(
    'Die eine Resonanz dämpfende Last kann auf {value} sinken.',
    'Das ungünstige Ende; nichts zu klären.',
  ),
  'default.loads.motorSharePct': said('Motoren machen {value} der dämpfenden Last aus.', 'Die Motoren aufführen.'),
  'default.loads.summation': said(
    'Oberschwingungen mehrerer Lasten addieren sich nach {value}.',
    'Die arithmetische Summe ist das ungünstige Ende.',
  ),
  'measured.fitted': said(
    'Die Ströme der Oberschwingungserzeuger bei Ordnung {orderH} sind mit dem {factor}fachen der Angabe angesetzt, sodass das Modell die Messung bis auf {residualPct} trifft.',
    'Sie sind die der Stunde der Messung: fragen, bei welcher Last des Betriebs gemessen wurde und ob jede Last lief.',
  ),
  'measured.keptOrders': said(
    'Bei den Ordnungen {orders} wurde nichts gemessen: Ihre Ströme sind wie angegeben.',
    'Auch sie messen oder mit den Datenblättern der Lasten vergleichen.',
  ),
  'network.besideNotSimulated': said(
    '{name} an {bus} ist mit jeder Zahl seiner Stufen beurteilt, die zugeschaltet sein können. Wie es geschaltet wird, ist nicht simuliert: Was es während der Aufzeichnung abgab, bleibt im Lastgang. Spannung und Strom seiner Kondensatoren sind neben dieser Anlage beurteilt, seine eigenen Schaltspiele, Zuschaltungen, Entladung, Geräte und Einstellungen nicht.',
    'Auch als Anlage des Standorts beurteilen, mit dieser unter den Anlagen des Netzes.',
  ),
  'network.cables.steady': said(
    'Kabel behalten bei jeder Ordnung ihren Widerstand der Grundschwingung: Ihr Skineffekt ist klein, und weniger Dämpfung ist das ungünstige Ende.',
    'Nichts zu klären; der Widerstand eines warmen Kabels ist noch höher.',
  ),
  'loads.distorting.none': said(
    'Es wurde erklärt, dass keine Last Oberschwingungen erzeugt.',
    'Den Standort begehen: Antriebe, Gleichrichter, Schweißgeräte, Beleuchtung.',
  ),
  'loads.backgroundPct.none': said(
    'Es wurde erklärt, dass das Netz frei von Verzerrung ist.',
    'Bei abgeschaltetem Betrieb messen oder den Netzbetreiber fragen.',
  ),
  'default.control.setPointPowerFactor': said('Der Regler regelt auf {value}.', 'Am Regler einstellen.'),
  'default.control.mode': said('Der Regler arbeitet in der Betriebsart: {value}.', 'Seine Anleitung lesen.'),
  'default.control.responseRatio': said(
    'Eine Stufe wird geschaltet, wenn die Abweichung {value} der kleinsten Stufe übersteigt.',
    'Am Regler einstellen.',
  ),
  'default.control.stepDelayS': said('Zwischen zwei Schaltungen vergehen mindestens {value}.', 'Am Regler einstellen.'),
  'default.control.reconnectDelayS': said(
    'Eine Stufe bleibt mindestens {value} aus, die Zeit ihres Entladewiderstands bis 10 %.',
    'Am Regler einstellen; eine kürzere Zeit verlangt einen anderen Widerstand.',
  ),
  'default.control.wear': said('Gleiche Stufen werden reihum benutzt ({value}).', 'Am Regler einstellen.'),
  'default.bank.interStageUh': said(
    '{value} liegen zwischen zwei Stufen, wie üblich.',
    'Die Verbindungen messen; davon hängt der Einschaltstrom ab.',
  ),
  'default.bank.stages.reactorQuality': said(
    'X/R der Drosseln ist {value} bei der Grundschwingung, wie üblich.',
    'Das Datenblatt der Drossel nachlesen.',
  ),
  'default.catalogue.stageKvar': said(
    'Stufen gibt es in den üblichen Vorzugsgrößen, 5 bis 100 kvar.',
    'Auflisten, was zu beschaffen ist.',
  ),
  'default.catalogue.ratedV': said(
    'Kondensatoren gibt es für die üblichen Spannungen, 230 bis 800 V.',
    'Auflisten, was zu beschaffen ist.',
  ),
  'default.catalogue.reactorPct': said(
    'Verdrosselungsgrade sind 0, 5,67, 7 oder 14 %.',
    'Auflisten, was zu beschaffen ist.',
  ),
  'default.catalogue.maxStages': said(
    'Eine Anlage hat höchstens 12 Stufen.',
    'Angeben, wie viele Schaltausgänge der Regler hat.',
  ),
  'understood.value': said('{given} wurde als {value} gelesen.', 'Berichtigen, wenn etwas anderes gemeint war.'),
  'default.limits.point': said(
    'Die Spannung an der Sammelschiene wird gegen die Grenzwerte gehalten, und die Anlage gilt als am Verknüpfungspunkt.',
    'Fragen, wem der Verknüpfungspunkt gehört und wo er liegt.',
  ),
  'loads.angles': said(
    'Die Ströme von {count} Lasten mit Winkeln addieren sich als Zeiger bei jeder Last und jedem Schaltzustand; was sich aufhebt, tut das immer.',
    'Die Winkel weglassen, wo die Lasten nicht gemeinsam laufen oder ihre Winkel mit der Last wandern.',
  ),
  'limits.tighterCopy': said(
    'Abschriften von {edition} weichen bei Ordnung {orderH} voneinander ab, {usedPct} und {otherPct}: Der strengere Wert wird verwendet.',
    'Die Norm selbst nachlesen.',
  ),
  'bank.ignored': said(
    'Die vorhandene Anlage trägt zu diesem Plan nichts bei.',
    'Sie für sich beurteilen oder angeben, was während der Aufzeichnung zugeschaltet war.',
  ),
  'money.unused': said(
    'Angegeben und nicht verwendet: {name}.',
    'Es zählt, sobald Tarif, Preise und Stufengrößen daneben stehen.',
  ),
};
