import { jsonChunks } from '@nightcone/provenance';
import { makeRecord, notesOf } from '../compute/make-record.ts';
import { type Command, wholeNumber } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { wrongInput } from '../lib/failure.ts';
import { readSpecification } from '../lib/read-specification.ts';
import { readTables } from '../lib/read-tables.ts';
import { formatOf, writeResult } from '../lib/result-file.ts';
import {
  jsonHelp,
  jsonOption,
  kernelHelp,
  kernelOption,
  specificationHelp,
  tableHelp,
  tableOption,
  threadsHelp,
  threadsOption,
} from '../lib/shared-options.ts';
import { summaryText } from '../lib/summary.ts';

export const compute: Command = {
  name: 'compute',
  summary: 'Compute a specification here, without server or network.',
  usage: '<file|-> [--json] [--out result.npz|result.json|result.csv]',
  help: `
${specificationHelp}

${jsonHelp}: jobHash, resultDigest, kernel, specification, arrays, certificate, notes
  --out FILE      write the result; the ending chooses the format. .npz and .json can be verified later
${threadsHelp}
${kernelHelp}
${tableHelp}
  --beyond-validity   compute although a validity note refuses the question`,
  options: {
    ...jsonOption,
    out: { type: 'string' },
    ...threadsOption,
    ...kernelOption,
    ...tableOption,
    'beyond-validity': { type: 'boolean' },
  },
  takes: [1, 1],
  async run(args, terminal) {
    const threads = wholeNumber(args, 'threads', 1, 256);
    const out = args.text('out');
    if (out !== undefined) formatOf(out);
    const { specification, kernel, namesKernel } = await readSpecification(args, terminal);
    const refusals = notesOf(specification).filter(({ severity }) => severity === 'refuse');
    if (refusals.length > 0 && !namesKernel && !args.flag('beyond-validity'))
      throw wrongInput(
        'validity-refused',
        refusals.map(({ text }) => text).join(' '),
        refusals.map(({ field, text, value, limit }) => ({ field, message: text, value, limit: String(limit) })),
      );
    const tables = await readTables(args, specification.tables, terminal);
    const record = await makeRecord(kernel, specification, tables, terminal, threads);
    if (out !== undefined) await writeResult(out, record);
    if (args.flag('json')) for (const chunk of jsonChunks(record)) await terminal.out(chunk);
    else await terminal.out(summaryText(record));
    return exitCodes.done;
  },
};
