import { compileFormula, FormulaFault, type ProblemCode } from '#libs/engine/index.js';
import { listAt, numberAt, partAt, type Readable, type RuleBreach, repeatsIn, textAt } from './rule-breach.js';
import { shown } from './shown.js';
import { partitionBreach } from './tariff-partition.js';

/**
 * What the parts of a tariff have to do with each other: names that must exist, alternatives, orders, partitions.
 * @param tariff what was readable of it
 * @returns every rule that is broken, paths from the tariff
 */
export function tariffRules(tariff: Readable): RuleBreach[] {
  const windows = listAt(tariff, 'windows');
  const clauses = listAt(tariff, 'clauses');
  const clauseNames = clauses.map((clause) => textAt(clause, 'name'));
  return [
    ...uniqueNames(windows, 'windows'),
    ...uniqueNames(clauses, 'clauses'),
    ...clauses.flatMap((clause, index) =>
      clauseRules(clause, windows, clauseNames.slice(0, index)).map((breach) => ({
        ...breach,
        path: ['clauses', index, ...breach.path],
      })),
    ),
  ];
}

function uniqueNames(list: unknown[], key: string): RuleBreach[] {
  return repeatsIn(list.map((entry) => textAt(entry, 'name'))).map(({ index, value }) => ({
    code: 'inconsistent',
    path: [key, index, 'name'],
    expected: 'each name once',
    found: `${shown(value)} again`,
  }));
}

function clauseRules(clause: Readable, windows: unknown[], earlier: (string | undefined)[]): RuleBreach[] {
  return [
    ...namesOfWindows(clause, windows),
    ...appliesTo(clause, earlier),
    ...priceForms(clause),
    ...needs(clause),
    ...ascending(listAt(clause, 'blocks'), 'blocks', 'upTo'),
    ...ascending(listAt(clause, 'tiers'), 'tiers', 'aboveRatio'),
    ...openEnd(listAt(clause, 'blocks')),
    ...scaleRules(partAt(clause, 'scale')),
    ...partitionBreach(clause, windows),
    ...formulaBreach(clause, windows),
  ];
}

const FORMULA_CODES: Record<FormulaFault['kind'], ProblemCode> = {
  unreadable: 'unreadable',
  'unknown-name': 'inconsistent',
  'too-large': 'too-large',
};

function formulaBreach(clause: Readable, windows: unknown[]): RuleBreach[] {
  const expression = textAt(clause, 'expression');
  if (partAt(clause, 'kind') !== 'formula' || expression === undefined) return [];
  try {
    compileFormula(
      expression,
      windows.flatMap((window) => textAt(window, 'name') ?? []),
    );
    return [];
  } catch (fault) {
    if (!(fault instanceof FormulaFault)) throw fault;
    const { kind, expected, found } = fault;
    return [{ code: FORMULA_CODES[kind], path: ['expression'], expected, found }];
  }
}

function namesOfWindows(clause: Readable, windows: unknown[]): RuleBreach[] {
  const known = windows.map((window) => textAt(window, 'name'));
  const expected = `the name of a window: ${known.map(shown).join(', ') || 'the tariff has none'}`;
  const listed = listAt(clause, 'windows').map((name, index) => ({ name, path: ['windows', index] as PropertyKey[] }));
  const priced = Object.keys((partAt(clause, 'prices') as object | undefined) ?? {}).map((name) => ({
    name: name as unknown,
    path: ['prices', name] as PropertyKey[],
  }));
  return [...listed, ...priced]
    .filter(({ name }) => typeof name === 'string' && !known.includes(name))
    .map(({ name, path }) => ({ code: 'inconsistent', path, expected, found: shown(name) }));
}

function appliesTo(clause: Readable, earlier: (string | undefined)[]): RuleBreach[] {
  return listAt(clause, 'applies').flatMap((name, index) =>
    typeof name !== 'string' || earlier.includes(name)
      ? []
      : [
          {
            code: 'inconsistent' as const,
            path: ['applies', index],
            expected: `the name of an earlier clause: ${earlier.map(shown).join(', ') || 'there is none'}`,
            found: shown(name),
          },
        ],
  );
}

