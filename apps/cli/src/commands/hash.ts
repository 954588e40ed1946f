import { canonicalText, jobHash, questionDigest } from '@nightcone/provenance';
import type { Command } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { readSpecification } from '../lib/read-specification.ts';
import { jsonOption, kernelHelp, kernelOption, specificationHelp } from '../lib/shared-options.ts';

export const hash: Command = {
  name: 'hash',
  summary: 'The job hash of a specification.',
  usage: '<file|-> [--canonical | --json]',
  help: `
${specificationHelp}

  --canonical     print the canonical text that the hash is taken of, without a line end
  --json          print { jobHash, questionDigest, canonicalText }
${kernelHelp}`,
  options: { canonical: { type: 'boolean' }, ...jsonOption, ...kernelOption },
  takes: [1, 1],
  async run(args, terminal) {
    const { specification, kernel } = await readSpecification(args, terminal);
    const text = canonicalText(specification);
    const digest = await jobHash(specification);
    if (args.flag('canonical')) await terminal.out(text);
    else if (args.flag('json')) {
      const question = await questionDigest(kernel.manifest, specification);
      await terminal.out(`${JSON.stringify({ jobHash: digest, questionDigest: question, canonicalText: text })}\n`);
    } else await terminal.out(`${digest}\n`);
    return exitCodes.done;
  },
};
