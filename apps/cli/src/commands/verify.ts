import { compareResults, jobHash, resultDigest } from '@nightcone/provenance';
import { makeRecord } from '../compute/make-record.ts';
import { type Command, wholeNumber } from '../lib/command.ts';
import { comparisonText } from '../lib/comparison-text.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { findKernel } from '../lib/find-kernel.ts';
import { completeSpecification } from '../lib/read-specification.ts';
import { readTables } from '../lib/read-tables.ts';
import { readResult } from '../lib/result-file.ts';
import {
  jsonHelp,
  jsonOption,
  kernelHelp,
  kernelOption,
  tableHelp,
  tableOption,
  threadsHelp,
  threadsOption,
} from '../lib/shared-options.ts';

export const verify: Command = {
  name: 'verify',
  summary: 'Compute the job of a result file again and compare every bit.',
  usage: '<result.npz|result.json> [--json]',
  help: `
Three things must hold: the specification has the recorded job hash, the arrays have the recorded result digest, and
computing again with the named kernel gives that digest. Exit code 4 where one does not.

${jsonHelp}
${threadsHelp}
${kernelHelp}
${tableHelp}`,
  options: { ...jsonOption, ...threadsOption, ...kernelOption, ...tableOption },
  takes: [1, 1],
  async run(args, terminal) {
    const threads = wholeNumber(args, 'threads', 1, 256);
    const recorded = await readResult(args.positionals[0] ?? '');
    const kernel = await findKernel(recorded.specification.kernel, args.text('kernel'));
    const specification = completeSpecification(kernel, recorded.specification);
    const tables = await readTables(args, specification.tables, terminal);
    // the specification as it stands in the file: what was completed or mended just now would be another text
    const claims = {
      jobHash: (await jobHash(recorded.specification)) === recorded.jobHash,
      arrays: (await resultDigest(recorded.result)) === recorded.resultDigest,
    };
    const again = await makeRecord(kernel, specification, tables, terminal, threads);
    const bits = again.resultDigest === recorded.resultDigest && again.jobHash === recorded.jobHash;
    const comparison = compareResults(recorded.result, again.result);
    const reproduced = claims.jobHash && claims.arrays && bits;
    if (args.flag('json')) {
      const expected = recorded.resultDigest;
      const answer = {
        reproduced,
        jobHash: recorded.jobHash,
        expected,
        computed: again.resultDigest,
        claims,
        comparison,
      };
      await terminal.out(`${JSON.stringify(answer)}\n`);
    } else {
      const lines = [
        `job     ${recorded.jobHash}  ${claims.jobHash ? 'the hash of its specification' : 'NOT the hash of its specification'}`,
        `result  ${recorded.resultDigest}  ${claims.arrays ? 'the digest of its arrays' : 'NOT the digest of its arrays'}`,
        `again   ${again.resultDigest}  ${bits ? 'identical' : 'DIFFERENT'}`,
        reproduced ? 'reproduced: every bit is the same' : 'not reproduced',
      ];
      await terminal.out(`${lines.join('\n')}\n${comparison.identical ? '' : comparisonText(comparison)}`);
    }
    return reproduced ? exitCodes.done : exitCodes.notReproduced;
  },
};
