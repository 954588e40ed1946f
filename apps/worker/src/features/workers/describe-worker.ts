import { randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { freemem, hostname } from 'node:os';
import type { WorkerDescription } from '@nightcone/db/queue';

/** What a worker process says of itself when it joins. The id is never used twice. */
export function describeWorker(slots: number, speedFactor: number): WorkerDescription {
  const host = hostname();
  return {
    id: `${host}-${process.pid}-${randomBytes(4).toString('hex')}`,
    host,
    pid: process.pid,
    slots,
    memoryBytes: Math.floor(0.6 * availableMemory()),
    speedFactor,
  };
}

/** Memory that can be had without swapping, within the limit of the control group if there is one. */
function availableMemory(): number {
  // 0 or an enormous number: no limit.
  const limit = process.constrainedMemory() || Number.POSITIVE_INFINITY;
  return Math.min(availableOnLinux() ?? freemem(), limit);
}

function availableOnLinux(): number | undefined {
  try {
    const kibibytes = /^MemAvailable:\s+(\d+) kB$/m.exec(readFileSync('/proc/meminfo', 'utf8'))?.[1];
    return kibibytes === undefined ? undefined : Number(kibibytes) * 1024;
  } catch {
    return undefined;
  }
}
