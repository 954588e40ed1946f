/** The only two imports of the module: no time, no randomness, no host mathematics. */

/** Tells the host how far the running call is. The host may throw here: that is how a running slice is cancelled. */
@external("host", "progress")
export declare function progress(done: f64, total: f64): void;

/** Leaves the kernel at once with a status of status.ts; the host throws, so the call never returns. */
@external("host", "abort")
declare function hostAbort(code: i32): void;

/** Unwinds to the host with `code`. For failures deep inside a computation that no caller can mend. */
export function abandon(code: i32): void {
  hostAbort(code);
  unreachable();
}
