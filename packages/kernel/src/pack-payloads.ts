/** Byte length of the input of `assemble`: count u32, 0, (offset f64, length f64) per payload, then the payloads. */
export function packedLength(payloads: readonly Uint8Array[]): number {
  let length = 8 + 16 * payloads.length;
  for (const payload of payloads) length += align(payload.length);
  return length;
}

/** Up to a multiple of 8, without 32-bit operators: inputs may pass 2 GiB. */
const align = (length: number): number => length + ((8 - (length % 8)) % 8);

/** Writes the input of `assemble` into kernel memory at `pointer`, so that no second copy of it is ever made. */
export function packPayloads(payloads: readonly Uint8Array[], memory: ArrayBuffer, pointer: number): void {
  const bytes = new Uint8Array(memory, pointer, packedLength(payloads));
  const view = new DataView(memory, pointer, bytes.length);
  view.setUint32(0, payloads.length, true);
  view.setUint32(4, 0, true);
  let offset = 8 + 16 * payloads.length;
  payloads.forEach((payload, i) => {
    view.setFloat64(8 + 16 * i, offset, true);
    view.setFloat64(16 + 16 * i, payload.length, true);
    bytes.set(payload, offset);
    bytes.fill(0, offset + payload.length, offset + align(payload.length));
    offset += align(payload.length);
  });
}
