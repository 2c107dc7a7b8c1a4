// The trade's words in column names, without accents and in small letters: English, German, French and Spanish in full, what
// interval exports need in Dutch, Italian, Portuguese, Polish, Czech, Swedish, Danish, Finnish and Turkish.
// A word ending in * stands for every word that begins with it.

export const WORDS = {
  reactive:
    'reactive reactives reactiva reactivo reactif reactifs blind* reactief reactieve reaktiv* reattiva reattivo reativa ' +
    'reativo biern* jalov* loiste* reaktif var q er',
  active:
    'active activa activo actif actifs real wirk* actief actieve werkelijk* aktiv* attiva attivo ativa ativo czynn* cinn* ' +
    'pato* aktif p power energy power energia energie energi puissance potencia leistung arbeit vermogen potenza effekt ' +
    'moc vykon teho usage consumption consumo consommation verbrauch* verbruik* forbruk* forbrug* zuzycie spotreba load ' +
    'last demand demanda bezug* afname profilwert* electricity stromverbrauch',
  lagging:
    'lag lagging inductive inductiva inductivo inductif induktiv* inductief inductieve induttiva induttivo indutiva ' +
    'indutivo indukcyjn* induktif enduktif ind',
  leading:
    'lead leading capacitive capacitiva capacitivo capacitif kapazitiv* capacitief capacitieve capacitivo pojemnosciow* ' +
    'kapacit* kapasit* cap',
  imported:
    'import imported delivered del bezug* soutirage soutiree consumida positive positiv positiva entrante afname ' +
    'prelevata prelievo pobran* odber uttag',
  exported:
    'export exported received rec einspeis* ruckspeis* lieferung abgabe generation generated injection injectee ' +
    'inyeccion inyectada vertida excedente feed exportada negative negativ negativa saliente teruglevering* invoeding ' +
    'immessa immissione oddan* dodavka inmatning',
  bank: 'bank capacitor capacitors kondensator* kompensation* compensation pfc condensateur* condensador* bateria',
  connected: 'connected zugeschaltet* conectada connectee',
  beside: 'after before without with nach vor ohne mit apres avant sans avec antes despues sin con',
  standby: 'standby generator* genset notstrom* emergency secours emergencia aggregat* ersatzstrom*',
  voltage: 'voltage voltages volt volts spannung* tension tensione spanning tensao napiec* napeti jannite',
  distortion: 'thd thdu thdi harmonic harmonics oberschwingung* unbalance frequency frequenz',
  ratio:
    'factor faktor leistungsfaktor facteur fattore fator arbeidsfactor effektfaktor wspolczynnik cos cosphi phi pf cosfi',
  powerFactor: 'powerfactor leistungsfaktor* arbeidsfactor effektfaktor cos cosphi cosfi pf',
  power: 'power puissance potencia leistung potenza mocy',
  apparentOnly: 'apparent schein* aparente apparente schijnbaar schijn* pozorn* zdanliv* skenbar*',
  current: 'current amps amperes strom stromstarke courant corriente intensite intensidad stroom corrente prad proud',
  apparent: 'apparent schein* aparente apparente schijnbaar schijn* pozorn* zdanliv* skenbar* s',
  cumulative:
    'cumulative cumulated cumul* kumul* zahlerstand* stand register registers index acumulada acumulado lectura releve',
  reading: 'reading readings ablesung',
  other:
    'price cost tariff limit target contract contracted price* co2 temperature status quality flag type count id ' +
    'budget forecast prognose prevision',
  extreme: 'max maximum min minimum peak spitze hochst* maxi* mini* maxima minima pointe',
  quality: 'quality qualitat* qualite calidad status messwertstatus flag flags validity gultigkeit estado etat',
  meter: 'meter meters zahler compteur contador contatore licznik device messstelle',
  meterName:
    'mpan mprn nmi pod prm ean cups meterid meterno meternumber zahlpunkt* zahlernummer zahlernr messlokation* messpunkt*',
  /** what a column of several meters may name instead of them */
  place:
    'site location building feeder serial account customer station substation standort gebaude kunde lieu batiment client ' +
    'ubicacion edificio cliente locatie gebouw',
  identity: 'id no nr number nummer numero serial name code identifier kennung bezeichnung point',
  time:
    'date datum fecha data dato tarih time zeit* uhrzeit heure hora ora tijd tijdstip tid tidpunkt godzina saat clock timestamp timestamps datetime stamp horodat* interval ' +
    'period periode periodo hour hours stunde uur quarter begin beginning start end ending from to von bis ab beginn ende intervallbeginn intervallanfang intervallende debut fin inicio desde hasta inizio fine begintijd eindtijd tot',
  /** names of a column that counts the hours or intervals of a day */
  count:
    'hour hours hora heure stunde uur ora godzina saat he hr period periode periodo interval quarter slot time zeit',
  year: 'year yr jahr annee ano anno jaar rok ar',
  month: 'month mon monat mois mes mese maand miesiac mesic',
  day: 'day tag jour dia giorno dag dzien den',
  /** names of a column that says what the number beside it is */
  channel:
    'channel kanal canal canale quantity quantities parameter parametre parametro measurement measurand measure variable ' +
    'register type series tag description obis item point grosse messgrosse kennzahl kennziffer grandeur magnitud ' +
    'grandezza grootheid wielkosc name signal stream',
  value: 'value values wert werte valeur valor valore waarde wartosc hodnota varde amount reading data messwert',
  unit: 'unit units uom einheit unite unidad unita eenheid jednostka enhet',
  minute: 'minute minutes min minuto minuten minuut minuta',
  neutral:
    'total sum avg average mean net gross main site plant all mittel mittelwert moyenne media meter l ll ln kanal channel',
  begin:
    'begin begins beginning start starts starting from von ab beginn anfang intervallbeginn intervallanfang debut desde inicio inizio begintijd',
  end: 'end ends ending ende to until till bis intervallende fin jusqu* hasta fine eindtijd tot',
} as const;

