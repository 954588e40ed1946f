/** Unsigned LEB128, the variable-length integers of the WebAssembly binary format. */
function leb128(value: number): number[] {
  const bytes: number[] = [];
  let rest = value;
  do {
    const low = rest & 127;
    rest >>>= 7;
    bytes.push(rest ? low | 128 : low);
  } while (rest);
  return bytes;
}

/** The module with a custom section (id 0) appended; custom sections may stand anywhere, so the end is fine. */
export function addCustomSection(wasm: Uint8Array, name: string, content: Uint8Array): Uint8Array<ArrayBuffer> {
  const nameBytes = new TextEncoder().encode(name);
  const nameLength = leb128(nameBytes.length);
  const size = leb128(nameLength.length + nameBytes.length + content.length);
  const out = new Uint8Array(wasm.length + 1 + size.length + nameLength.length + nameBytes.length + content.length);
  out.set(wasm);
  let at = wasm.length;
  out[at++] = 0;
  for (const part of [size, nameLength, nameBytes, content]) {
    out.set(part, at);
    at += part.length;
  }
  return out;
}

/** Text of a custom section, undefined where there is none; a module with two of that name is refused. */
export function readCustomSection(module: WebAssembly.Module, name: string): string | undefined {
  const sections = WebAssembly.Module.customSections(module, name);
  if (sections.length > 1) throw new Error(`The module has ${sections.length} sections named ${name}.`);
  return sections[0] && new TextDecoder('utf-8', { fatal: true }).decode(sections[0]);
}
