import { availableParallelism } from 'node:os';
import { parseArgs } from 'node:util';
import { z } from 'zod';

const Environment = z.object({
  NIGHTCONE_DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/, error: 'must be a postgres:// address' }),
  NIGHTCONE_LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
});
const Slots = z.coerce.number().int().min(1).max(1024);

export interface WorkerSettings {
  databaseUrl: string;
  logLevel: string;
  /** Threads that compute at the same time. */
  slots: number;
}

/** The worker cannot start as it was asked to. The message lists everything that is wrong and quotes no value. */
export class BadSettings extends Error {
  override name = 'BadSettings';
}

export function readSettings(args: string[], environment: Record<string, string | undefined>): WorkerSettings {
  const problems: string[] = [];
  // An empty variable is an absent one: `NAME=` in a file means "not set" to people.
  const set = Object.fromEntries(Object.entries(environment).filter(([, value]) => value));
  const env = Environment.safeParse(set);
  for (const issue of env.error?.issues ?? []) {
    const name = String(issue.path[0]);
    problems.push(`${name}: ${name in set ? issue.message : 'is not set'}`);
  }
  const slots = readSlots(args, problems);
  if (!env.success || slots === undefined)
    throw new BadSettings(`the worker cannot start:\n  ${problems.join('\n  ')}`);
  return { databaseUrl: env.data.NIGHTCONE_DATABASE_URL, logLevel: env.data.NIGHTCONE_LOG_LEVEL, slots };
}

function readSlots(args: string[], problems: string[]): number | undefined {
  try {
    const { values } = parseArgs({ args, options: { slots: { type: 'string' } } });
    const slots = Slots.safeParse(values.slots ?? availableParallelism());
    if (slots.success) return slots.data;
    problems.push('--slots: must be a whole number from 1 to 1024');
  } catch (error) {
    problems.push(error instanceof Error ? error.message : String(error));
  }
  return undefined;
}
