/** Limits that people meet in messages; one place for their numbers. */
export const limits = {
  /** Points of one sweep. */
  sweepPoints: 100_000,
  /** JSON body of a request. */
  bodyBytes: 1_048_576,
  /** Raw result of one job. */
  resultBytes: 268_435_456,
  /** Memory of one kernel instance. */
  kernelBytes: 4_294_967_296,
  titleLength: 200,
  tokensPerAccount: 20,
  draftsPerAccount: 100,
  pageSize: 100,
} as const;

/** Kernel cost is counted in operations calibrated so that this many take one millisecond on the reference machine. */
export const operationsPerMs = 1_000_000;
