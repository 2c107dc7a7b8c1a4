/** What was typed after the program's name. */
export interface CommandLine {
  command: string;
  /** the first, or the only one */
  operand: string;
  operands: string[];
  /** meter files beside the operands, in their order */
  loads: string[];
  values: Map<string, string>;
  /** values of options that may stand several times, in the order they were typed */
  lists: Map<string, string[]>;
  flags: Set<string>;
}

/** How a command is called and where it stands. */
export interface Command {
  /** what its operand is */
  operand: string;
  /** it takes several operands, each with a --load of its own */
  several?: boolean;
  /** options that take a value, with a word for it */
  values: Record<string, string>;
  /** options that take a value and may stand several times */
  lists: Record<string, string>;
  /** options that don't */
  flags: readonly string[];
  /** one line */
  does: string;
  details: string;
  /** The command's own file, loaded when it is called; `run` gives the exit code. */
  load(): Promise<{ run(line: CommandLine): Promise<number> }>;
}
