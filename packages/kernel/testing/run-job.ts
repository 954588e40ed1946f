import { type Json, type KernelManifest, parseSpecification, type Specification } from '@nightcone/models';
import type { KernelInstance, KernelResult, Tables } from '../src/index.ts';

/** A question with whatever it leaves out at its default. */
export interface Question {
  model: string;
  parameters?: { [name: string]: Json };
  numerics?: { [name: string]: Json };
}

/** The complete specification of a question; throws on the first thing that is wrong with it. */
export function complete(manifest: KernelManifest, question: Question): Specification {
  const parsed = parseSpecification(manifest, { ...question, kernel: '0'.repeat(64) });
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems[0]));
  return parsed.specification;
}

/** Computes a question from record to result; slices in the given order, forwards by default. */
export function runJob(
  kernel: KernelInstance,
  question: Question,
  { backwards = false, tables }: { backwards?: boolean; tables?: Tables } = {},
): KernelResult {
  kernel.open(complete(kernel.manifest, question), tables);
  const slices = Array.from({ length: kernel.sliceCount() }, (_, i) => i);
  if (backwards) slices.reverse();
  const payloads: Uint8Array[] = [];
  for (const slice of slices) payloads[slice] = kernel.computeSlice(slice);
  return kernel.assemble(payloads);
}

/** Values of an array of the result. */
export function valuesOf(result: KernelResult, name: string): number[] {
  const array = result.arrays.find((candidate) => candidate.name === name);
  if (!array) throw new Error(`The result has no array ${name}.`);
  const buffer = array.bytes.slice().buffer;
  if (array.dtype === 'f64') return [...new Float64Array(buffer)];
  return array.dtype === 'i32' ? [...new Int32Array(buffer)] : [...array.bytes];
}

/** A check of the certificate, undefined where it did not apply. */
export function checkOf(result: KernelResult, code: string) {
  return result.certificate.checks.find((check) => check.code === code);
}
