import type { Command, Terminal } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { CommandFailure } from '../lib/failure.ts';
import { readAccount } from '../server/account-file.ts';
import { ApiClient } from '../server/api-client.ts';
import { waitForJob, waitForSubmission } from '../server/wait-for.ts';

export const follow: Command = {
  name: 'follow',
  summary: 'Wait for a job, a sweep or a submission, telling what changes.',
  usage: '<job hash | sweep id | submission id>',
  help: 'Ends with 0 when everything finished and with 3 when a job failed or was cancelled.',
  options: {},
  takes: [1, 1],
  async run(args, terminal) {
    const name = args.positionals[0] ?? '';
    const client = new ApiClient(await readAccount(terminal.env));
    return /^[0-9a-f]{64}$/.test(name) ? followJob(client, name, terminal) : followWork(client, name, terminal);
  },
};

async function followJob(client: ApiClient, hash: string, terminal: Terminal): Promise<number> {
  const job = await waitForJob(client, hash, terminal);
  if (job.resultDigest === null) {
    terminal.err(`${job.failure?.code ?? 'failed'}: ${job.failure?.text ?? 'no reason given'}\n`);
    return exitCodes.refused;
  }
  await terminal.out(`result ${job.resultDigest}${job.checkFailed ? '  check failed' : ''}\n`);
  return exitCodes.done;
}

async function followWork(client: ApiClient, id: string, terminal: Terminal): Promise<number> {
  // an id says not what it names: a sweep leads to its submission
  const submissionId = await client.call('getSweep', { params: { id } }).then(
    (sweep) => sweep.submission.id,
    (error: unknown) => {
      if (error instanceof CommandFailure && error.problem?.status === 404) return id;
      throw error;
    },
  );
  const { state, progress, unit } = await waitForSubmission(client, submissionId, terminal);
  await terminal.out(`${state}: ${progress.done} of ${progress.total} ${unit}, ${progress.failed} failed\n`);
  return state === 'done' && progress.failed === 0 ? exitCodes.done : exitCodes.refused;
}
