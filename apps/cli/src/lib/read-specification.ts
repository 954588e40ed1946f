import type { LoadedKernel } from '@nightcone/kernel/node';
import { parseSpecification, type Specification } from '@nightcone/models';
import type { Arguments, Terminal } from './command.ts';
import { wrongInput } from './failure.ts';
import { findKernel } from './find-kernel.ts';
import { readJson } from './read-input.ts';

/** A complete specification and the kernel it is to be computed with. */
export interface ReadSpecification {
  specification: Specification;
  kernel: LoadedKernel;
  /** The file named its kernel: an old question, whose validity notes are shown and not enforced. */
  namesKernel: boolean;
}

/** Reads, checks and completes the specification in the command's first argument. */
export async function readSpecification(args: Arguments, terminal: Terminal): Promise<ReadSpecification> {
  const input = await readJson(args.positionals[0] ?? '-', terminal);
  if (typeof input !== 'object' || input === null || Array.isArray(input))
    throw wrongInput('invalid-specification', 'The specification must be a JSON object.');
  const named = (input as { kernel?: unknown }).kernel;
  const kernel = await findKernel(named, args.text('kernel'));
  const specification = completeSpecification(kernel, { ...input, kernel: kernel.digest });
  return { specification, kernel, namesKernel: named !== undefined };
}

/** Checks a specification against a kernel; wrong input with every problem. */
export function completeSpecification(kernel: LoadedKernel, input: unknown): Specification {
  const parsed = parseSpecification(kernel.manifest, input);
  if (parsed.ok) return parsed.specification;
  const detail = parsed.problems.map(({ message }) => message).join(' ');
  throw wrongInput('invalid-specification', detail, parsed.problems);
}
