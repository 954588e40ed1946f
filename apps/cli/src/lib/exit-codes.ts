/** Exit codes are stable: scripts depend on them. */
export const exitCodes = {
  done: 0,
  /** Something outside the question: no network, no kernel built, a bug. */
  failed: 1,
  /** A problem document is on standard error. */
  wrongInput: 2,
  /** The kernel refused the job or did not converge; deterministic. */
  refused: 3,
  notReproduced: 4,
} as const;
