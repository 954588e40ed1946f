import { writeFile } from 'node:fs/promises';
import { resultDigest } from '@nightcone/provenance';
import type { Command } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { CommandFailure } from '../lib/failure.ts';
import { formatOf, readResult } from '../lib/result-file.ts';
import { readAccount } from '../server/account-file.ts';
import { ApiClient } from '../server/api-client.ts';

export const fetchResult: Command = {
  name: 'fetch',
  summary: 'Download the result of a job and check its digest.',
  usage: '<job hash> [--out FILE.npz|FILE.json|FILE.csv]',
  help: '  --out FILE      the ending chooses the format (default: the first 12 digits of the hash, .npz)',
  options: { out: { type: 'string' } },
  takes: [1, 1],
  async run(args, terminal) {
    const hash = args.positionals[0] ?? '';
    const out = args.text('out') ?? `${hash.slice(0, 12)}.npz`;
    const format = formatOf(out);
    const client = new ApiClient(await readAccount(terminal.env));
    const bytes = await client.download('exportJob', { params: { hash }, query: { format } });
    await writeFile(out, bytes);
    if (format === 'csv') {
      await terminal.out(`${out}: ${bytes.length} bytes, without a check: text for reading has no digest\n`);
      return exitCodes.done;
    }
    const record = await readResult(out);
    if (record.jobHash !== hash || (await resultDigest(record.result)) !== record.resultDigest)
      throw new CommandFailure(exitCodes.notReproduced, `${out} does not hold what its hashes say.`);
    await terminal.out(`${out}: ${bytes.length} bytes, result ${record.resultDigest}\n`);
    return exitCodes.done;
  },
};
