import { KernelRefusal } from '@nightcone/kernel';
import { nearestName } from '@nightcone/models';
import { commands } from './commands/index.ts';
import { type Command, helpText, readArguments, type Terminal } from './lib/command.ts';
import { exitCodes } from './lib/exit-codes.ts';
import { CommandFailure, wrongInput } from './lib/failure.ts';

const overview = () => `Nightcone: computations on Dirac materials that reproduce by their hash.

Usage: nightcone <command> [arguments]

${commands.map(({ name, summary }) => `  ${name.padEnd(11)}${summary}`).join('\n')}

Exit codes: 0 done, 1 failed, 2 wrong input (a problem document on standard error), 3 the kernel refused or did not
converge, 4 not reproduced. \`nightcone <command> --help\` tells more.
`;

/** Runs one command line; returns its exit code and never throws. */
export async function runCommand(argv: readonly string[], terminal: Terminal): Promise<number> {
  const [name, ...rest] = argv;
  try {
    if (name === undefined || name === '--help' || name === '-h' || name === 'help') {
      await terminal.out(overview());
      return name === undefined ? exitCodes.wrongInput : exitCodes.done;
    }
    const command = commands.find((each) => each.name === name) ?? unknownCommand(name);
    if (rest.includes('--help') || rest.includes('-h')) {
      await terminal.out(helpText(command));
      return exitCodes.done;
    }
    return await command.run(readArguments(command, rest), terminal);
  } catch (error) {
    return report(error, terminal);
  }
}

function unknownCommand(name: string): Command {
  const nearest = nearestName(
    name,
    commands.map((command) => command.name),
  );
  throw wrongInput('invalid-input', `There is no command “${name}”; the nearest is ${nearest}. See nightcone --help.`);
}

function report(error: unknown, terminal: Terminal): number {
  if (error instanceof CommandFailure) {
    terminal.err(error.problem ? `${JSON.stringify(error.problem, undefined, 2)}\n` : `${error.message}\n`);
    return error.exitCode;
  }
  if (error instanceof KernelRefusal) {
    terminal.err(`${error.status}: ${error.message}\n`);
    return exitCodes.refused;
  }
  terminal.err(`${error instanceof Error ? `${error.name}: ${error.message}` : String(error)}\n`);
  return exitCodes.failed;
}
