/** What a unit measures. */
export type UnitFamily = 'active' | 'reactive' | 'apparent' | 'voltage' | 'current';

/** A unit as it stands in a header, and how it becomes kW, kvar, kVA, V or A: value × times ÷ over. */
export interface ReadUnit {
  family: UnitFamily;
  /** an energy of the interval, not a mean power */
  energy: boolean;
  times: number;
  over: number;
  /** a small m that can only mean mega, because the whole unit is in small letters */
  smallMega: boolean;
}

const SYMBOL = /^([kmg]?)(w|var|va|v|a)(h|hr|hrs)?$/;
const SPELLED =
  /^(kilo|mega|giga)?(watt|var|voltamperereactive|voltampereactive|voltampere|voltamp|volt|ampere|amp)s?(hour|hours|hr|hrs|h|stunde|stunden|heure|heures|hora|horas)?$/;
const FAMILIES: Record<string, UnitFamily> = {
  w: 'active',
  watt: 'active',
  var: 'reactive',
  voltamperereactive: 'reactive',
  voltampereactive: 'reactive',
  va: 'apparent',
  voltampere: 'apparent',
  voltamp: 'apparent',
  v: 'voltage',
  volt: 'voltage',
  a: 'current',
  ampere: 'current',
  amp: 'current',
};
const PREFIXES: Record<string, number> = { k: 1, kilo: 1, m: 2, mega: 2, g: 3, giga: 3 };

/**
 * Reads a unit in any SI prefix and letter case.
 * @param text the unit alone, such as kWh, KVARh, kW·h, MVAr or kilowatt hours
 * @returns the unit, or null where the text is none; a milliwatt is none
 */
export function readUnit(text: string): ReadUnit | null {
  const stripped = text.replace(/(?<!\s)\s*\/\s*(?:\d+\s*)?(?:min|minutes?|h|hour|interval|period)$/i, '');
  const perTime = stripped !== text;
  const bare = stripped.replace(/[\s.·⋅*-]/g, '');
  const parts = SYMBOL.exec(bare.toLowerCase()) ?? SPELLED.exec(bare.toLowerCase());
  if (parts === null) return null;
  const [, prefix = '', base = '', hours] = parts;
  const family = FAMILIES[base]!;
  if (perTime && hours === undefined) return null;
  if ((family === 'voltage' || family === 'current') && hours !== undefined) return null;
  const small = prefix === 'm' && bare.startsWith('m');
  if (small && bare !== bare.toLowerCase()) return null;
  const power = PREFIXES[prefix] ?? 0;
  const wanted = family === 'voltage' || family === 'current' ? 0 : 1;
  return {
    family,
    energy: hours !== undefined,
    times: power > wanted ? 1000 ** (power - wanted) : 1,
    over: power < wanted ? 1000 : 1,
    smallMega: small,
  };
}

/**
 * Finds the unit in a column name: in any bracket, behind an underscore, or as a word of its own.
 * @param name a cell of the header row
 * @returns the unit and the name without it
 */
export function findUnit(name: string): { unit: ReadUnit | null; rest: string } {
  for (const [whole, content] of name.matchAll(/[([{<]([^()[\]{}<>]*)[)\]}>]/g)) {
    const unit = readUnit(content ?? '');
    if (unit !== null) return { unit, rest: name.replace(whole, ' ') };
  }
  const pieces = name.split(/[^\p{L}\p{N}.·⋅*/%°-]+/u).filter((piece) => piece !== '');
  const spots = [3, 2, 1].flatMap((size) =>
    Array.from({ length: Math.max(0, pieces.length - size + 1) }, (_, back) => ({
      at: pieces.length - size - back,
      size,
    })),
  );
  for (const { at, size } of spots) {
    const piece = pieces.slice(at, at + size).join(' ');
    const unit = piece.length > 1 ? readUnit(piece) : null;
    if (unit !== null) return { unit, rest: [...pieces.slice(0, at), ...pieces.slice(at + size)].join(' ') };
  }
  return singleLetter(name) ?? tailUnit(name);
}

/** Single letters are units only alone or at the end behind an underscore: “phase A” and “a” are words too. */
function singleLetter(name: string): { unit: ReadUnit | null; rest: string } | null {
  const letter = /^(?:|.*_)([VWA])$/i.exec(name.trim())?.[1];
  return letter === undefined ? null : { unit: readUnit(letter), rest: name.trim().slice(0, -1) };
}

/** Behind a word of some length; with a prefix, or behind a letter that can't be one. */
const PREFIXED_TAIL = /\p{L}{2}[\p{Ll}\d]([kKMG](?:[Ww]h?|[Vv][Aa][Rr]h?))$/u;
const BARE_TAIL = /\p{L}{2}[abcdefhijlopqrsvwxyz\d](Wh?|Varh?|V)$/u;

/** Names such as activePowerKw. */
function tailUnit(name: string): { unit: ReadUnit | null; rest: string } {
  const tail = PREFIXED_TAIL.exec(name) ?? BARE_TAIL.exec(name);
  const unit = tail === null ? null : readUnit(tail[1]!);
  return unit === null ? { unit, rest: name } : { unit, rest: name.slice(0, -tail![1]!.length) };
}
