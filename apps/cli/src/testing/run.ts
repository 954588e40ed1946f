import { runCommand } from '../run-command.ts';

export interface Ran {
  exitCode: number;
  out: string;
  err: string;
  /** The problem document on standard error. */
  problem(): { code: string; detail: string; errors?: { field: string; message: string }[] };
}

/** Runs a command line in this process, with what it writes collected. */
export async function run(
  argv: string[],
  { stdin = '', env = {} }: { stdin?: unknown; env?: object } = {},
): Promise<Ran> {
  let out = '';
  let err = '';
  const exitCode = await runCommand(argv, {
    out: async (data) => {
      out += typeof data === 'string' ? data : new TextDecoder().decode(data);
    },
    err: (text) => {
      err += text;
    },
    stdin: async () => (typeof stdin === 'string' ? stdin : JSON.stringify(stdin)),
    env: { ...env },
    showsProgress: false,
  });
  return { exitCode, out, err, problem: () => JSON.parse(err) };
}
