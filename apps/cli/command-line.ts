import { parseArgs } from 'node:util';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import type { Command, CommandLine } from './command.js';

/** Standard input stands for one file only. */
export const STDIN = '-';

/**
 * Sorts the arguments of a command.
 * @param name the command's name
 * @param command what it takes
 * @param args what was typed after its name
 * @returns operand, values and flags
 * @throws InputProblem of code `usage`, naming every argument that doesn't fit
 */
export function readCommandLine(name: string, command: Command, args: string[]): CommandLine {
  const options = {
    ...Object.fromEntries(valueNames(command).map((key) => [key, { type: 'string' as const }])),
    ...Object.fromEntries(command.flags.map((key) => [key, { type: 'boolean' as const }])),
  };
  const { tokens } = parseArgs({ args, options, strict: false, allowPositionals: true, tokens: true });
  const line: CommandLine = {
    command: name,
    operand: '',
    operands: [],
    loads: [],
    values: new Map(),
    lists: new Map(),
    flags: new Set(),
  };
  const operands: string[] = [];
  const problems: Problem[] = [];
  for (const token of tokens) {
    if (token.kind === 'positional') operands.push(token.value);
    if (token.kind === 'option') problems.push(...takeOption(token, command, line));
  }
  line.loads = line.lists.get('load') ?? [line.values.get('load') ?? []].flat();
  problems.push(...operandProblems(command, operands, line), ...stdinProblems(operands, line));
  if (problems.length > 0) throw new InputProblem(problems);
  return { ...line, operand: operands[0]!, operands };
}

function takeOption(
  token: { name: string; rawName: string; value: string | undefined },
  command: Command,
  { values, lists, flags }: CommandLine,
): Problem[] {
  const { name, rawName, value } = token;
  if (values.has(name) || flags.has(name)) return [usage(`${rawName} once`, 'it twice')];
  const isList = Object.hasOwn(command.lists, name);
  if (isList || Object.hasOwn(command.values, name)) {
    const word = isList ? command.lists[name] : command.values[name];
    if (value === undefined || value === '') return [usage(`${rawName} ${word}`, 'no value')];
    if (isList) lists.set(name, [...(lists.get(name) ?? []), value]);
    else values.set(name, value);
    return [];
  }
  if (!command.flags.includes(name)) {
    const known = [...valueNames(command), ...command.flags].map((key) => `--${key}`);
    return [usage(`one of ${known.join(', ')}`, rawName)];
  }
  if (value !== undefined) return [usage(`${rawName} without a value`, JSON.stringify(value))];
  flags.add(name);
  return [];
}

function valueNames({ values, lists }: Command): string[] {
  return [...Object.keys(values), ...Object.keys(lists)];
}

function operandProblems({ operand, several }: Command, operands: string[], line: CommandLine): Problem[] {
  if (operands.length === 0) return [usage(`one ${operand}`, 'none')];
  if (several !== true) return operands.length === 1 ? [] : [usage(`one ${operand}`, operands.join(' '))];
  if (operands.length === 1) return line.loads.length <= 1 ? [] : [usage('--load once', 'it twice')];
  return severalProblems(operand, operands.length, line);
}

// What belongs to one site can't be shared out among several.
function severalProblems(operand: string, count: number, { loads, values, lists }: CommandLine): Problem[] {
  const alone = ['pdf', 'export', 'calculation', 'figures', 'extend'].filter(
    (name) => values.has(name) || lists.has(name),
  );
  return [
    ...(loads.length === count || loads.length === 0
      ? []
      : [usage(`a --load for each of the ${count} ${operand}, in their order, or none`, `${loads.length}`)]),
    ...alone.map((name) => usage(`--${name} with one ${operand} only`, `${count}`)),
  ];
}

function stdinProblems(operands: string[], { values, lists, loads }: CommandLine): Problem[] {
  const inputs = ['map', 'logo', 'before', 'before-load'].map((name) => values.get(name));
  const named = [...operands, ...loads, ...inputs, ...(lists.get('extend') ?? [])];
  const files = named.filter((file) => file === STDIN);
  const toStdin = ['pdf', 'netlist', 'export', 'calculation', 'figures', 'keep', 'site']
    .filter((name) => values.get(name) === STDIN)
    .map((name) => usage(`--${name} with the name of a file`, '"-"'));
  return files.length > 1 ? [usage('"-" for one file only', `it ${files.length} times`), ...toStdin] : toStdin;
}

/**
 * A problem with how the program was called.
 * @param expected what should have been typed
 * @param found what was
 */
export function usage(expected: string, found: string): Problem {
  return { code: 'usage', expected, found };
}
