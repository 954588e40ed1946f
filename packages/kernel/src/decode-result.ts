import type { ModelManifest } from '@nightcone/models';
import type { Certificate, KernelResult, ResultArrayData } from './types.ts';
import { KernelCrash } from './types.ts';

const RESULT_MAGIC = 0x3153434e; // "NCS1", little-endian
const dtypes = ['f64', 'i32', 'u8'] as const;

/**
 * Names what the kernel's result buffer holds. The bytes of the arrays are copied as they are; the certificate's
 * doubles become a JSON object. No number is computed here.
 */
export function decodeResult(model: ModelManifest, buffer: Uint8Array): KernelResult {
  const view = new DataView(buffer.buffer, buffer.byteOffset, buffer.byteLength);
  if (buffer.byteLength < 16 || view.getUint32(0, true) !== RESULT_MAGIC) {
    throw new KernelCrash('The result buffer does not begin with its magic number.');
  }
  const arrayCount = view.getUint32(8, true);
  const certificateLength = view.getUint32(12, true);
  const arrays: ResultArrayData[] = [];
  let at = 16;
  for (let i = 0; i < arrayCount; i++) {
    const definition = model.results[view.getUint32(at, true)];
    const dtype = dtypes[view.getUint32(at + 4, true)];
    const rank = view.getUint32(at + 8, true);
    if (!definition || !dtype) throw new KernelCrash(`Array ${i} of the result is not in the manifest.`);
    // a ragged list is stored flat: its first dims are the rows of its offsets
    const fits = definition.ragged ? rank > 0 && rank <= definition.dims.length : rank === definition.dims.length;
    if (dtype !== definition.dtype || !fits) {
      throw new KernelCrash(`Array ${definition.name} of the result has another type or rank than the manifest says.`);
    }
    const shape: number[] = [];
    for (let axis = 0; axis < rank; axis++) shape.push(view.getUint32(at + 16 + 4 * axis, true));
    const tail = at + 16 + 8 * ((rank + 1) >> 1);
    const offset = view.getFloat64(tail, true);
    const length = view.getFloat64(tail + 8, true);
    const { name, dims, unit, ragged } = definition;
    arrays.push({
      name,
      dtype,
      shape,
      dims,
      unit,
      ...(ragged === undefined ? {} : { ragged }),
      bytes: buffer.slice(offset, offset + length),
    });
    at = tail + 16;
  }
  return { arrays, certificate: decodeCertificate(model, view, certificateLength) };
}

function decodeCertificate(model: ModelManifest, view: DataView, length: number): Certificate {
  const start = view.byteLength - 8 * length;
  const read = (i: number): number => {
    const value = view.getFloat64(start + 8 * i, true);
    if (!Number.isFinite(value) || Object.is(value, -0)) {
      throw new KernelCrash('The certificate holds a value that is not finite, or a negative zero.');
    }
    return value;
  };
  const numbers: Certificate['numbers'] = {};
  model.certificate.forEach(({ name }, i) => {
    numbers[name] = read(i);
  });
  const checks: Certificate['checks'] = [];
  for (let i = model.certificate.length; i < length; i += 5) {
    const code = model.checks[read(i)]?.code;
    if (code === undefined) throw new KernelCrash('The certificate holds a check that is not in the manifest.');
    checks.push({
      code,
      computed: read(i + 1),
      expected: read(i + 2),
      tolerance: read(i + 3),
      holds: read(i + 4) === 1,
    });
  }
  return { numbers, checks };
}
