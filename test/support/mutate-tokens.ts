import { type Chance, mutate } from './mutate-file.js';

const NUMBER = /[-+]?\d+(?:\.\d+)?/g;
const ODD_NUMBERS = [
  'NaN',
  'INF',
  '-Infinity',
  '1e308',
  '1e309',
  '1e-400',
  '-0',
  '',
  '-1',
  '2024-05-06',
  '0x1F',
  '1,5',
  '1.',
  '.5',
  '1e3',
];

/** Units and codes of units that are put in each other's place. */
const UNITS = [
  ['kWh', 'kW'],
  ['kWh', 'MWh'],
  ['kvarh', 'kvar'],
  ['kW', 'W'],
  ['kW', 'kvar'],
  ['KWH', 'MWH'],
  ['KWH', 'K3'],
  ['K3', 'KVR'],
  ['KVARH', 'KWH'],
  ['<uom>72<', '<uom>38<'],
  ['<uom>73<', '<uom>63<'],
  ['<uom>73<', '<uom>72<'],
  ['.3.72.0"', '.3.38.0"'],
  ['.3.72.0"', '.0.72.0"'],
  ['.3.73.0"', '.6.73.0"'],
  ['1.29.0', '2.29.0'],
  ['powerOfTenMultiplier>3<', 'powerOfTenMultiplier>0<'],
] as const;

/** Puts something else in the place of one of the matches. */
function onMatch(text: string, pattern: RegExp, chance: Chance, change: (match: string) => string): string {
  const matches = [...text.matchAll(pattern)];
  if (matches.length === 0) return text;
  const { index, 0: match } = chance.of(matches);
  return text.slice(0, index) + change(match) + text.slice(index + match.length);
}

/** The pieces a text is made of: elements, segments or lines. */
function pieces(text: string): RegExp {
  if (/^\s*</.test(text))
    return /<([\w:]+)[^<>]*>[^<]*<\/\1>|<(\w*:?(?:IntervalReadings?|entry|row|c))\b[^>]*>[\s\S]*?<\/\2>/g;
  return /^UNA|^UNB/.test(text) ? /[^']+'/g : /[^\n]+\n/g;
}

type TextMutation = (text: string, chance: Chance) => string;

/** Ways in which the words of a text of any format are damaged, by name. */
export const TOKEN_MUTATIONS: Record<string, TextMutation> = {
  oddNumber: (text, chance) => onMatch(text, NUMBER, chance, () => chance.of(ODD_NUMBERS)),
  manyDigits: (text, chance) => onMatch(text, NUMBER, chance, () => '9'.repeat(1 + chance.below(400))),
  otherSign: (text, chance) =>
    onMatch(text, NUMBER, chance, (number) => (number.startsWith('-') ? number.slice(1) : `-${number}`)),
  otherDigit: (text, chance) => onMatch(text, /\d/g, chance, () => String(chance.below(10))),
  numbersSwapped: (text, chance) => {
    const numbers = text.match(NUMBER) ?? ['0'];
    return onMatch(text, NUMBER, chance, () => chance.of(numbers));
  },
  pieceRepeated: (text, chance) => onMatch(text, pieces(text), chance, (piece) => piece + piece),
  pieceLost: (text, chance) => onMatch(text, pieces(text), chance, () => ''),
  pieceMoved: (text, chance) => {
    const all = text.match(pieces(text)) ?? [''];
    return onMatch(text, pieces(text), chance, () => chance.of(all));
  },
  unitSwapped: (text, chance) => {
    const [from, to] = chance.of(UNITS.filter(([one]) => text.includes(one)).concat([['kWh', 'kW']]));
    return text.replace(from, to);
  },
  nulInWord: (text, chance) => onMatch(text, /\w/g, chance, (letter) => `${letter}\0`),
};

/** A damaged copy of a text: one or two of its words changed. */
export function mutateTokens(text: string, chance: Chance): { text: string; names: string[] } {
  let changed = text;
  const names: string[] = [];
  for (let n = 1 + chance.below(2); n > 0; n--) {
    const name = chance.of(Object.keys(TOKEN_MUTATIONS));
    names.push(name);
    changed = TOKEN_MUTATIONS[name]!(changed, chance);
  }
  return { text: changed, names };
}

const LONG_LINE = 'x'.repeat(10_000_000);

/** A damaged copy of a file of text: by words or by bytes, or, now and then, with a line of 10 MB. */
export function mutateText(bytes: Uint8Array, chance: Chance): { bytes: Uint8Array; names: string[] } {
  const way = chance.below(300);
  if (way > 0 && way < 120) return mutate(bytes, chance);
  const text = Buffer.from(bytes).toString('latin1');
  const changed =
    way === 0
      ? { text: onMatch(text, /\w(?=\W)/g, chance, (letter) => letter + LONG_LINE), names: ['longLine'] }
      : mutateTokens(text, chance);
  return { bytes: new Uint8Array(Buffer.from(changed.text, 'latin1')), names: changed.names };
}
