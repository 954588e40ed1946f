import { operationsPerMs } from '@nightcone/contracts';
import { evaluateExpression, formatQuantity } from '@nightcone/models';
import { jobHash } from '@nightcone/provenance';
import { notesOf } from '../compute/make-record.ts';
import type { Command } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { readSpecification } from '../lib/read-specification.ts';
import { jsonHelp, jsonOption, kernelHelp, kernelOption, specificationHelp } from '../lib/shared-options.ts';

export const estimate: Command = {
  name: 'estimate',
  summary: 'What a job would cost, and whether it is inside the model’s validity. Computes nothing.',
  usage: '<file|-> [--json]',
  help: `\n${specificationHelp}\n\n${jsonHelp}\n${kernelHelp}`,
  options: { ...jsonOption, ...kernelOption },
  takes: [1, 1],
  async run(args, terminal) {
    const { specification, kernel } = await readSpecification(args, terminal);
    const model = kernel.manifest.models.find(({ id }) => id === specification.model);
    if (!model) throw new Error(`the kernel lost its model ${specification.model}`);
    const value = (name: 'sliceCount' | 'cost' | 'sliceBytes' | 'assembleBytes' | 'resultBytes') =>
      evaluateExpression(model[name], model, specification);
    const answer = {
      jobHash: await jobHash(specification),
      slices: value('sliceCount'),
      cpuMs: value('cost') / operationsPerMs,
      memoryBytes: Math.max(value('sliceBytes'), value('assembleBytes')),
      resultBytes: value('resultBytes'),
      notes: notesOf(specification),
    };
    const megabytes = (bytes: number) => formatQuantity(bytes / 1e6, 'MB', 3);
    const lines = [
      `job      ${answer.jobHash}`,
      `slices   ${answer.slices}`,
      `time     ${formatQuantity(answer.cpuMs / 1000, 's', 3)} on one core of the reference machine`,
      `memory   ${megabytes(answer.memoryBytes)}`,
      `result   ${megabytes(answer.resultBytes)}`,
      ...answer.notes.map(({ severity, text }) => `${severity}: ${text}`),
    ];
    await terminal.out(args.flag('json') ? `${JSON.stringify(answer)}\n` : `${lines.join('\n')}\n`);
    return exitCodes.done;
  },
};
