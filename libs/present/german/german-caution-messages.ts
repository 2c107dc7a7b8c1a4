import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `caution-messages` in German, under the same codes. */
export const GERMAN_CAUTION_MESSAGES: Readonly<Record<string, Translation>> = {
  'caution.storedCharge': said(
    'Gefahr: Ein Kondensator behält seine Ladung, nachdem er abgeschaltet ist. Freischalten und gegen Wiedereinschalten sichern; die für diese Stufe gedruckte Zeit abwarten, längstens {waitS} mit dem Widerstand nach Norm bis {toV}; Spannungsfreiheit zwischen allen Anschlüssen und gegen Erde feststellen; vor dem Berühren entladen, kurzschließen und erden. Ein Entladewiderstand kann ausgefallen sein, daher beweist das Warten allein nichts.',
  ),
  'caution.qualifiedPeople': said(
    'Arbeiten an der Anlage und ihrer Zuleitung sind ausschließlich Elektrofachkräften erlaubt, die nach einer schriftlichen Anweisung des Standorts arbeiten.',
  ),
  'caution.currentTransformer': said(
    'Gefahr: Den Sekundärkreis eines Stromwandlers niemals öffnen, solange primär Strom fließt; zuvor kurzschließen. Ein offener Sekundärkreis kann töten und den Wandler in Brand setzen.',
  ),
  'caution.inrush': said(
    'Eine Stufe, die noch geladen oder auf bereits zugeschaltete Stufen geschaltet wird, zieht einen Strom weit über ihrem Bemessungsstrom. Die Wiedereinschaltsperrzeit jedes Mal ablaufen lassen, auch von Hand.',
  ),
  'caution.resonance': said(
    'Kondensatoren und Netz bilden einen Schwingkreis. Andere Kondensatoren, Kabel, Antriebe oder ein geändertes Netz, jetzt oder später, verschieben die Resonanz: Die Anlage neu beurteilen, bevor etwas davon hinzukommt.',
  ),
  'caution.overCorrection': said(
    'Zu viele Stufen bei Schwachlast heben die Spannung an und machen den Strom kapazitiv. Die Anlage abgeschaltet halten, solange ein Generator den Standort speist, es sei denn, dessen Hersteller stimmt schriftlich zu.',
  ),
  'caution.temperature': said(
    'Wärme lässt Kondensatoren altern und kann sie in Brand setzen. Ihre Temperaturklasse einhalten, die Luftwege frei halten und bei jeder Inspektion auf Aufblähung, Undichtigkeit und dunkle Stellen achten.',
  ),
  'caution.faultLevel': said(
    'Die hier gedruckte Kurzschlussleistung gilt nur für die Resonanz. Kurzzeitfestigkeit und Ausschaltvermögen verlangen den größten Fehlerstrom nach eigener Norm, mit Spannungsfaktor und Beitrag der Motoren.',
  ),
  'caution.earthing': said(
    'Gestell und Gehäuse erden. Den Sternpunkt eines Kondensators nicht erden, es sei denn, das Netz ist dafür ausgelegt.',
  ),
  'caution.dataGiven': said(
    'Dieser Plan ist so gut wie die Daten, die ihm zugrunde liegen. Leistungsschilder, Kurzschlussleistungen und Lasten vor Ort prüfen, bevor man sich darauf verlässt.',
  ),
  'caution.localCodes': said(
    'Örtliche Vorschriften und das Urteil der zugelassenen Fachkraft gehen allem hier Gedruckten vor.',
  ),
  'caution.notPermission': said(
    'Dass kein berechneter Grenzwert überschritten ist, ist keine Erlaubnis zum Einschalten.',
  ),
};
