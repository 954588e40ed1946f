import { loadKernelBytes } from '@nightcone/kernel/node';
import type { Specification } from '@nightcone/models';
import { makeRecord } from '../compute/make-record.ts';
import { type Arguments, type Command, type Terminal, wholeNumber } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { CommandFailure } from '../lib/failure.ts';
import { completeSpecification } from '../lib/read-specification.ts';
import { readTables } from '../lib/read-tables.ts';
import { tableHelp, tableOption, threadsHelp, threadsOption } from '../lib/shared-options.ts';
import { readAccount } from '../server/account-file.ts';
import { ApiClient } from '../server/api-client.ts';
import { askUntil, changedLines } from '../server/wait-for.ts';

export const reproduce: Command = {
  name: 'reproduce',
  summary: 'Compute a job of the server again and compare its bits.',
  usage: '<job hash> [--here]',
  help: `
By default the server runs the job again on its queue. With --here this machine does, with the kernel that the job
names, downloaded and checked by its digest. Exit code 4 where the bits differ.

  --here          compute on this machine
${threadsHelp}
${tableHelp}`,
  options: { here: { type: 'boolean' }, ...threadsOption, ...tableOption },
  takes: [1, 1],
  async run(args, terminal) {
    const hash = args.positionals[0] ?? '';
    const client = new ApiClient(await readAccount(terminal.env));
    return args.flag('here') ? reproduceHere(client, hash, args, terminal) : reproduceThere(client, hash, terminal);
  },
};

async function reproduceThere(client: ApiClient, hash: string, terminal: Terminal): Promise<number> {
  const { executionId } = await client.call('rerunJob', { params: { hash } });
  const tell = changedLines(terminal);
  const execution = await askUntil(
    () => client.call('getExecution', { params: { id: executionId } }),
    ({ state }) => state !== 'running',
    ({ state, progress }) => tell(`${state}: ${progress.done} of ${progress.total} slices`),
  );
  if (execution.state !== 'finished') {
    terminal.err(`${execution.state}: ${execution.failure?.text ?? 'no reason given'}\n`);
    return execution.state === 'failed' ? exitCodes.refused : exitCodes.failed;
  }
  return verdict(execution.bits === 'identical', execution.resultDigest ?? '', terminal);
}

async function reproduceHere(client: ApiClient, hash: string, args: Arguments, terminal: Terminal): Promise<number> {
  const threads = wholeNumber(args, 'threads', 1, 256);
  const job = await client.call('getJob', { params: { hash } });
  if (job.resultDigest === null)
    throw new CommandFailure(exitCodes.failed, `The job is ${job.state}; there is nothing to compare with yet.`);
  const kernel = await loadKernelBytes(await client.download('getKernelModule', { params: { digest: job.kernel } }));
  if (kernel.digest !== job.kernel)
    throw new CommandFailure(exitCodes.notReproduced, `The server sent another kernel than ${job.kernel}.`);
  const specification = completeSpecification(kernel, job.specification as Specification | null);
  const tables = await readTables(args, specification.tables, terminal);
  const record = await makeRecord(kernel, specification, tables, terminal, threads);
  if (record.jobHash !== hash)
    throw new CommandFailure(exitCodes.notReproduced, `The server's specification has the hash ${record.jobHash}.`);
  return verdict(record.resultDigest === job.resultDigest, record.resultDigest, terminal);
}

async function verdict(identical: boolean, digest: string, terminal: Terminal): Promise<number> {
  await terminal.out(`${identical ? 'identical' : 'different'}  ${digest}\n`);
  return identical ? exitCodes.done : exitCodes.notReproduced;
}
