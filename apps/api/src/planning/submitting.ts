import { createHash } from 'node:crypto';
import { IdempotencyMismatch, QuotaExceeded } from '@nightcone/db';
import { Refusal } from '../refusal.ts';

/** What a key stands for: the endpoint and the body as it was read. */
export function idempotency(key: string | undefined, endpoint: string, body: unknown) {
  if (key === undefined) return null;
  return { key, requestHash: createHash('sha256').update(JSON.stringify({ endpoint, body })).digest('hex') };
}

const cpuMinutes = (ms: number) => `${(ms / 60_000).toLocaleString('en', { maximumFractionDigits: 1 })} CPU-min`;

/** Turns what the database refuses of a submission into problems that a person can act on. */
export async function refusingQuota<T>(submit: () => Promise<T>): Promise<T> {
  try {
    return await submit();
  } catch (error) {
    if (error instanceof QuotaExceeded) {
      const { neededMs, freeMs } = error;
      const detail = `This reserves ${cpuMinutes(neededMs)}; ${cpuMinutes(freeMs)} are free this week. Nothing was submitted.`;
      throw new Refusal('quota-exceeded', detail, { figures: { neededMs, freeMs } });
    }
    if (error instanceof IdempotencyMismatch)
      throw new Refusal('idempotency-mismatch', 'This Idempotency-Key was used before for another request.');
    throw error;
  }
}
