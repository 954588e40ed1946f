import { availableParallelism } from 'node:os';
import type { Tables } from '@nightcone/kernel';
import type { LoadedKernel } from '@nightcone/kernel/node';
import { findModel, type Specification, validityOf, type WordedNote } from '@nightcone/models';
import { jobHash, type ResultRecord, resultDigest } from '@nightcone/provenance';
import type { Terminal } from '../lib/command.ts';
import { computeJob } from './compute-job.ts';

/** Computes a job and puts its result, hashes and notes together. Progress goes to standard error. */
export async function makeRecord(
  kernel: LoadedKernel,
  specification: Specification,
  tables: Tables,
  terminal: Terminal,
  threads?: number,
): Promise<ResultRecord> {
  const show = progressLine(terminal);
  const available = availableParallelism();
  const result = await computeJob(kernel.module, specification, { tables, threads, available, onProgress: show });
  return {
    specification,
    jobHash: await jobHash(specification),
    resultDigest: await resultDigest(result),
    result,
    notes: notesOf(specification),
  };
}

/** Validity notes in words; none for a model that only an old kernel knows. */
export function notesOf(specification: Specification): WordedNote[] {
  const model = findModel(specification.model);
  return model ? validityOf(model, specification) : [];
}

function progressLine(terminal: Terminal): (done: number, total: number) => void {
  let shownAt = 0;
  return (done, total) => {
    if (!terminal.showsProgress) return;
    if (done < total && Date.now() - shownAt < 200) return;
    shownAt = Date.now();
    terminal.err(`\r${done} of ${total} slices${done === total ? '\n' : ''}`);
  };
}