/** The ways each kind may be priced; exactly one of them stands. */
const PRICE_FORMS: Record<string, string[]> = {
  energy: ['pricePerUnit', 'prices', 'blocks'],
  demand: ['pricePerUnit', 'prices'],
  kvarhBeyondRatio: ['pricePerUnit', 'tiers'],
};

function priceForms(clause: Readable): RuleBreach[] {
  const kind = textAt(clause, 'kind') ?? '';
  const forms = Object.hasOwn(PRICE_FORMS, kind) ? (PRICE_FORMS[kind] ?? []) : [];
  const given = forms.filter((form) => partAt(clause, form) !== undefined);
  const wanted = `one of ${forms.join(', ')}`;
  if (forms.length === 0 || given.length === 1) return [];
  if (given.length === 0) return [{ code: 'missing', path: [forms[0]!], expected: wanted, found: 'nothing' }];
  return [{ code: 'inconsistent', path: [given[1]!], expected: wanted, found: given.join(' and ') }];
}

function needs(clause: Readable): RuleBreach[] {
  const breaches: RuleBreach[] = [];
  const need = (when: boolean, key: string, expected: string) => {
    if (when && partAt(clause, key) === undefined)
      breaches.push({ code: 'missing', path: [key], expected, found: 'nothing' });
  };
  const isKvarh = partAt(clause, 'kind') === 'kvarhBeyondRatio';
  need(partAt(clause, 'basis') === 'kWOrKvaShare', 'kvaShare', 'the share of the kVA that counts, such as 0.9');
  need(isKvarh && partAt(clause, 'pricePerUnit') !== undefined, 'freeRatio', 'the kvarh a kWh that are free');
  need(partAt(clause, 'byWindow') === true, 'windows', 'the windows to form the ratio in');
  if (isKvarh && partAt(clause, 'tiers') !== undefined && partAt(clause, 'freeRatio') !== undefined) {
    const expected = 'nothing: the first of tiers says what is free';
    breaches.push({ code: 'inconsistent', path: ['freeRatio'], expected, found: shown(partAt(clause, 'freeRatio')) });
  }
  return breaches;
}

function ascending(list: unknown[], key: string, field: string, sign: 1 | -1 = 1): RuleBreach[] {
  return list.flatMap((entry, index) => {
    const value = numberAt(entry, field);
    const before = index === 0 ? Number.NaN : numberAt(list[index - 1], field);
    if (!((value - before) * sign <= 0)) return [];
    const expected = `${sign > 0 ? 'more' : 'less'} than the entry before, ${before}`;
    return [{ code: 'inconsistent' as const, path: [key, index, field], expected, found: `${value}` }];
  });
}

/** Blocks run on without end: the last has no upper end, every other one has. */
function openEnd(blocks: unknown[]): RuleBreach[] {
  return blocks.flatMap((block, index) => {
    const upTo = partAt(block, 'upTo');
    const isLast = index === blocks.length - 1;
    if (upTo === undefined || isLast === (upTo === null)) return [];
    const expected = isLast
      ? 'null: the last block has no upper end'
      : 'a number: only the last block has no upper end';
    return [{ code: 'inconsistent' as const, path: ['blocks', index, 'upTo'], expected, found: shown(upTo) }];
  });
}

function scaleRules(scale: Readable): RuleBreach[] {
  const reference = numberAt(scale, 'reference');
  const breaches = [
    ...ascending([{ downTo: reference }, ...listAt(scale, 'below')], 'below', 'downTo', -1).map(oneEarlier),
    ...ascending([{ upTo: reference }, ...listAt(scale, 'above')], 'above', 'upTo').map(oneEarlier),
    ...ascending(listAt(scale, 'steps'), 'steps', 'from'),
  ];
  const minPct = numberAt(scale, 'minPct');
  const maxPct = numberAt(scale, 'maxPct');
  if (minPct > maxPct) {
    const expected = `at most maxPct, ${maxPct}`;
    breaches.push({ code: 'inconsistent', path: ['minPct'], expected, found: `${minPct}`, unit: '%' });
  }
  return breaches.map((breach) => ({ ...breach, path: ['scale', ...breach.path] }));
}

/** The reference was put in front of the bands to be compared with the first. */
function oneEarlier(breach: RuleBreach): RuleBreach {
  const [key, index, ...rest] = breach.path;
  return { ...breach, path: [key!, Number(index) - 1, ...rest] };
}
