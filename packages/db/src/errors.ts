/** The same idempotency key was used before for another request. */
export class IdempotencyMismatch extends Error {
  override name = 'IdempotencyMismatch';
  constructor(readonly key: string) {
    super('This idempotency key was used before for another request.');
  }
}

/** The quota does not hold what was asked for. All in reference CPU milliseconds. */
export class QuotaExceeded extends Error {
  override name = 'QuotaExceeded';
  constructor(
    readonly neededMs: number,
    readonly freeMs: number,
  ) {
    super(`This needs ${neededMs} ms of CPU, and ${freeMs} ms are left this week.`);
  }
}
