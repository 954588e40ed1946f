/** A palette PNG with stored (not compressed) data: the same bytes from every engine, without a compressor. */

const crcTable = Uint32Array.from({ length: 256 }, (_, n) => {
  let c = n;
  for (let k = 0; k < 8; k++) c = c & 1 ? 0xedb88320 ^ (c >>> 1) : c >>> 1;
  return c >>> 0;
});

function crc32(bytes: Uint8Array): number {
  let c = 0xffffffff;
  for (const byte of bytes) c = (crcTable[(c ^ byte) & 255] as number) ^ (c >>> 8);
  return (c ^ 0xffffffff) >>> 0;
}

function adler32(bytes: Uint8Array): number {
  let a = 1;
  let b = 0;
  for (const byte of bytes) {
    a = (a + byte) % 65521;
    b = (b + a) % 65521;
  }
  return ((b << 16) | a) >>> 0;
}

const word = (n: number) => [(n >>> 24) & 255, (n >>> 16) & 255, (n >>> 8) & 255, n & 255];

function chunk(type: string, data: ArrayLike<number>): number[] {
  const body = [...type].map((c) => c.charCodeAt(0)).concat(Array.from(data));
  return [...word(data.length), ...body, ...word(crc32(Uint8Array.from(body)))];
}

/** zlib stream of stored blocks (RFC 1950, RFC 1951 3.2.4). */
function stored(bytes: Uint8Array): Uint8Array {
  const blocks = Math.max(1, Math.ceil(bytes.length / 65535));
  const out = new Uint8Array(2 + bytes.length + 5 * blocks + 4);
  out.set([0x78, 0x01]);
  let at = 2;
  for (let i = 0; i < blocks; i++) {
    const part = bytes.subarray(i * 65535, (i + 1) * 65535);
    const n = part.length;
    out.set([i === blocks - 1 ? 1 : 0, n & 255, n >>> 8, ~n & 255, (~n >>> 8) & 255], at);
    out.set(part, at + 5);
    at += 5 + n;
  }
  out.set(word(adler32(bytes)), at);
  return out;
}

/** `steps` are indices into `colors` (#rrggbb), row by row; any other index is transparent. PNG third edition. */
export function encodePng(steps: Uint8Array, width: number, height: number, colors: readonly string[]): Uint8Array {
  const rows = new Uint8Array((width + 1) * height);
  for (let y = 0; y < height; y++) {
    const row = steps.subarray(y * width, (y + 1) * width);
    for (let x = 0; x < width; x++) rows[y * (width + 1) + 1 + x] = Math.min(row[x] as number, colors.length);
  }
  const plte = [...colors, '#000000'].flatMap((hex) => [1, 3, 5].map((i) => Number.parseInt(hex.slice(i, i + 2), 16)));
  const trns = [...colors.map(() => 255), 0];
  const data = stored(rows);
  const head = [
    ...[137, 80, 78, 71, 13, 10, 26, 10],
    ...chunk('IHDR', [...word(width), ...word(height), 8, 3, 0, 0, 0]),
    ...chunk('PLTE', plte),
    ...chunk('tRNS', trns),
  ];
  const idat = chunk('IDAT', data);
  return Uint8Array.from([...head, ...idat, ...chunk('IEND', [])]);
}

const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

/** Base64 (RFC 4648) without a host function, so that browser and server agree. */
export function base64(bytes: Uint8Array): string {
  const parts: string[] = [];
  for (let i = 0; i < bytes.length; i += 3) {
    const left = bytes.length - i;
    const n = ((bytes[i] as number) << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0);
    parts.push(
      (alphabet[n >>> 18] as string) +
        alphabet[(n >>> 12) & 63] +
        (left > 1 ? alphabet[(n >>> 6) & 63] : '=') +
        (left > 2 ? alphabet[n & 63] : '='),
    );
  }
  return parts.join('');
}

/** A PNG with its resolution stated (chunk pHYs, pixels per metre), placed behind the header of 33 bytes. */
export function withDpi(png: Uint8Array, dpi: number): Uint8Array {
  const perMetre = Math.round(dpi / 0.0254);
  const phys = chunk('pHYs', [...word(perMetre), ...word(perMetre), 1]);
  const out = new Uint8Array(png.length + phys.length);
  out.set(png.subarray(0, 33));
  out.set(phys, 33);
  out.set(png.subarray(33), 33 + phys.length);
  return out;
}
