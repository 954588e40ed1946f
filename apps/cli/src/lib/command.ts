import { type ParseArgsConfig, parseArgs } from 'node:util';
import { wrongInput } from './failure.ts';

/** Where a command reads and writes, so that tests need no process. */
export interface Terminal {
  /** Resolves when the text has been taken, so that a large result never fills the memory. */
  out(text: string | Uint8Array): Promise<void>;
  err(text: string): void;
  stdin(): Promise<string>;
  env: Record<string, string | undefined>;
  /** Progress is shown on standard error when that is a terminal. */
  showsProgress: boolean;
}

type Options = NonNullable<ParseArgsConfig['options']>;
export interface Arguments {
  positionals: string[];
  flag(name: string): boolean;
  text(name: string): string | undefined;
  texts(name: string): string[];
}

export interface Command {
  name: string;
  summary: string;
  /** After the command's name, e.g. `<file|-> [--json]`. */
  usage: string;
  /** What --help says below the usage. */
  help: string;
  options: Options;
  /** Least and most positional arguments. */
  takes: [least: number, most: number];
  /** Returns the exit code. */
  run(args: Arguments, terminal: Terminal): Promise<number>;
}

/** Reads the arguments of a command; throws wrong input that names the option or the count. */
export function readArguments(command: Command, argv: string[]): Arguments {
  let parsed: ReturnType<typeof parseArgs>;
  try {
    parsed = parseArgs({ args: argv, options: command.options, allowPositionals: true, strict: true });
  } catch (error) {
    throw wrongInput('invalid-input', `${(error as Error).message} See nightcone ${command.name} --help.`);
  }
  const { positionals, values } = parsed;
  const [least, most] = command.takes;
  if (positionals.length < least || positionals.length > most)
    throw wrongInput('invalid-input', `Usage: nightcone ${command.name} ${command.usage}`);
  const all = (name: string) => [values[name] ?? []].flat();
  return {
    positionals,
    flag: (name) => all(name).includes(true),
    text: (name) => all(name).findLast((value) => typeof value === 'string'),
    texts: (name) => all(name).filter((value) => typeof value === 'string'),
  };
}

/** A whole number option, e.g. --threads. */
export function wholeNumber(args: Arguments, name: string, least: number, most: number): number | undefined {
  const text = args.text(name);
  if (text === undefined) return undefined;
  const value = Number(text);
  if (!Number.isInteger(value) || value < least || value > most)
    throw wrongInput('invalid-input', `--${name} is “${text}”; it must be a whole number from ${least} to ${most}.`);
  return value;
}

export const helpText = ({ name, usage, summary, help }: Command) =>
  `${summary}\n\nUsage: nightcone ${name} ${usage}\n${help === '' ? '' : `\n${help.trim()}\n`}`;
