/** A source of chance that gives the same sequence for the same seed. */
export class Chance {
  #state: number;

  constructor(seed: number) {
    this.#state = (seed % 2_147_483_646) + 1;
  }

  /** Whole number from 0 up to `limit`, exclusive. */
  below(limit: number): number {
    this.#state = (this.#state * 48_271) % 2_147_483_647;
    return this.#state % limit;
  }

  of<T>(list: readonly T[]): T {
    return list[this.below(list.length)]!;
  }
}

type Mutation = (bytes: Uint8Array, chance: Chance) => Uint8Array;

const text = (bytes: Uint8Array) => Buffer.from(bytes).toString('latin1');
const bytesOf = (content: string) => new Uint8Array(Buffer.from(content, 'latin1'));

function onLines(change: (lines: string[], chance: Chance) => string[]): Mutation {
  return (bytes, chance) => bytesOf(change(text(bytes).split('\n'), chance).join('\n'));
}

/** Puts something else into a cell of a row of data. */
function onCell(change: (cell: string, chance: Chance) => string): Mutation {
  return onLines((lines, chance) => {
    const at = 1 + chance.below(Math.max(1, lines.length - 1));
    const delimiter = /[;,\t|]/.exec(lines[at] ?? '')?.[0] ?? ',';
    const cells = (lines[at] ?? '').split(delimiter);
    const cell = chance.below(cells.length);
    cells[cell] = change(cells[cell]!, chance);
    return lines.with(at % lines.length, cells.join(delimiter));
  });
}

/** Ways in which files are damaged, by name. */
export const MUTATIONS: Record<string, Mutation> = {
  bitFlips: (bytes, chance) => {
    const changed = bytes.slice();
    for (let n = 1 + chance.below(4); n > 0; n--) changed[chance.below(changed.length)]! ^= 1 << chance.below(8);
    return changed;
  },
  headerBitFlip: (bytes, chance) => {
    const changed = bytes.slice();
    changed[chance.below(Math.min(120, changed.length))]! ^= 1 << chance.below(8);
    return changed;
  },
  splice: (bytes, chance) => {
    const from = chance.below(bytes.length);
    const piece = bytes.slice(from, from + 1 + chance.below(400));
    const at = chance.below(bytes.length);
    const drop = chance.below(2) * piece.length;
    return Uint8Array.from([...bytes.subarray(0, at), ...piece, ...bytes.subarray(Math.min(bytes.length, at + drop))]);
  },
  truncate: (bytes, chance) => bytes.slice(0, chance.below(bytes.length)),
  cutOut: (bytes, chance) => {
    const from = chance.below(bytes.length);
    return Uint8Array.from([...bytes.subarray(0, from), ...bytes.subarray(from + 1 + chance.below(60))]);
  },
  repeatRows: onLines((lines, chance) => {
    const from = chance.below(lines.length);
    const piece = lines.slice(from, from + 1 + chance.below(6));
    const at = chance.below(lines.length);
    return [...lines.slice(0, at), ...piece, ...lines.slice(at)];
  }),
  dropRows: onLines((lines, chance) => {
    const from = 1 + chance.below(lines.length - 1);
    return [...lines.slice(0, from), ...lines.slice(from + 1 + chance.below(5))];
  }),
  swapRows: onLines((lines, chance) => {
    const a = chance.below(lines.length);
    const b = chance.below(lines.length);
    return lines.with(a, lines[b]!).with(b, lines[a]!);
  }),
  hugeNumber: onCell((_, chance) =>
    chance.of(['9'.repeat(1 + chance.below(400)), '1e308', '1e309', `0.${'3'.repeat(200)}`, '1e-400']),
  ),
  noNumber: onCell((_, chance) =>
    chance.of(['NaN', 'Inf', '-Infinity', 'Infinity', 'abc', '0x1F', '1/2', '', 'NA', '-', '12:30']),
  ),
  otherMark: onCell((cell, chance) => (chance.below(2) === 0 ? cell.replace('.', ',') : cell.replace(',', '.'))),
  longDecimals: onCell((cell) => `${cell}${/[.,]/.test(cell) ? '' : '.'}000000000000000001`),
  quoteMark: onCell((cell, chance) => chance.of([`"${cell}"`, `"${cell}`, `${cell}"`, `"${cell}""x"`, `"${cell}" x`])),
  nul: onCell((cell) => `${cell}\0`),
  blanks: onCell((cell, chance) => chance.of([` ${cell}`, `${cell} `, `${cell}\t`, `\u00a0${cell}`])),
  longLine: onCell((cell, chance) => `${cell}${'x'.repeat(chance.of([1000, 70_000, 1_200_000]))}`),
  shuffleHeader: (bytes, chance) => {
    const [header = '', ...rows] = text(bytes).split('\n');
    const delimiter = /[;,\t|]/.exec(header)?.[0] ?? ',';
    const names = header.trimEnd().split(delimiter);
    const a = chance.below(names.length);
    const b = chance.below(names.length);
    return bytesOf([names.with(a, names[b]!).with(b, names[a]!).join(delimiter), ...rows].join('\n'));
  },
  swapUnits: (bytes, chance) => {
    const [from, to] = chance.of([
      ['kWh', 'kW'],
      ['kW', 'MW'],
      ['kvarh', 'kvar'],
      ['kvar', 'Mvar'],
      ['kW', 'kvar'],
      ['kvar', 'kW'],
      ['kW', 'W'],
      ['kW', 'kVA'],
      ['kW', 'hp'],
    ] as const);
    return bytesOf(text(bytes).replace(from, to));
  },
  doubleDelimiter: onCell((cell, chance) => `${cell}${chance.of([',', ';', '\t', '\r', '\n'])}`),
};

/** A damaged copy of a file: one to three mutations. */
export function mutate(bytes: Uint8Array, chance: Chance): { bytes: Uint8Array; names: string[] } {
  let changed = bytes;
  const names: string[] = [];
  for (let n = 1 + Math.floor(chance.below(6) / 3); n > 0 && changed.length > 1; n--) {
    const name = chance.of(Object.keys(MUTATIONS));
    names.push(name);
    changed = MUTATIONS[name]!(changed, chance);
  }
  return { bytes: changed, names };
}
