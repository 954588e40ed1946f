import { SweepInput } from '@nightcone/contracts';
import type { Arguments, Command, Terminal } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { wrongInput } from '../lib/failure.ts';
import { readJson } from '../lib/read-input.ts';
import { jsonHelp, jsonOption } from '../lib/shared-options.ts';
import { readAccount } from '../server/account-file.ts';
import { ApiClient } from '../server/api-client.ts';

export const submit: Command = {
  name: 'submit',
  summary: 'Put a job or a sweep into the server’s queue.',
  usage: '<file|-> [--tonight] [--title TEXT] [--key TEXT]',
  help: `
The file holds a specification, or a sweep: { "title", "specification", "axes": [{ "pointers", "values" or "range" }] }.
Submitting the same again computes nothing twice.

  --tonight       may start when the night window opens (default: now)
  --title TEXT    a title for lists
  --key TEXT      idempotency key: the same key gives the first answer again
${jsonHelp}`,
  options: { tonight: { type: 'boolean' }, title: { type: 'string' }, key: { type: 'string' }, ...jsonOption },
  takes: [1, 1],
  async run(args, terminal) {
    const file = await readJson(args.positionals[0] ?? '-', terminal);
    if (typeof file !== 'object' || file === null || Array.isArray(file))
      throw wrongInput('invalid-specification', 'The file must hold a JSON object.');
    const client = new ApiClient(await readAccount(terminal.env));
    return 'specification' in file
      ? submitSweep(client, file, args, terminal)
      : submitJob(client, file, args, terminal);
  },
};

const whenOf = (args: Arguments) => (args.flag('tonight') ? 'tonight' : 'now');

async function submitJob(
  client: ApiClient,
  specification: object,
  args: Arguments,
  terminal: Terminal,
): Promise<number> {
  const title = args.text('title');
  const body = { specification, when: whenOf(args), ...(title === undefined ? {} : { title }) };
  const answer = await client.call('submitJob', { body, idempotencyKey: args.text('key') });
  const already = answer.alreadyComputed ? '  (computed already)' : '';
  await terminal.out(args.flag('json') ? `${JSON.stringify(answer)}\n` : `job ${answer.hash}${already}\n`);
  return exitCodes.done;
}

async function submitSweep(client: ApiClient, file: object, args: Arguments, terminal: Terminal): Promise<number> {
  const title = args.text('title') ?? ('title' in file ? file.title : undefined);
  const asked = args.flag('tonight') || !('when' in file) ? { when: whenOf(args) } : {};
  const parsed = SweepInput.safeParse({ ...file, ...asked, title });
  if (!parsed.success) {
    const errors = parsed.error.issues.map(({ path, message }) => ({ field: `/${path.join('/')}`, message }));
    throw wrongInput('invalid-input', errors.map(({ field, message }) => `${field}: ${message}`).join('; '), errors);
  }
  const answer = await client.call('submitSweep', { body: parsed.data, idempotencyKey: args.text('key') });
  const { sweepId, submissionId, jobs, alreadyComputed } = answer;
  const text = `sweep ${sweepId}\nsubmission ${submissionId}\n${jobs} jobs, ${alreadyComputed} computed already\n`;
  await terminal.out(args.flag('json') ? `${JSON.stringify(answer)}\n` : text);
  return exitCodes.done;
}
