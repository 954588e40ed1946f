/**
 * What a call into the kernel may answer. 0 is success; every other code is a deterministic refusal: the same record
 * gives it again on every machine. Append only; the host keeps the names in the same order.
 */
export const OK: i32 = 0;
/** The bytes are no record of this interface: magic, interface number, model index, length or a non-finite number. */
export const INVALID_RECORD: i32 = 1;
/** A parameter, or a combination of parameters, that the model cannot take. */
export const INVALID_PARAMETER: i32 = 2;
/** An iteration used up its steps above its tolerance. */
export const NOT_CONVERGED: i32 = 3;
/** The job needs more than the 4 GiB that the module can address. */
export const MEMORY_EXCEEDED: i32 = 4;
/** A position outside the rows of an uploaded table. */
export const OUTSIDE_TABLE: i32 = 5;
/** The number of levels found differs from the number proved by inertia. */
export const INERTIA_MISMATCH: i32 = 6;
/** A NaN or an infinity would have left the kernel. */
export const NOT_FINITE: i32 = 7;
/** `assemble` was given payloads of another number or length than the record makes. */
export const PAYLOAD_MISMATCH: i32 = 8;
/** The requested method does not exist for these parameters. */
export const METHOD_UNAVAILABLE: i32 = 9;
/** A call out of order: no job is open, or the slice does not exist. */
export const OUT_OF_ORDER: i32 = 10;

/** Not a status: `memory.grow` failed below the limit. The host reports a crash of the machine, which may be retried. */
export const MACHINE_OUT_OF_MEMORY: i32 = -1;
