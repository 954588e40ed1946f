import type { Command } from '../lib/command.ts';
import { exitCodes } from '../lib/exit-codes.ts';
import { allKernels } from '../lib/find-kernel.ts';
import { jsonHelp, jsonOption } from '../lib/shared-options.ts';

export const kernels: Command = {
  name: 'kernels',
  summary: 'The kernels that can be run here without network.',
  usage: '[--json]',
  help: jsonHelp,
  options: { ...jsonOption },
  takes: [0, 0],
  async run(args, terminal) {
    const rows = (await allKernels()).map(({ digest, state, bytes, manifest }) => ({
      digest,
      version: manifest.version,
      state,
      bytes: bytes.length,
      models: manifest.models.map(({ id }) => id),
    }));
    const line = ({ digest, version, state, models }: (typeof rows)[number]) =>
      `${digest}  ${version}  ${state.padEnd(8)}  ${models.join(', ')}\n`;
    await terminal.out(args.flag('json') ? `${JSON.stringify({ rows })}\n` : rows.map(line).join(''));
    return exitCodes.done;
  },
};
