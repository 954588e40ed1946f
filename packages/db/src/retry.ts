import { setTimeout as wait } from 'node:timers/promises';

/** drizzle wraps what the driver threw: the cause has the code. */
const driverError = (error: unknown): { code?: string; message?: string } =>
  (error instanceof Error && error.cause instanceof Error ? error.cause : error) as { code?: string; message?: string };
const codeOf = (error: unknown): string => driverError(error).code ?? '';
/** The driver's own errors have no code; neither has a programming error, which no repetition mends. */
const saysConnection = (error: unknown): boolean =>
  /connection|timeout|not queryable/i.test(driverError(error).message ?? '');

/** The connection was lost, or the server is starting, stopping or gone: the same statement may work later. */
export const isTransient = (error: unknown): boolean => {
  const code = codeOf(error);
  // five characters are an SQLSTATE: of those only lost connections (08…) and operator intervention (57P…) pass by themselves
  return code.length === 5 && /^[0-9A-Z]{5}$/.test(code)
    ? /^(08|57P)/.test(code)
    : (code === '' && saysConnection(error)) || /^E[A-Z]+$/.test(code);
};

/** A deadlock or a serialisation failure: the whole transaction may be tried again at once. */
export const isConflict = (error: unknown): boolean => /^(40P01|40001)$/.test(codeOf(error));

/** Repeats `work`, which must be safe to repeat, until it ends in another way than by a lost connection or a deadlock. */
export async function retry<T>(
  work: () => Promise<T>,
  onError: (error: Error) => void,
  signal?: AbortSignal,
): Promise<T> {
  for (let delay = 50; ; delay = Math.min(2_000, delay * 2)) {
    try {
      return await work();
    } catch (error) {
      if (signal?.aborted || !(isTransient(error) || isConflict(error))) throw error;
      onError(error as Error);
      await wait(delay * (0.5 + Math.random()));
    }
  }
}
