import type { Translation } from '../language.js';
import { said } from './said.js';

/** The messages of `money-messages` in German, under the same codes. */
export const GERMAN_MONEY_MESSAGES: Readonly<Record<string, Translation>> = {
  'default.tariff.decimals': said(
    'Jede Zeile einer Rechnung wird auf {value} Nachkommastellen gerundet.',
    'An einer wirklichen Rechnung ablesen.',
  ),
  'default.tariff.taxPct': said(
    'Rechnungen gelten ohne Steuer.',
    'Die Steuer angeben, die der Standort nicht zurückbekommt.',
  ),
  'default.tariff.demandS': said(
    'Die Leistung ist das Mittel über {value}, das Intervall des Lastgangs.',
    'Den Tarif nachlesen; längere Messperioden senken eine Spitze.',
  ),
  'default.finance.discountPct': said(
    'Geld wird mit {value} im Jahr abgezinst.',
    'Den eigenen Zinssatz des Standorts erfragen.',
  ),
  'default.finance.horizonYears': said(
    'Kosten und Ersparnis sind über {value:Jahr|Jahre} gerechnet, ohne Restwert.',
    'Fragen, wie weit der Standort vorausschaut.',
  ),
  'default.finance.billGrowthPct': said(
    'Die Rechnungen steigen um {value} im Jahr.',
    'Einen Satz wählen, zu dem beide Seiten stehen.',
  ),
  'default.finance.costGrowthPct': said(
    'Instandhaltung und Ersatz steigen um {value} im Jahr.',
    'Einen Satz wählen, zu dem beide Seiten stehen.',
  ),
  'papers.tariff': said(
    'Der Tarif ist das gemeinsame Dokument „{name}“, Version {version}, gültig ab {date}.',
    'Eine spätere Version ändert hier nichts, bis der Standort neu geplant wird.',
  ),
  'papers.prices': said(
    'Die Preise sind das gemeinsame Dokument „{name}“, Version {version}, gültig ab {date}.',
    'Eine spätere Version ändert hier nichts, bis der Standort neu geplant wird.',
  ),
  'prices.invented': said(
    'Das Preisbuch ist erfunden: Es zeigt, wie Kosten berechnet werden, nicht, was etwas kostet.',
    'Wirkliche Preise einsetzen, bevor etwas entschieden wird.',
  ),
  'prices.notYetValid': said(
    'Das Preisbuch gilt ab {validFrom}; der Plan ist vom {asOf}.',
    'Das Preisbuch des Tages verwenden.',
  ),
  'prices.outOfDate': said('Das Preisbuch galt bis {validTo}; der Plan ist vom {asOf}.', 'Neue Preise einholen.'),
  'default.catalogue.evenSteps': said(
    'Schaltzustände einer Anlage liegen nicht weiter auseinander als ihre kleinste Stufe.',
    'Ungleiche Schritte zulassen, wenn der Regler sie nutzen kann.',
  ),
  'default.catalogue.mustMeetTarget': said(
    'Der Zielwert muss in jedem Monat gehalten werden, was es auch koste.',
    'Es angeben, wenn allein das Geld entscheidet.',
  ),
  'default.catalogue.maxTotalKvar': said(
    'Keine Anlage wird geprüft, die eine Stufe mehr hat, als die größten kvar des Lastgangs brauchen.',
    'Angeben, was höchstens gebaut werden darf.',
  ),
  'money.idealControl': said(
    'Die Ersparnis ist die eines Reglers, der nach den Mitteln des laufenden Intervalls entscheidet.',
    'Die Ersparnis als Bereich lesen: Sie ist eine Schätzung, keine Zusage.',
  ),
  'money.sameLoad': said(
    'Die Last des Lastgangs kehrt jedes Jahr wieder.',
    'Fragen, was hinzukommen oder stillgelegt werden soll.',
  ),
  'search.newBank': said(
    'Von allen Kandidaten, die alles einhalten, hat diese Anlage den größten Kapitalwert, {value}.',
  ),
  'search.keepBank': said(
    'Die heutige Anlage lohnt sich: Keine neue erhöht ihren Kapitalwert von {value}.',
    'Nichts ist zu bauen.',
  ),
  'search.nothing': said('Nichts wird empfohlen: Kein Kandidat hält alles ein.', 'Nichts ist zu bauen.'),
  'search.nothingPays': said(
    'Nichts wird empfohlen: Die beste Anlage hat einen Kapitalwert von {value}.',
    'Aus wirtschaftlichen Gründen ist nichts zu bauen.',
  ),
  'search.onlyWatch': said(
    'Kein Kandidat hält Abstand zu jedem Grenzwert; der beste nahe an einem wird vorgeschlagen.',
    'Annehmen, was nahe einem Grenzwert liegt, oder den Katalog erweitern.',
  ),
  'search.onlyAvoid': said(
    'Jeder Kandidat des Katalogs liegt über einem Grenzwert.',
    'Den Katalog erweitern oder die Verzerrung an ihren Quellen beheben.',
  ),
  'search.bestAttainable': said(
    'Kein Kandidat hält den Zielwert {targetPowerFactor} in jedem Monat; der beste hält {powerFactor}.',
    'Mehr Stufen oder mehr kvar zulassen oder die Forderung aufgeben.',
  ),
};
