#!/usr/bin/env node
import { setFlagsFromString } from 'node:v8';
import { COMMANDS, helpOf, overview } from './commands.js';

const args = process.argv.slice(2);
const wantsJson = args.includes('--json') || args.includes('--intervals');

// A reader's memory is its columns: room that grows for short-lived objects, as for other programs, would only add to it.
if (args[0] === 'read') setFlagsFromString('--semi-space-growth-factor=1');

// Whoever reads the answer may stop reading: that is no fault, and nothing is said about it.
process.stdout.on('error', endQuietly);
process.stderr.on('error', endQuietly);
process.once('SIGINT', interrupted);

process.exitCode = await run(args);

async function run([name, ...rest]: string[]): Promise<number> {
  if (name === '--help' || name === '-h' || name === 'help') return tell(overview());
  const command = name !== undefined && Object.hasOwn(COMMANDS, name) ? COMMANDS[name] : undefined;
  if (command !== undefined && rest.some((word) => word === '--help' || word === '-h')) return tell(helpOf(name!));
  try {
    if (name === '--version') return tell(`${(await import('#libs/engine/index.js')).ENGINE_VERSION}\n`);
    const { readCommandLine, usage } = await import('./command-line.js');
    if (command === undefined) {
      const { InputProblem } = await import('#libs/engine/index.js');
      const expected = `a command, one of ${Object.keys(COMMANDS).join(', ')} (--help says more)`;
      throw new InputProblem([usage(expected, name === undefined ? 'none' : JSON.stringify(name))]);
    }
    const line = readCommandLine(name!, command, rest);
    return await (await command.load()).run(line);
  } catch (error) {
    const { tellFailure } = await import('./failure.js');
    return tellFailure(error, wantsJson);
  }
}

async function tell(text: string): Promise<number> {
  process.stdout.write(text);
  return 0;
}

function endQuietly(error: Error & { code?: string }): void {
  if (error.code === 'EPIPE') process.exit();
  process.stderr.write(`fault: the answer can't be written: ${error.message}\n`);
  process.exit(1);
}

async function interrupted(): Promise<void> {
  if (wantsJson) {
    const { tellInterruption } = await import('./failure.js');
    tellInterruption();
  }
  process.exit(130);
}