export type WordGroup = keyof typeof WORDS;

const EXACT = new Map<WordGroup, Set<string>>();
const STARTS = new Map<WordGroup, string[]>();
for (const [group, list] of Object.entries(WORDS) as [WordGroup, string][]) {
  const all = list.split(' ');
  EXACT.set(group, new Set(all.filter((word) => !word.endsWith('*'))));
  STARTS.set(
    group,
    all.filter((word) => word.endsWith('*')).map((word) => word.slice(0, -1)),
  );
}

/**
 * The words of a column name: small letters, no accents, parts of camelCase apart and together.
 * @param name the name, its unit taken out
 */
export function wordsOf(name: string): string[] {
  const plain = name
    .replace(/stand[- ]by/gi, 'standby')
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .replaceAll('ß', 'ss');
  const apart = plain.replace(/([a-z])([A-Z])/g, '$1 $2');
  return [...new Set([...splitWords(plain), ...splitWords(apart)])];
}

function splitWords(text: string): string[] {
  return text
    .toLowerCase()
    .split(/[^a-z0-9]+/)
    .filter((word) => word !== '');
}

/**
 * Whether every word is one of the trade's.
 * @param words of a part of a column name
 */
export function areKnown(words: readonly string[]): boolean {
  const groups = Object.keys(WORDS) as WordGroup[];
  return words.every((word) => /^\d+$/.test(word) || groups.some((group) => says([word], group)));
}

/**
 * Whether one of the words belongs to a group.
 * @param words of a column name
 * @param group of the vocabulary
 */
export function says(words: readonly string[], group: WordGroup): boolean {
  const exact = EXACT.get(group)!;
  const starts = STARTS.get(group)!;
  return words.some((word) => exact.has(word) || starts.some((start) => word.startsWith(start)));
}
