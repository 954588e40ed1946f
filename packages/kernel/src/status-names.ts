/** Names of the kernel's status codes, by code, in the order of assembly/status.ts. Append only. */
export const statusNames = [
  'ok',
  'invalid-record',
  'invalid-parameter',
  'not-converged',
  'memory-exceeded',
  'outside-table',
  'inertia-mismatch',
  'not-finite',
  'payload-mismatch',
  'method-unavailable',
  'out-of-order',
] as const;

export type StatusName = (typeof statusNames)[number];

export const statusName = (code: number): string => statusNames[code] ?? `status-${code}`;
